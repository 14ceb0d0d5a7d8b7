//! The diagram as a picture that stands alone (Scalable Vector Graphics 1.1, W3C, 2011).

use std::fmt::Write;

use super::layout::{Layout, NODE_HEIGHT, Route, layout};
use super::{Diagram, DiagramNode, colors, second_line};
use crate::finding::render::width_of;
use crate::report::html::escaped;
use crate::report::model::Verdict;

const MARGIN: f64 = 20.0;
const TITLE: f64 = 34.0;
const LEGEND: f64 = 56.0;
const LEAST_WIDTH: f64 = 560.0;
const COLUMN_GAP: f64 = 64.0;
const WIDEST_GAP: f64 = 160.0;
const LONGEST_TEXT: usize = 30;

const STYLE: &str = "text{font-family:Helvetica,Arial,'Liberation Sans','DejaVu Sans',sans-serif;\
font-size:12px;fill:#1b1f24}.t{font-size:16px;font-weight:bold}.n{font-size:13px;font-weight:bold}\
.s{fill:#4a545e}.f{font-size:11px;fill:#4a545e}.e{fill:none;stroke:#59636e;stroke-width:1.3}\
.b{stroke:#a33a00;stroke-dasharray:5 3}.l{fill:#f7f8fa;stroke:#d1d9e0}.w{fill:none;stroke:#fff;\
stroke-width:1.8;stroke-linecap:round;stroke-linejoin:round}";

/// The drawing as an SVG document; equal diagrams give equal bytes.
pub fn svg(diagram: &Diagram) -> String {
    let layout = layout(diagram);
    let columns = Columns::new(diagram, &layout);
    let legend = legend(diagram, &layout);
    let title_width = width_of(&diagram.title) as f64 * 10.5;
    let inner = columns
        .right
        .max(title_width)
        .max(legend.1)
        .max(LEAST_WIDTH);
    let (width, height) = (
        inner + 2.0 * MARGIN,
        2.0 * MARGIN + TITLE + layout.height + LEGEND,
    );
    let mut out = format!(
        "<svg xmlns=\"http://www.w3.org/2000/svg\" width=\"{width:.0}\" height=\"{height:.0}\" \
         viewBox=\"0 0 {width:.0} {height:.0}\" role=\"img\">\n<title>{0}</title>\n\
         <style>{STYLE}</style>\n\
         <defs><marker id=\"a\" viewBox=\"0 0 8 8\" refX=\"7\" refY=\"4\" markerWidth=\"7\" \
         markerHeight=\"7\" orient=\"auto\"><path d=\"M0 0.8 L7.5 4 L0 7.2 z\" fill=\"#59636e\"/>\
         </marker></defs>\n\
         <rect width=\"100%\" height=\"100%\" fill=\"#fff\"/>\n\
         <text class=\"t\" x=\"{MARGIN}\" y=\"{1}\">{0}</text>\n",
        escaped(&diagram.title),
        MARGIN + 16.0,
    );
    let _ = writeln!(
        out,
        "<g transform=\"translate({MARGIN} {})\">",
        MARGIN + TITLE
    );
    lanes(&mut out, diagram, &layout, inner);
    if diagram.nodes.is_empty() {
        out.push_str("<text x=\"0\" y=\"0\">nothing is declared</text>\n");
    }
    let ports = Ports::new(&layout);
    for (index, route) in layout.routes.iter().enumerate() {
        edge(&mut out, &layout, &columns, route, ports.of(index));
    }
    for (index, node) in diagram.nodes.iter().enumerate() {
        let slot = &layout.slots[index];
        let (x, wide) = columns.places[slot.layer];
        if diagram.edges.contains(&(index, index)) {
            loop_edge(&mut out, x + wide, slot.y);
        }
        boxed(&mut out, node, x, slot.y - NODE_HEIGHT / 2.0, wide);
    }
    let _ = writeln!(
        out,
        "</g>\n<g transform=\"translate({MARGIN} {})\">",
        height - LEGEND
    );
    out.push_str(&legend.0);
    out.push_str("</g>\n</svg>\n");
    out
}

/// Left edge and width of each layer's boxes.
struct Columns {
    places: Vec<(f64, f64)>,
    right: f64,
}

impl Columns {
    fn new(diagram: &Diagram, layout: &Layout) -> Columns {
        let mut widths = vec![72f64; layout.layers];
        for (node, slot) in diagram.nodes.iter().zip(&layout.slots) {
            let name = width_of(&short(&node.name)) as f64 * 8.6;
            let second = width_of(&short(&second_line(node))) as f64 * 7.2;
            let badge = if node.verdict.is_some() { 20.0 } else { 0.0 };
            widths[slot.layer] = widths[slot.layer].max((name + badge).max(second) + 24.0);
        }
        let framed = if diagram.files.len() > 1 { 14.0 } else { 0.0 };
        // Many edges need room to be told apart.
        let mut passing = vec![0usize; layout.layers];
        for route in &layout.routes {
            for &slot in &route.slots[..route.slots.len() - 1] {
                passing[layout.slots[slot].layer] += 1;
            }
        }
        let (mut x, mut gap) = (framed, 0.0);
        let mut places = Vec::new();
        for (width, passing) in widths.into_iter().zip(passing) {
            places.push((x, width.round()));
            gap = COLUMN_GAP + (passing as f64 * 1.5).min(WIDEST_GAP - COLUMN_GAP);
            x += width.round() + gap;
        }
        Columns {
            places,
            right: x - gap + framed,
        }
    }
}

