//! How high everything stands: near its neighbours, in the order found, within its lane.

use super::layout::{NODE_HEIGHT, SWEEPS, Slot, neighbours};

/// The free space between two boxes of a layer, and between passing edges.
const NODE_GAP: f64 = 16.0;
const PASSING_GAP: f64 = 8.0;
/// The height that a passing edge takes in a layer.
const PASSING_HEIGHT: f64 = 2.0;
/// The space in a lane above its first box, where the file's name stands, and below its last.
const LANE_HEAD: f64 = 30.0;
const LANE_FOOT: f64 = 14.0;
const LANE_GAP: f64 = 12.0;

impl Slot {
    fn height(&self) -> f64 {
        if self.real {
            NODE_HEIGHT
        } else {
            PASSING_HEIGHT
        }
    }

    /// From the middle of this slot to that of the one below it, at least.
    fn distance(&self, below: &Slot) -> f64 {
        let gap = match (self.real, below.real) {
            (false, false) => PASSING_GAP,
            _ => NODE_GAP,
        };
        (self.height() + below.height()) / 2.0 + gap
    }
}

/// Top and height of each lane with nodes, and the height of all.
pub(super) fn lane_places(
    slots: &[Slot],
    order: &[Vec<usize>],
    lanes: usize,
) -> (Vec<Option<(f64, f64)>>, f64) {
    let mut inner = vec![0f64; lanes];
    for layer in order {
        for column in layer.chunk_by(|&one, &other| slots[one].lane == slots[other].lane) {
            let lane = slots[column[0]].lane;
            inner[lane] = inner[lane].max(stacked(slots, column));
        }
    }
    let mut top = 0.0;
    let places = inner
        .into_iter()
        .map(|height| {
            (height > 0.0).then(|| {
                let place = (top, LANE_HEAD + height + LANE_FOOT);
                top += place.1 + LANE_GAP;
                place
            })
        })
        .collect();
    (places, (top - LANE_GAP).max(0.0))
}

/// The height of slots as close together as they may stand.
fn stacked(slots: &[Slot], column: &[usize]) -> f64 {
    let (Some(&first), Some(&last)) = (column.first(), column.last()) else {
        return 0.0;
    };
    let between: f64 = column
        .windows(2)
        .map(|pair| slots[pair[0]].distance(&slots[pair[1]]))
        .sum();
    slots[first].height() / 2.0 + between + slots[last].height() / 2.0
}

/// Sets the heights: each slot near its neighbours, in the order found, within its lane.
pub(super) fn heights(
    slots: &mut [Slot],
    links: &[(usize, usize)],
    order: &[Vec<usize>],
    lanes: &[Option<(f64, f64)>],
) {
    let (left, right) = neighbours(slots, links);
    for slot in slots.iter_mut() {
        let (top, height) = lanes[slot.lane].unwrap_or_default();
        slot.y = top + LANE_HEAD + (height - LANE_HEAD - LANE_FOOT) / 2.0;
    }
    for sweep in 0..SWEEPS {
        for step in 0..order.len() {
            let at = if sweep % 2 == 0 {
                step
            } else {
                order.len() - 1 - step
            };
            let layer = &order[at];
            let wanted: Vec<f64> = layer
                .iter()
                .map(|&slot| {
                    let others = left[slot].iter().chain(&right[slot]);
                    let (mut sum, mut weights) = (0.0, 0.0);
                    for &other in others {
                        // Passing edges are to run straight.
                        let straight = !slots[slot].real && !slots[other].real;
                        let weight = if straight { 8.0 } else { 1.0 };
                        sum += weight * slots[other].y;
                        weights += weight;
                    }
                    if weights > 0.0 {
                        sum / weights
                    } else {
                        slots[slot].y
                    }
                })
                .collect();
            let mut start = 0;
            while start < layer.len() {
                let lane = slots[layer[start]].lane;
                let same = |&&slot: &&usize| slots[slot].lane == lane;
                let end = start + layer[start..].iter().take_while(same).count();
                let (top, height) = lanes[lane].unwrap_or_default();
                let room = (top + LANE_HEAD, top + height - LANE_FOOT);
                spread(slots, &layer[start..end], &wanted[start..end], room);
                start = end;
            }
        }
    }
}

/// Places a column of slots as near to what is wanted as their order and the room allow: least
/// squares, by pooling neighbours that would overlap.
fn spread(slots: &mut [Slot], column: &[usize], wanted: &[f64], (top, bottom): (f64, f64)) {
    let mut below = Vec::with_capacity(column.len());
    let mut sum = 0.0;
    for (at, &slot) in column.iter().enumerate() {
        if at > 0 {
            sum += slots[column[at - 1]].distance(&slots[slot]);
        }
        below.push(sum);
    }
    // Without the distances between them, the order is all that is left to keep.
    let mut pools: Vec<(f64, usize)> = Vec::new();
    for (wanted, below) in wanted.iter().zip(&below) {
        let mut pool = (wanted - below, 1);
        while let Some(&(mean, count)) = pools.last() {
            if mean <= pool.0 {
                break;
            }
            pools.pop();
            let total = mean * count as f64 + pool.0 * pool.1 as f64;
            pool = (total / (count + pool.1) as f64, count + pool.1);
        }
        pools.push(pool);
    }
    let (Some(&first), Some(&last)) = (column.first(), column.last()) else {
        return;
    };
    let least = top + slots[first].height() / 2.0;
    let most = (bottom - slots[last].height() / 2.0 - sum).max(least);
    let means = pools
        .iter()
        .flat_map(|&(mean, count)| std::iter::repeat_n(mean, count));
    for ((&slot, mean), below) in column.iter().zip(means).zip(&below) {
        slots[slot].y = mean.clamp(least, most) + below;
    }
}
