//! The members of a family side by side.

use serde_json::{Map, Value, json};

use super::document::Block;
use super::model::{Interval, Verdict, plain_value};
use super::text::blocks;
use crate::finding::render::Style;

/// A family and those of its members that were asked for.
#[derive(Clone, PartialEq, Debug)]
pub struct FamilyTable {
    /// The family's name.
    pub name: String,
    /// One entry a member, in the order of the parameters' domains.
    pub members: Vec<Member>,
}

/// One member of a family.
#[derive(Clone, PartialEq, Debug)]
pub struct Member {
    /// The arguments by name, in the order of the parameters.
    pub arguments: Map<String, Value>,
    /// What it is; `None` when it cannot be compiled.
    pub figures: Option<Figures>,
    /// The worst verdict of its claims and requirements; `None` when it has none.
    pub verdict: Option<Verdict>,
    /// A remark: why it fails, or cannot be compiled.
    pub says: Option<String>,
}

/// The parameters of a member.
#[derive(Clone, PartialEq, Debug)]
pub struct Figures {
    /// The length.
    pub n: usize,
    /// The dimension.
    pub k: usize,
    /// What is known of the distance.
    pub d: Interval,
    /// k/n in lowest terms.
    pub rate: String,
    /// n − k.
    pub redundancy: usize,
}

impl Figures {
    /// The parameters of an [n, k] code.
    pub fn new(n: usize, k: usize, d: Interval) -> Figures {
        Figures {
            n,
            k,
            d,
            rate: super::model::rate(n, k),
            redundancy: n.saturating_sub(k),
        }
    }
}

impl FamilyTable {
    /// The table of these members.
    pub fn new(name: impl Into<String>, members: Vec<Member>) -> FamilyTable {
        FamilyTable {
            name: name.into(),
            members,
        }
    }

    /// The names of the parameters, those of the first member first.
    fn parameters(&self) -> Vec<&str> {
        let mut names: Vec<&str> = Vec::new();
        for member in &self.members {
            for name in member.arguments.keys() {
                if !names.contains(&name.as_str()) {
                    names.push(name);
                }
            }
        }
        names
    }

    /// As aligned text, with a line of heads.
    pub fn text(&self, style: Style) -> String {
        let parameters = self.parameters();
        let with_remarks = self.members.iter().any(|member| member.says.is_some());
        let mut head: Vec<String> = parameters.iter().map(|name| name.to_string()).collect();
        head.extend(["n", "k", "d", "rate", "redundancy", "verdict"].map(str::to_string));
        let mut numeric = vec![true; parameters.len()];
        numeric.extend([true, true, true, true, true, false]);
        if with_remarks {
            head.push("remark".to_string());
            numeric.push(false);
        }
        let rows = self.members.iter().map(|member| {
            let mut row = member.values(&parameters);
            match &member.figures {
                Some(figures) => row.extend([
                    figures.n.to_string(),
                    figures.k.to_string(),
                    match figures.k {
                        0 if figures.d == Interval::default() => "–".to_string(),
                        _ => figures.d.to_string(),
                    },
                    figures.rate.clone(),
                    figures.redundancy.to_string(),
                ]),
                None => row.extend(std::iter::repeat_n("–".to_string(), 5)),
            }
            row.push(member.verdict.map_or("", Verdict::word).to_string());
            if with_remarks {
                row.push(member.says.clone().unwrap_or_default());
            }
            row
        });
        let rows = rows.collect();
        let heading = Block::Heading(self.name.clone());
        let table = Block::Table {
            head,
            numeric,
            rows,
        };
        blocks(&[heading, table], style)
            .trim_start_matches('\n')
            .to_string()
    }

    /// As CSV with a header line (RFC 4180, lines ended by a line feed); numbers without units, d
    /// as two columns, empty where nothing is known.
    pub fn csv(&self) -> String {
        let parameters = self.parameters();
        let mut head: Vec<String> = parameters.iter().map(|name| name.to_string()).collect();
        let fixed = [
            "n",
            "k",
            "d_lower",
            "d_upper",
            "rate",
            "redundancy",
            "verdict",
            "says",
        ];
        head.extend(fixed.map(str::to_string));
        let number = |value: Option<u64>| value.map_or(String::new(), |value| value.to_string());
        let mut out = line(&head);
        for member in &self.members {
            let mut row = member.values(&parameters);
            match &member.figures {
                Some(figures) => row.extend([
                    figures.n.to_string(),
                    figures.k.to_string(),
                    number(figures.d.lower),
                    number(figures.d.upper),
                    figures.rate.clone(),
                    figures.redundancy.to_string(),
                ]),
                None => row.extend(std::iter::repeat_n(String::new(), 6)),
            }
            row.push(member.verdict.map_or("", Verdict::word).to_string());
            row.push(member.says.clone().unwrap_or_default());
            out.push_str(&line(&row));
        }
        out
    }

    /// As JSON: `{format, version, name, members: [{arguments, n, k, d, rate, redundancy, verdict,
    /// says}]}`, with null for what is not known.
    pub fn json(&self) -> Value {
        let members: Vec<Value> = self
            .members
            .iter()
            .map(|member| {
                let figures = member.figures.as_ref();
                json!({
                    "arguments": member.arguments,
                    "n": figures.map(|figures| figures.n),
                    "k": figures.map(|figures| figures.k),
                    "d": figures.map(|figures| figures.d),
                    "rate": figures.map(|figures| &figures.rate),
                    "redundancy": figures.map(|figures| figures.redundancy),
                    "verdict": member.verdict,
                    "says": member.says,
                })
            })
            .collect();
        json!({
            "format": "cosetta-table",
            "version": 1,
            "name": self.name,
            "members": members,
        })
    }
}

impl Member {
    fn values(&self, parameters: &[&str]) -> Vec<String> {
        parameters
            .iter()
            .map(|&name| {
                self.arguments
                    .get(name)
                    .map(plain_value)
                    .unwrap_or_default()
            })
            .collect()
    }
}

fn line(cells: &[String]) -> String {
    let cells: Vec<String> = cells
        .iter()
        .map(|cell| match cell.contains(['"', ',', '\n', '\r']) {
            true => format!("\"{}\"", cell.replace('"', "\"\"")),
            false => cell.clone(),
        })
        .collect();
    cells.join(",") + "\n"
}