/// Where edges leave and reach the boxes: spread over a side, in the order of their other ends.
struct Ports(Vec<(f64, f64)>);

impl Ports {
    fn new(layout: &Layout) -> Ports {
        let mut ports = vec![(0.0, 0.0); layout.routes.len()];
        for leaving in [true, false] {
            let mut ends: Vec<(usize, f64, usize)> = layout
                .routes
                .iter()
                .enumerate()
                .map(|(index, route)| {
                    let slots = &route.slots;
                    let (own, next) = match leaving {
                        true => (slots[0], slots[1]),
                        false => (slots[slots.len() - 1], slots[slots.len() - 2]),
                    };
                    (own, layout.slots[next].y, index)
                })
                .collect();
            ends.sort_by(|one, other| one.0.cmp(&other.0).then(one.1.total_cmp(&other.1)));
            for group in ends.chunk_by(|one, other| one.0 == other.0) {
                let step = (NODE_HEIGHT - 14.0) / group.len() as f64;
                for (at, &(_, _, index)) in group.iter().enumerate() {
                    let offset = (at as f64 - (group.len() - 1) as f64 / 2.0) * step.min(9.0);
                    if leaving {
                        ports[index].0 = offset;
                    } else {
                        ports[index].1 = offset;
                    }
                }
            }
        }
        Ports(ports)
    }

    fn of(&self, route: usize) -> (f64, f64) {
        self.0[route]
    }
}

fn lanes(out: &mut String, diagram: &Diagram, layout: &Layout, width: f64) {
    if diagram.files.len() < 2 {
        return;
    }
    for (name, place) in diagram.files.iter().zip(&layout.lanes) {
        if let Some((top, height)) = place {
            let _ = writeln!(
                out,
                "<rect class=\"l\" x=\"0\" y=\"{top:.1}\" width=\"{width:.0}\" \
                 height=\"{height:.1}\" rx=\"6\"/>\n<text class=\"f\" x=\"10\" y=\"{:.1}\">{}</text>",
                top + 16.0,
                escaped(name)
            );
        }
    }
}

fn edge(out: &mut String, layout: &Layout, columns: &Columns, route: &Route, ports: (f64, f64)) {
    let last = route.slots.len() - 1;
    // Pieces of four points, as a cubic has them, from left to right.
    let mut pieces: Vec<[(f64, f64); 4]> = Vec::new();
    let (mut x, mut y) = (0.0, 0.0);
    for (at, &index) in route.slots.iter().enumerate() {
        let slot = &layout.slots[index];
        let (left, wide) = columns.places[slot.layer];
        if at == 0 {
            (x, y) = (left + wide, slot.y + ports.0);
            continue;
        }
        let next = slot.y + if at == last { ports.1 } else { 0.0 };
        // At least half a gap of bend, also where a circle leads back or stays in its layer.
        let bend = ((left - x) / 2.0).abs().max(COLUMN_GAP / 2.0);
        pieces.push([(x, y), (x + bend, y), (left - bend, next), (left, next)]);
        (x, y) = (left, next);
        if at != last {
            pieces.push([(x, y), (x, y), (x + wide, y), (x + wide, y)]);
            x += wide;
        }
    }
    if route.backward {
        pieces.reverse();
        pieces.iter_mut().for_each(|piece| piece.reverse());
    }
    let mut path = String::new();
    for (at, [start, bend, other_bend, end]) in pieces.into_iter().enumerate() {
        if at == 0 {
            let _ = write!(path, "M{:.1} {:.1}", start.0, start.1);
        }
        let _ = write!(
            path,
            " C{:.1} {:.1} {:.1} {:.1} {:.1} {:.1}",
            bend.0, bend.1, other_bend.0, other_bend.1, end.0, end.1
        );
    }
    let class = if route.backward { "e b" } else { "e" };
    let _ = writeln!(
        out,
        "<path class=\"{class}\" d=\"{path}\" marker-end=\"url(#a)\"/>"
    );
}

fn loop_edge(out: &mut String, x: f64, y: f64) {
    let (top, bottom) = (y - 8.0, y + 8.0);
    let bend = x + 26.0;
    let _ = writeln!(
        out,
        "<path class=\"e b\" d=\"M{x:.1} {top:.1} C{bend:.1} {top:.1} {bend:.1} {bottom:.1} \
         {x:.1} {bottom:.1}\" marker-end=\"url(#a)\"/>"
    );
}

