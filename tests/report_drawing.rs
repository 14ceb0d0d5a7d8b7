//! The dependency graph as a picture.

use cosetta::report::drawing::{Diagram, DiagramNode, dot, svg};
use cosetta::report::model::Verdict;

fn node(
    name: &str,
    kind: &str,
    caption: &str,
    file: usize,
    verdict: Option<Verdict>,
) -> DiagramNode {
    DiagramNode {
        name: name.into(),
        kind: kind.into(),
        caption: caption.into(),
        library: file == 2,
        file,
        verdict,
    }
}

fn small() -> Diagram {
    Diagram {
        title: "sram.coset".into(),
        files: vec!["sram.coset".into()],
        nodes: vec![
            node("bit", "field", "GF(2)", 0, None),
            node("sram_word", "code", "[72, 64, 4]", 0, Some(Verdict::Holds)),
            node("sram_word → out", "deliver", "", 0, None),
        ],
        edges: vec![(1, 0), (2, 1)],
    }
}

fn harrow() -> Diagram {
    use Verdict::{Fails, Holds, Undecided};
    Diagram {
        title: "Harrow Sound: memory, flash, radio link, shore archive".into(),
        files: vec!["gauge.coset".into(), "shore.coset".into(), "library".into()],
        nodes: vec![
            node("bit", "field", "GF(2)", 0, None),
            node("byte", "field", "GF(256)", 1, None),
            node("sea", "channel", "bsc(0.004)", 0, None),
            node("sram_word", "code", "[72, 64, 4]", 0, Some(Holds)),
            node("odd_columns", "matrix", "8 × 72", 0, None),
            node("cache_line", "code", "[72, 64, 4]", 0, Some(Fails)),
            node("outer", "code", "[60, 44, 17]", 1, None),
            node("inner", "code", "[128, 8, 64]", 1, None),
            node(
                "frame",
                "code",
                "[7680, 352, 1088..1152]",
                1,
                Some(Undecided),
            ),
            node("shards", "code", "[14, 10, 5]", 1, Some(Holds)),
            node("hamming", "code", "", 2, None),
            node("reed_solomon", "code", "", 2, None),
            node("reed_muller", "code", "", 2, None),
            node("sram_word → out", "deliver", "mtx, npy, sv", 0, None),
            node("frame → link", "deliver", "alist", 1, None),
        ],
        edges: vec![
            (3, 0),
            (3, 10),
            (4, 0),
            (5, 4),
            (6, 1),
            (6, 11),
            (7, 0),
            (7, 12),
            (8, 6),
            (8, 7),
            (8, 2),
            (9, 1),
            (13, 3),
            (14, 8),
        ],
    }
}

/// Forty nodes with edges by a fixed rule.
fn large() -> Diagram {
    let kinds = ["field", "matrix", "code", "code", "code", "deliver"];
    let nodes = (0..40usize)
        .map(|at| {
            let kind = kinds[(at / 7).min(5)];
            let verdict = match (kind, at % 5) {
                ("code", 0) => Some(Verdict::Fails),
                ("code", 1 | 2) => Some(Verdict::Holds),
                ("code", 3) => Some(Verdict::Undecided),
                _ => None,
            };
            node(
                &format!("{kind}_{at}"),
                kind,
                "[24, 12, 8]",
                at % 3,
                verdict,
            )
        })
        .collect();
    let edges = (7..40usize)
        .flat_map(|at| {
            let band = at / 7 * 7;
            [
                (at, (at * 5) % band),
                (at, band - 1 - (at * 3) % 7),
                (at, (at * 11 + 3) % band),
            ]
        })
        .collect();
    Diagram {
        title: "forty declarations".into(),
        files: vec!["gauge.coset".into(), "shore.coset".into(), "library".into()],
        nodes,
        edges,
    }
}

#[test]
fn a_small_graph_is_drawn() {
    insta::assert_snapshot!(svg(&small()));
}

#[test]
fn a_graph_of_several_files_is_described_for_graphviz() {
    insta::assert_snapshot!(dot(&harrow()));
}

/// The numbers of an attribute in all elements of the given class of boxes.
fn boxes(picture: &str) -> Vec<(f64, f64, f64, f64)> {
    let number = |text: &str, key: &str| -> f64 {
        let start = text.find(&format!(" {key}=\"")).unwrap() + key.len() + 3;
        let end = text[start..].find('"').unwrap() + start;
        text[start..end].parse().unwrap()
    };
    picture
        .split("</title><rect")
        .skip(1)
        .map(|text| {
            (
                number(text, "x"),
                number(text, "y"),
                number(text, "width"),
                number(text, "height"),
            )
        })
        .collect()
}

#[test]
fn no_box_lies_on_another_and_users_stand_to_the_right() {
    for diagram in [small(), harrow(), large()] {
        let picture = svg(&diagram);
        let boxes = boxes(&picture);
        assert_eq!(boxes.len(), diagram.nodes.len());
        for (at, one) in boxes.iter().enumerate() {
            for other in &boxes[..at] {
                let apart = one.0 + one.2 <= other.0
                    || other.0 + other.2 <= one.0
                    || one.1 + one.3 <= other.1
                    || other.1 + other.3 <= one.1;
                assert!(apart, "{one:?} {other:?}");
            }
        }
        for &(user, used) in &diagram.edges {
            assert!(
                boxes[user].0 >= boxes[used].0 + boxes[used].2,
                "{user} uses {used}"
            );
        }
    }
}

#[test]
fn equal_diagrams_give_equal_pictures() {
    let mut turned = large();
    turned.edges.reverse();
    turned.edges.extend(turned.edges.clone());
    assert_eq!(svg(&turned), svg(&large()));
    assert_eq!(dot(&turned), dot(&large()));
}

#[test]
fn names_are_text_and_never_markup() {
    let mut diagram = small();
    diagram.nodes[0].name = "<b a=\"'&\u{1b}".into();
    diagram.nodes[0].caption = "\\\"\nx".into();
    let picture = svg(&diagram);
    assert!(!picture.contains("<b ") && !picture.contains('\u{1b}'));
    assert!(picture.contains("&lt;b a=&quot;&#39;&amp;?"));
    assert!(dot(&diagram).contains(r#"label="<b a=\"'&?\nfield \\\"\nx""#));
}

#[test]
fn circles_and_gaps_are_drawn_too() {
    let mut diagram = small();
    diagram.edges = vec![(0, 1), (1, 0), (1, 2), (2, 2), (7, 9)];
    let picture = svg(&diagram);
    assert!(picture.contains("closes a circle"));
    assert_eq!(boxes(&picture).len(), 3);
    let empty = Diagram::default();
    assert!(svg(&empty).contains("nothing is declared"));
    assert!(dot(&empty).starts_with("digraph \"\" {"));
}

#[test]
fn two_thousand_declarations_are_no_trouble() {
    let nodes = (0..2000)
        .map(|at| node(&format!("code_{at}"), "code", "", at % 3, None))
        .collect();
    let edges = (10..2000)
        .flat_map(|at| [(at, at - 10), (at, at * 7 % at.min(300))])
        .collect();
    let diagram = Diagram {
        title: "many".into(),
        files: vec!["a".into(), "b".into(), "c".into()],
        nodes,
        edges,
    };
    assert_eq!(boxes(&svg(&diagram)).len(), 2000);
}
