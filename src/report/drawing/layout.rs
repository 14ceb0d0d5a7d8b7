//! Where everything stands: a layered layout (K. Sugiyama, S. Tagawa and M. Toda, Methods for
//! Visual Understanding of Hierarchical System Structures, 1981).
//!
//! Layers by longest path, crossings cut by barycentres, heights by least squares under the order
//! found. Files keep to lanes, so the order is first by lane.

use std::collections::BTreeSet;

use petgraph::algo::{greedy_feedback_arc_set, toposort};
use petgraph::graph::DiGraph;
use petgraph::stable_graph::StableDiGraph;
use petgraph::visit::EdgeRef;

use super::Diagram;
use super::heights::{heights, lane_places};

/// The height of a node's box.
pub(super) const NODE_HEIGHT: f64 = 40.0;
/// How often the layers are gone through, to and fro.
pub(super) const SWEEPS: usize = 24;

/// A place in a layer: a box, or where an edge passes by.
#[derive(Clone, Debug)]
pub(super) struct Slot {
    /// The layer, from 0 at the left.
    pub layer: usize,
    /// The file.
    pub lane: usize,
    /// Whether it is the box of a node.
    pub real: bool,
    /// The middle, from the top.
    pub y: f64,
}

/// An edge as it is drawn.
#[derive(Clone, Debug)]
pub(super) struct Route {
    /// The slots it visits, left to right.
    pub slots: Vec<usize>,
    /// Whether it closes a circle, and so leads from right to left.
    pub backward: bool,
}

/// The finished layout.
#[derive(Clone, Debug)]
pub(super) struct Layout {
    /// The slots of the nodes first, in the order of the nodes.
    pub slots: Vec<Slot>,
    /// The edges, those from a node to itself excepted.
    pub routes: Vec<Route>,
    /// The number of layers.
    pub layers: usize,
    /// Top and height of each lane that has nodes, by file.
    pub lanes: Vec<Option<(f64, f64)>>,
    /// The height of all lanes together.
    pub height: f64,
}

/// Lays a diagram out.
pub(super) fn layout(diagram: &Diagram) -> Layout {
    let lanes = diagram.files.len().max(1);
    let (forward, backward) = directed(diagram);
    let layer = layers(diagram.nodes.len(), &forward);
    let mut slots: Vec<Slot> = diagram
        .nodes
        .iter()
        .zip(&layer)
        .map(|(node, &layer)| Slot {
            layer,
            lane: node.file.min(lanes - 1),
            real: true,
            y: 0.0,
        })
        .collect();
    let mut routes = Vec::new();
    for (edges, backward) in [(&forward, false), (&backward, true)] {
        for &(left, right) in edges {
            let slots = passing(&mut slots, left, right);
            routes.push(Route { slots, backward });
        }
    }
    let links: Vec<(usize, usize)> = routes
        .iter()
        .flat_map(|route| route.slots.windows(2).map(|pair| (pair[0], pair[1])))
        .collect();
    let count = layer.iter().max().map_or(0, |last| last + 1);
    let order = order(&slots, &links, count);
    let (lanes, height) = lane_places(&slots, &order, lanes);
    heights(&mut slots, &links, &order, &lanes);
    Layout {
        slots,
        routes,
        layers: count,
        lanes,
        height,
    }
}

/// The edges as (left, right), used before user: those along which the layers grow, and turned
/// round those that close a circle.
type Edges = Vec<(usize, usize)>;

fn directed(diagram: &Diagram) -> (Edges, Edges) {
    let edges: Edges = diagram
        .clean_edges()
        .into_iter()
        .filter(|(user, used)| user != used)
        .map(|(user, used)| (used, user))
        .collect();
    let mut graph = StableDiGraph::<(), ()>::new();
    let nodes: Vec<_> = diagram.nodes.iter().map(|_| graph.add_node(())).collect();
    for &(left, right) in &edges {
        graph.add_edge(nodes[left], nodes[right], ());
    }
    let circular: BTreeSet<(usize, usize)> = greedy_feedback_arc_set(&graph)
        .map(|edge| (edge.source().index(), edge.target().index()))
        .collect();
    let (back, forward): (Edges, Edges) =
        edges.into_iter().partition(|edge| circular.contains(edge));
    (
        forward,
        back.into_iter()
            .map(|(left, right)| (right, left))
            .collect(),
    )
}

