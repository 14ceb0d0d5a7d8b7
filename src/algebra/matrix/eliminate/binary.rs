//! Elimination over GF(2), 64 columns at a time.
//!
//! The matrix is cut into tiles, each 512 columns wide and contiguous in memory. Among the rows not
//! yet used, a panel of 64 columns yields up to 64 pivot rows, and for every row the set of those to
//! add to it. Tables of sums of eight pivot rows (the four Russians: Arlazarov, Dinic, Kronrod and
//! Faradžev, 1970) then bring every tile up to date, one tile after the other or side by side.

use rayon::prelude::*;

use super::super::bits::{self, Bits};
use super::super::{Matrix, Store};
use super::Arrangement;

/// Below this many rows plain elimination is as quick.
const FEW_ROWS: usize = 96;

/// Words in a line: the part of a row in one tile, a cache line.
const LINE: usize = 8;

type Line = [u64; LINE];
type Tile = Vec<Line>;

/// The reduced form and its pivots, as original columns.
pub(super) fn reduce(
    matrix: &Matrix,
    arranged: &Arrangement,
    in_place: bool,
) -> (Bits, Vec<usize>) {
    let order = &arranged.columns[..arranged.eligible];
    if matrix.rows < FEW_ROWS {
        return reduce_plainly(matrix, order);
    }
    let mut tiles = cut(matrix, arranged, in_place);
    let places = eliminate(&mut tiles, matrix.rows, arranged.eligible);
    let mut reduced = Bits::zero(places.len(), matrix.columns);
    for (at, tile) in tiles.drain(..).enumerate() {
        for (row, line) in tile[..places.len()].iter().enumerate() {
            if in_place {
                let words = &mut reduced.row_mut(row)[at * LINE..];
                let count = words.len().min(LINE);
                words[..count].copy_from_slice(&line[..count]);
            } else {
                for place in bits::ones(line) {
                    let column = arranged.columns[at * LINE * 64 + place];
                    reduced.set(row, column, true);
                }
            }
        }
    }
    let pivots = places
        .iter()
        .map(|&place| arranged.columns[place])
        .collect();
    (reduced, pivots)
}

fn reduce_plainly(matrix: &Matrix, order: &[usize]) -> (Bits, Vec<usize>) {
    let mut rows = match &matrix.store {
        Store::Bits(bits) => bits.clone(),
        _ => {
            let mut bits = Bits::zero(matrix.rows, matrix.columns);
            for row in 0..matrix.rows {
                for (column, _) in matrix.nonzero(row) {
                    bits.set(row, column, true);
                }
            }
            bits
        }
    };
    let mut pivots = Vec::new();
    for &column in order {
        let rank = pivots.len();
        if rank == matrix.rows {
            break;
        }
        let Some(found) = (rank..matrix.rows).find(|&row| rows.get(row, column)) else {
            continue;
        };
        rows.swap(rank, found);
        for row in 0..matrix.rows {
            if row != rank && rows.get(row, column) {
                let (to, from) = rows.row_pair(row, rank);
                bits::add(to, from);
            }
        }
        pivots.push(column);
    }
    rows.truncate(pivots.len());
    (rows, pivots)
}

fn cut(matrix: &Matrix, arranged: &Arrangement, in_place: bool) -> Vec<Tile> {
    let count = matrix.columns.div_ceil(64 * LINE);
    let mut tiles = vec![vec![[0; LINE]; matrix.rows]; count];
    for row in 0..matrix.rows {
        match &matrix.store {
            Store::Bits(bits) if in_place => {
                for (tile, words) in tiles.iter_mut().zip(bits.row(row).chunks(LINE)) {
                    tile[row][..words.len()].copy_from_slice(words);
                }
            }
            _ => {
                for (column, _) in matrix.nonzero(row) {
                    let place = arranged.places[column];
                    let line = &mut tiles[place / (64 * LINE)][row];
                    line[place / 64 % LINE] |= 1 << (place % 64);
                }
            }
        }
    }
    tiles
}

/// Reduces the tiles; returns the places of the pivots among the first `eligible` columns.
fn eliminate(tiles: &mut [Tile], rows: usize, eligible: usize) -> Vec<usize> {
    let mut pivots = Vec::new();
    for word in 0..eligible.div_ceil(64) {
        if pivots.len() == rows {
            break;
        }
        let (at, inside) = (word / LINE, word % LINE);
        let width = (eligible - word * 64).min(64);
        let valid = u64::MAX >> (64 - width);
        let column: Vec<u64> = tiles[at].iter().map(|line| line[inside]).collect();
        let Some(panel) = Panel::find(column, pivots.len(), valid) else {
            continue;
        };
        // Rows from the rank on are zero in the columns before, so that earlier tiles stay.
        let work = &mut tiles[at..];
        if work.len() * rows > 1 << 14 {
            work.par_iter_mut()
                .for_each_init(Vec::new, |tables, tile| panel.apply(tile, tables));
        } else {
            let mut tables = Vec::new();
            for tile in work {
                panel.apply(tile, &mut tables);
            }
        }
        pivots.extend(panel.bits.iter().map(|&bit| word * 64 + bit));
    }
    pivots
}

