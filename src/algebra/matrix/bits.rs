//! Rows of bits, packed in words: the entries of a dense matrix over GF(2).

/// Rows of equal length, each starting on a word; bit c of a row is bit c mod 64 of its word c/64.
/// Bits past the last column are zero.
#[derive(Clone, PartialEq, Eq)]
pub(super) struct Bits {
    stride: usize,
    words: Vec<u64>,
}

impl Bits {
    pub(super) fn zero(rows: usize, columns: usize) -> Bits {
        let stride = columns.div_ceil(64);
        Bits {
            stride,
            words: vec![0; rows * stride],
        }
    }

    pub(super) fn get(&self, row: usize, column: usize) -> bool {
        self.words[row * self.stride + column / 64] >> (column % 64) & 1 == 1
    }

    pub(super) fn set(&mut self, row: usize, column: usize, value: bool) {
        let word = &mut self.words[row * self.stride + column / 64];
        let bit = 1 << (column % 64);
        if value { *word |= bit } else { *word &= !bit }
    }

    pub(super) fn row(&self, row: usize) -> &[u64] {
        &self.words[row * self.stride..(row + 1) * self.stride]
    }

    pub(super) fn row_mut(&mut self, row: usize) -> &mut [u64] {
        &mut self.words[row * self.stride..(row + 1) * self.stride]
    }

    /// Two different rows, the first to be changed.
    pub(super) fn row_pair(&mut self, change: usize, read: usize) -> (&mut [u64], &[u64]) {
        let stride = self.stride;
        let (low, high) = (change.min(read), change.max(read));
        let (left, right) = self.words.split_at_mut(high * stride);
        let lower = &mut left[low * stride..(low + 1) * stride];
        let upper = &mut right[..stride];
        if change < read {
            (lower, upper)
        } else {
            (upper, lower)
        }
    }

    pub(super) fn swap(&mut self, left: usize, right: usize) {
        if left != right {
            let (stride, low, high) = (self.stride, left.min(right), left.max(right));
            let (head, tail) = self.words.split_at_mut(high * stride);
            head[low * stride..(low + 1) * stride].swap_with_slice(&mut tail[..stride]);
        }
    }

    pub(super) fn truncate(&mut self, rows: usize) {
        self.words.truncate(rows * self.stride);
        self.words.shrink_to_fit();
    }

    pub(super) fn append(&mut self, other: &Bits) {
        self.words.extend_from_slice(&other.words);
    }

    pub(super) fn is_zero(&self) -> bool {
        self.words.iter().all(|&word| word == 0)
    }
}

/// `row += other`.
pub(super) fn add(row: &mut [u64], other: &[u64]) {
    for (entry, &summand) in row.iter_mut().zip(other) {
        *entry ^= summand;
    }
}

/// The places of the ones in a row, ascending.
pub(super) fn ones(words: &[u64]) -> impl Iterator<Item = usize> + '_ {
    words.iter().enumerate().flat_map(|(at, &word)| {
        let mut rest = word;
        std::iter::from_fn(move || {
            (rest != 0).then(|| {
                let bit = rest.trailing_zeros() as usize;
                rest &= rest - 1;
                at * 64 + bit
            })
        })
    })
}

/// A vector of zeros and ones as packed words.
pub(super) fn pack(vector: &[u32]) -> Vec<u64> {
    vector
        .chunks(64)
        .map(|chunk| {
            let bits = chunk.iter().enumerate();
            bits.fold(0, |word, (at, &bit)| word | u64::from(bit & 1) << at)
        })
        .collect()
}

/// Whether two rows meet in an odd number of ones.
pub(super) fn dot(left: &[u64], right: &[u64]) -> bool {
    let meet = left
        .iter()
        .zip(right)
        .fold(0, |sum, (&left, &right)| sum ^ left & right);
    meet.count_ones() & 1 == 1
}

/// Exchanges rows and columns of a block of 64 words, by halves (H. Warren, Hacker's Delight, 2003,
/// §7.3).
pub(super) fn transpose_block(block: &mut [u64; 64]) {
    let mut size = 32;
    let mut mask = u64::MAX >> 32;
    while size > 0 {
        let mut row = 0;
        while row < 64 {
            let exchange = (block[row] >> size ^ block[row + size]) & mask;
            block[row + size] ^= exchange;
            block[row] ^= exchange << size;
            row = (row + size + 1) & !size;
        }
        size /= 2;
        mask ^= mask << size;
    }
}
