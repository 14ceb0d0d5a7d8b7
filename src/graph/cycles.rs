//! Circles of declarations, and the order in which the others can be evaluated.

use super::Program;
use super::load::circle;
use crate::finding::{Finding, catalogue};
use petgraph::Direction;
use petgraph::algo::kosaraju_scc;
use petgraph::graph::NodeIndex;
use petgraph::visit::DfsPostOrder;

/// Reports each circle, marks what lies in or behind one as broken, and orders the rest.
///
/// Strongly connected components after Sharir (1981), then a depth-first walk in post-order; linear in declarations and uses.
pub fn find(program: &mut Program, findings: &mut Vec<Finding>) {
    let groups = kosaraju_scc(&program.graph);
    let mut waiting: Vec<NodeIndex> = program.broken.iter().copied().collect();
    for group in &groups {
        if let Some(finding) = report(program, group) {
            findings.push(finding);
            waiting.extend(group);
        }
    }
    while let Some(node) = waiting.pop() {
        program.broken.insert(node);
        for user in program.graph.neighbors_directed(node, Direction::Incoming) {
            if !program.broken.contains(&user) {
                waiting.push(user);
            }
        }
    }
    program.order = dependencies_first(program);
}

/// The sound nodes in the order of the files, each behind what it uses.
fn dependencies_first(program: &Program) -> Vec<NodeIndex> {
    let mut walk = DfsPostOrder::empty(&program.graph);
    let mut order = Vec::new();
    for start in program.graph.node_indices() {
        if program.broken.contains(&start) {
            continue;
        }
        walk.move_to(start);
        while let Some(node) = walk.next(&program.graph) {
            order.push(node);
        }
    }
    order
}

fn report(program: &Program, group: &[NodeIndex]) -> Option<Finding> {
    let path = circle(&program.graph, group)?;
    let &(_, first) = path.first()?;
    let mut names: Vec<&str> = path
        .iter()
        .map(|&(node, _)| program.graph[node].name.as_str())
        .collect();
    names.push(names[0]);
    let message = format!("`{}` depends on itself: {}", names[0], names.join(" → "));
    let mut finding = Finding::new(catalogue::CYCLE, first.span, message);
    if let [only, _] = names[..] {
        return Some(finding.label("its own name").help(format!(
            "a declaration cannot use itself; to build on another `{only}`, give this one a name of its own"
        )));
    }
    finding = finding
        .label(format!("`{}` uses `{}` here", names[0], names[1]))
        .help("one of these has to be built without the others");
    for (step, (_, edge)) in path.iter().enumerate().skip(1) {
        finding = finding.related(
            edge.span,
            format!("`{}` uses `{}` here", names[step], names[step + 1]),
        );
    }
    Some(finding)
}