/// The pivots in one word of every row, and what they do to the rows.
struct Panel {
    /// The pivot rows are brought to this row and the ones after it.
    first: usize,
    /// Exchanges of rows that do so, in turn.
    swaps: Vec<(usize, usize)>,
    /// The bit of each pivot row's leading 1, ascending.
    bits: Vec<usize>,
    /// For each row, after the exchanges: which pivot rows, as they were, to add to it.
    sums: Vec<u64>,
}

/// A pivot row while the panel is searched.
struct Pivot {
    row: usize,
    /// Its word, cleared at the other pivots' bits.
    word: u64,
    bit: usize,
    /// The pivot rows, as they were, whose sum has that word.
    combination: u64,
}

impl Panel {
    /// From the panel's word of every row; rows before `rank` are used. `None` without a pivot.
    fn find(mut column: Vec<u64>, rank: usize, valid: u64) -> Option<Panel> {
        let pivots = Panel::pivots(&column, rank, valid);
        if pivots.is_empty() {
            return None;
        }
        let mut swaps = Vec::new();
        for (at, pivot) in pivots.iter().enumerate() {
            // Pivot rows are found from the top down, so a later one never stands in an earlier's way.
            swaps.push((rank + at, pivot.row));
            column.swap(rank + at, pivot.row);
        }
        // combination_of[byte][value]: what clears the pivot bits of a word, byte by byte.
        let mut combination_of = vec![[0u64; 256]; 8];
        for pivot in &pivots {
            combination_of[pivot.bit / 8][1 << (pivot.bit % 8)] = pivot.combination;
        }
        for table in &mut combination_of {
            for value in 1..256usize {
                let low = value & value.wrapping_neg();
                table[value] = table[low] ^ table[value ^ low];
            }
        }
        let mut sums: Vec<u64> = column
            .iter()
            .map(|word| {
                let bytes = word.to_le_bytes();
                let tables = combination_of.iter().zip(bytes);
                tables.fold(0, |sum, (table, byte)| sum ^ table[usize::from(byte)])
            })
            .collect();
        let mut sorted: Vec<&Pivot> = pivots.iter().collect();
        sorted.sort_by_key(|pivot| pivot.bit);
        for (at, pivot) in sorted.iter().enumerate() {
            sums[rank + at] = pivot.combination ^ 1 << at;
        }
        let bits = sorted.iter().map(|pivot| pivot.bit).collect();
        Some(Panel {
            first: rank,
            swaps,
            bits,
            sums,
        })
    }

    /// Independent rows, each with a bit that no other has.
    fn pivots(column: &[u64], rank: usize, valid: u64) -> Vec<Pivot> {
        let mut pivots: Vec<Pivot> = Vec::new();
        let mut pivot_at = [0usize; 64];
        let mut used = 0u64;
        for (row, &word) in column.iter().enumerate().skip(rank) {
            let mut word = word & valid;
            let mut combination = 0;
            for bit in bits::ones(&[word & used]) {
                let pivot = &pivots[pivot_at[bit]];
                word ^= pivot.word;
                combination ^= pivot.combination;
            }
            if word == 0 {
                continue;
            }
            let bit = word.trailing_zeros() as usize;
            combination |= 1 << pivots.len();
            for earlier in &mut pivots {
                if earlier.word >> bit & 1 == 1 {
                    earlier.word ^= word;
                    earlier.combination ^= combination;
                }
            }
            pivot_at[bit] = pivots.len();
            used |= 1 << bit;
            pivots.push(Pivot {
                row,
                word,
                bit,
                combination,
            });
            if used == valid {
                break;
            }
        }
        pivots
    }

    /// Exchanges the rows of a tile and adds the sums of pivot rows to them.
    fn apply(&self, tile: &mut Tile, tables: &mut Vec<Line>) {
        for &(left, right) in &self.swaps {
            tile.swap(left, right);
        }
        // Tables pay for themselves when there are several rows for each entry.
        let width = ((tile.len() / 4).max(2).ilog2() as usize).min(8);
        let count = self.bits.len();
        let groups = count.div_ceil(width);
        tables.clear();
        tables.resize(groups << width, [0; LINE]);
        for (group, table) in tables.chunks_mut(1 << width).enumerate() {
            for bit in 0..width.min(count - group * width) {
                let row = tile[self.first + group * width + bit];
                let (known, next) = table.split_at_mut(1 << bit);
                for (sum, known) in next.iter_mut().zip(known.iter()) {
                    *sum = xor(*known, &row);
                }
            }
        }
        let mask = (1 << width) - 1;
        for (line, &sum) in tile.iter_mut().zip(&self.sums) {
            let mut rest = sum;
            let mut total = *line;
            for table in tables.chunks_exact(1 << width) {
                total = xor(total, &table[(rest & mask) as usize]);
                rest >>= width;
            }
            *line = total;
        }
    }
}

#[inline(always)]
fn xor(mut left: Line, right: &Line) -> Line {
    for (left, right) in left.iter_mut().zip(right) {
        *left ^= right;
    }
    left
}
