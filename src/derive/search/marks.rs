//! Tables of marks, by which most sums are told apart without being kept.

use super::keys::Keys;

/// The table of marks has between 2^10 and 2^29 bits (64 MiB).
const FEWEST_BITS: u32 = 10;
const MOST_BITS: u32 = 29;
/// Keys that are plain numbers of so few bits have a mark each.
const PLAIN_BITS: u32 = 24;

/// A table of marks.
pub(super) struct Marks {
    bits: u32,
    words: Vec<u64>,
    /// A mark that is met is an equal key, not just a like one.
    pub(super) exact: bool,
}

impl Marks {
    /// For so many keys, `spare` bits wider than they need.
    pub(super) fn new<K: Keys>(keys: &K, held: u64, spare: u32) -> Marks {
        let wanted = 64 - held.leading_zeros() + spare;
        let mut bits = wanted.clamp(FEWEST_BITS, MOST_BITS);
        let mut exact = false;
        if let Some(key_bits) = keys
            .exact_bits()
            .filter(|&key_bits| key_bits <= bits.max(PLAIN_BITS))
        {
            bits = key_bits.max(6);
            exact = true;
        }
        Marks {
            bits,
            words: vec![0; 1 << (bits - 6)],
            exact,
        }
    }

    /// Holding these keys.
    pub(super) fn of<K: Keys>(keys: &K, held: &[K::Key]) -> Marks {
        let mut marks = Marks::new(keys, held.len() as u64, 5);
        for &key in held {
            marks.mark(keys, key);
        }
        marks
    }

    #[inline]
    fn place<K: Keys>(&self, keys: &K, key: K::Key) -> (usize, u64) {
        let slot = keys.slot(key, self.bits);
        ((slot >> 6) as usize, 1 << (slot & 63))
    }

    /// Marks a key; whether a like one was marked before.
    #[inline]
    pub(super) fn mark<K: Keys>(&mut self, keys: &K, key: K::Key) -> bool {
        let (word, bit) = self.place(keys, key);
        let met = self.words[word] & bit != 0;
        self.words[word] |= bit;
        met
    }

    /// Whether the key or a like one is marked.
    #[inline]
    pub(super) fn has<K: Keys>(&self, keys: &K, key: K::Key) -> bool {
        let (word, bit) = self.place(keys, key);
        self.words[word] & bit != 0
    }
}