/// The layer of each node: as far left as what it uses allows, except that a node which more use
/// than it uses moves right, next to the first of its users.
fn layers(count: usize, edges: &[(usize, usize)]) -> Vec<usize> {
    let mut graph = DiGraph::<(), ()>::new();
    let nodes: Vec<_> = (0..count).map(|_| graph.add_node(())).collect();
    for &(left, right) in edges {
        graph.add_edge(nodes[left], nodes[right], ());
    }
    let sorted = toposort(&graph, None).expect("edges that close circles were taken out");
    let mut layer = vec![0; count];
    for &node in &sorted {
        for user in graph.neighbors(node) {
            layer[user.index()] = layer[user.index()].max(layer[node.index()] + 1);
        }
    }
    for &node in sorted.iter().rev() {
        let users = graph.neighbors(node).map(|user| layer[user.index()]);
        let uses = graph
            .neighbors_directed(node, petgraph::Direction::Incoming)
            .count();
        if uses < users.clone().count() {
            let next = users.min().expect("it has users");
            layer[node.index()] = next - 1;
        }
    }
    layer
}

/// The slots of an edge from node to node, new ones where it passes by other layers. An edge that
/// closes a circle may lead within a layer, or backward; it then visits its ends only.
fn passing(slots: &mut Vec<Slot>, left: usize, right: usize) -> Vec<usize> {
    let mut route = vec![left];
    for layer in slots[left].layer + 1..slots[right].layer {
        slots.push(Slot {
            layer,
            lane: slots[right].lane,
            real: false,
            y: 0.0,
        });
        route.push(slots.len() - 1);
    }
    route.push(right);
    route
}

/// The order of the slots in each layer, with few crossings.
fn order(slots: &[Slot], links: &[(usize, usize)], layers: usize) -> Vec<Vec<usize>> {
    let mut order: Vec<Vec<usize>> = vec![Vec::new(); layers];
    for (index, slot) in slots.iter().enumerate() {
        order[slot.layer].push(index);
    }
    for layer in &mut order {
        layer.sort_by_key(|&slot| slots[slot].lane);
    }
    let (left, right) = neighbours(slots, links);
    let mut place = vec![0usize; slots.len()];
    let renumber = |layer: &[usize], place: &mut [usize]| {
        layer
            .iter()
            .enumerate()
            .for_each(|(at, &slot)| place[slot] = at);
    };
    order.iter().for_each(|layer| renumber(layer, &mut place));
    let mut best = (crossings(slots, links, &place), order.clone());
    for sweep in 0..SWEEPS {
        if best.0 == 0 {
            break;
        }
        let rightward = sweep % 2 == 0;
        for step in 0..layers {
            let at = if rightward { step } else { layers - 1 - step };
            let sides = if rightward { &left } else { &right };
            let centre = |slot: usize| {
                let places: Vec<usize> = sides[slot].iter().map(|&other| place[other]).collect();
                match places.len() {
                    0 => place[slot] as f64,
                    count => places.iter().sum::<usize>() as f64 / count as f64,
                }
            };
            let mut keyed: Vec<(usize, f64, usize)> = order[at]
                .iter()
                .map(|&slot| (slots[slot].lane, centre(slot), slot))
                .collect();
            keyed.sort_by(|one, other| one.0.cmp(&other.0).then(one.1.total_cmp(&other.1)));
            order[at] = keyed.into_iter().map(|(_, _, slot)| slot).collect();
            renumber(&order[at], &mut place);
        }
        let count = crossings(slots, links, &place);
        if count < best.0 {
            best = (count, order.clone());
        }
    }
    best.1
}

/// The neighbours of each slot in the layer before and in the one after.
pub(super) fn neighbours(
    slots: &[Slot],
    links: &[(usize, usize)],
) -> (Vec<Vec<usize>>, Vec<Vec<usize>>) {
    let mut left = vec![Vec::new(); slots.len()];
    let mut right = vec![Vec::new(); slots.len()];
    for &(one, other) in links {
        if slots[one].layer < slots[other].layer {
            right[one].push(other);
            left[other].push(one);
        }
    }
    (left, right)
}

/// How many pairs of links cross.
fn crossings(slots: &[Slot], links: &[(usize, usize)], place: &[usize]) -> usize {
    let mut ends: Vec<(usize, usize, usize)> = links
        .iter()
        .map(|&(left, right)| (slots[left].layer, place[left], place[right]))
        .collect();
    ends.sort_unstable();
    let mut count = 0;
    let mut seen: Vec<usize> = Vec::new();
    let mut layer = usize::MAX;
    for (at, _, right) in ends {
        if at != layer {
            layer = at;
            seen.clear();
        }
        let split = seen.partition_point(|&other| other <= right);
        count += seen.len() - split;
        seen.insert(split, right);
    }
    count
}