fn boxed(out: &mut String, node: &DiagramNode, x: f64, y: f64, width: f64) {
    let (outline, fill) = colors(&node.kind);
    let dashes = if node.library {
        " stroke-dasharray=\"4 2.5\""
    } else {
        ""
    };
    let second = second_line(node);
    let verdict = node.verdict.map(|verdict| format!(" ({})", verdict.word()));
    let whole = format!("{}: {second}{}", node.name, verdict.unwrap_or_default());
    let _ = writeln!(
        out,
        "<g><title>{}</title><rect x=\"{x:.1}\" y=\"{y:.1}\" width=\"{width:.0}\" \
         height=\"{NODE_HEIGHT}\" rx=\"5\" fill=\"{fill}\" stroke=\"{outline}\" \
         stroke-width=\"1.5\"{dashes}/><text class=\"n\" x=\"{2:.1}\" y=\"{3:.1}\">{4}</text>\
         <text class=\"s\" x=\"{2:.1}\" y=\"{5:.1}\">{6}</text>{1}</g>",
        escaped(&whole),
        node.verdict.map_or(String::new(), |verdict| badge(
            verdict,
            x + width - 14.0,
            y + 13.0
        )),
        x + 10.0,
        y + 17.0,
        escaped(&short(&node.name)),
        y + 32.0,
        escaped(&short(&second)),
    );
}

/// A verdict as a mark told apart by form as well as by colour.
fn badge(verdict: Verdict, x: f64, y: f64) -> String {
    let (left, right) = (x - 3.0, x + 3.0);
    match verdict {
        Verdict::Holds => format!(
            "<circle cx=\"{x:.1}\" cy=\"{y:.1}\" r=\"7\" fill=\"#007a59\"/><path class=\"w\" \
             d=\"M{left:.1} {y:.1} l2.2 2.6 l4 -5\"/>"
        ),
        Verdict::Fails => {
            let (top, bottom) = (y - 3.0, y + 3.0);
            format!(
                "<rect x=\"{:.1}\" y=\"{:.1}\" width=\"14\" height=\"14\" fill=\"#c24a00\"/><path \
                 class=\"w\" d=\"M{left:.1} {top:.1} L{right:.1} {bottom:.1} M{right:.1} {top:.1} \
                 L{left:.1} {bottom:.1}\"/>",
                x - 7.0,
                y - 7.0
            )
        }
        Verdict::Undecided => format!(
            "<path d=\"M{x:.1} {:.1} l8 8 l-8 8 l-8 -8 z\" fill=\"#7a6a00\"/><path class=\"w\" \
             d=\"M{left:.1} {y:.1} h0.01 M{x:.1} {y:.1} h0.01 M{right:.1} {y:.1} h0.01\"/>",
            y - 8.0
        ),
    }
}

/// The legend of what occurs, and its width.
fn legend(diagram: &Diagram, layout: &Layout) -> (String, f64) {
    let mut out = String::from(
        "<path class=\"e\" d=\"M0 8 H34\" marker-end=\"url(#a)\"/><text class=\"f\" x=\"42\" \
         y=\"12\">leads from what is used to what uses it",
    );
    let circular = layout.routes.iter().any(|route| route.backward)
        || diagram.edges.iter().any(|(user, used)| user == used);
    if circular {
        out.push_str("; dashed where that closes a circle");
    }
    out.push_str("</text>\n");
    let mut x = 0.0;
    let mut item = |mark: String, text: &str| {
        let _ = writeln!(
            out,
            "<g transform=\"translate({x:.0} 26)\">{mark}<text class=\"f\" x=\"24\" \
             y=\"11\">{text}</text></g>"
        );
        x += 24.0 + width_of(text) as f64 * 6.2 + 18.0;
    };
    for kind in ["field", "let", "matrix", "code", "channel", "deliver"] {
        if diagram.nodes.iter().any(|node| node.kind == kind) {
            let (outline, fill) = colors(kind);
            let mark = format!(
                "<rect width=\"18\" height=\"14\" rx=\"3\" fill=\"{fill}\" stroke=\"{outline}\" \
                 stroke-width=\"1.5\"/>"
            );
            item(mark, kind);
        }
    }
    if diagram.nodes.iter().any(|node| node.library) {
        let mark = "<rect width=\"18\" height=\"14\" rx=\"3\" fill=\"#fff\" stroke=\"#59636e\" \
                    stroke-width=\"1.5\" stroke-dasharray=\"4 2.5\"/>";
        item(mark.to_string(), "library");
    }
    for verdict in [Verdict::Holds, Verdict::Fails, Verdict::Undecided] {
        if diagram
            .nodes
            .iter()
            .any(|node| node.verdict == Some(verdict))
        {
            item(badge(verdict, 10.0, 7.0), verdict.word());
        }
    }
    (out, x)
}

/// A text cut to what a box can hold.
fn short(text: &str) -> String {
    if width_of(text) <= LONGEST_TEXT {
        return text.to_string();
    }
    let mut short = String::new();
    for character in text.chars() {
        if width_of(&short) + 2 > LONGEST_TEXT {
            break;
        }
        short.push(character);
    }
    short + "…"
}
