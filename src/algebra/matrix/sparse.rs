//! Rows given by their non-zero entries, for large check matrices with few of them.

use std::sync::OnceLock;

use crate::algebra::{Element, Field};

/// Non-zero entries row by row, columns ascending. The rows of each column are listed when they
/// are first asked for, and forgotten when an entry changes.
#[derive(Clone)]
pub(super) struct Sparse {
    rows: Vec<Vec<(u32, Element)>>,
    by_column: OnceLock<Vec<Vec<u32>>>,
}

impl Sparse {
    /// By entries in any order; those at one place are summed, zeros dropped.
    pub(super) fn new(
        field: &Field,
        columns: usize,
        entries: Vec<Vec<(usize, Element)>>,
    ) -> Sparse {
        let rows = entries
            .into_iter()
            .map(|mut row| {
                row.sort_unstable_by_key(|&(column, _)| column);
                let mut merged: Vec<(u32, Element)> = Vec::with_capacity(row.len());
                for (column, value) in row {
                    assert!(column < columns, "column {column} of {columns}");
                    match merged.last_mut() {
                        Some((last, sum)) if *last as usize == column => {
                            *sum = field.add(*sum, value);
                        }
                        _ => merged.push((column as u32, value)),
                    }
                }
                merged.retain(|&(_, value)| value != 0);
                merged
            })
            .collect();
        Sparse {
            rows,
            by_column: OnceLock::new(),
        }
    }

    pub(super) fn row(&self, row: usize) -> &[(u32, Element)] {
        &self.rows[row]
    }

    pub(super) fn get(&self, row: usize, column: usize) -> Element {
        let row = &self.rows[row];
        row.binary_search_by_key(&(column as u32), |&(at, _)| at)
            .map_or(0, |at| row[at].1)
    }

    pub(super) fn set(&mut self, row: usize, column: usize, value: Element) {
        self.by_column.take();
        let row = &mut self.rows[row];
        match row.binary_search_by_key(&(column as u32), |&(at, _)| at) {
            Ok(at) if value == 0 => {
                row.remove(at);
            }
            Ok(at) => row[at].1 = value,
            Err(at) if value != 0 => row.insert(at, (column as u32, value)),
            Err(_) => {}
        }
    }

    /// The rows with a non-zero entry in the column, ascending.
    pub(super) fn column(&self, columns: usize, column: usize) -> &[u32] {
        let by_column = self.by_column.get_or_init(|| {
            let mut lists = vec![Vec::new(); columns];
            for (row, entries) in self.rows.iter().enumerate() {
                for &(column, _) in entries {
                    lists[column as usize].push(row as u32);
                }
            }
            lists
        });
        &by_column[column]
    }
}
