//! `cosetta check`: claims and requirements.

use super::{Specs, complain, files, output_style, print, progress::Bar, show_findings, status};
use crate::derive::Verdict;
use crate::finding::render;
use crate::project::{self, Checked, Options, View};
use clap::{Args, ValueEnum};
use std::process::ExitCode;

/// Arguments of `check`.
#[derive(Args)]
pub struct Arguments {
    #[command(flatten)]
    specs: Specs,
    /// How the findings are printed
    #[arg(long, value_enum, default_value = "text")]
    format: Format,
}

#[derive(Clone, Copy, ValueEnum)]
enum Format {
    Text,
    Json,
    Sarif,
}

pub(super) fn run(arguments: &Arguments) -> ExitCode {
    let files = match files::specs(&arguments.specs.files) {
        Ok(files) => files,
        Err(message) => return complain(&message),
    };
    let options = Options {
        seconds: arguments.specs.budget,
        ..Options::default()
    };
    project::run(&files, &files::Disk, &options, &Bar::new(), |view| {
        match arguments.format {
            Format::Text => text(&view),
            Format::Json => print(&format!("{:#}\n", json(&view))),
            Format::Sarif => print(&format!(
                "{:#}\n",
                render::sarif(&view.findings, view.sources)
            )),
        }
        status(project::class(&view.findings))
    })
}

fn text(view: &View) {
    show_findings(&view.findings, view.sources);
    let width = view
        .codes
        .iter()
        .map(|checked| checked.compiled.title().len())
        .max()
        .unwrap_or(0);
    let style = output_style();
    for checked in &view.codes {
        let verdict = worst(checked);
        let colour = match verdict {
            Verdict::Holds => "32",
            Verdict::Fails => "31",
            Verdict::Undecided => "33",
        };
        print(&format!(
            "{} {:width$}  {}  {}\n",
            style.paint(colour, &format!("{:9}", verdict.word())),
            checked.compiled.title(),
            view.parameters(checked),
            counted(checked),
        ));
    }
}

/// The worst verdict of a code's clauses; a preference does not count.
fn worst(checked: &Checked) -> Verdict {
    let mut worst = Verdict::Holds;
    for clause in &checked.verdicts.clauses {
        if clause.kind != crate::require::Kind::Prefer {
            worst = match (worst, clause.judgement.verdict) {
                (Verdict::Fails, _) | (_, Verdict::Fails) => Verdict::Fails,
                (Verdict::Undecided, _) | (_, Verdict::Undecided) => Verdict::Undecided,
                _ => Verdict::Holds,
            };
        }
    }
    worst
}

fn counted(checked: &Checked) -> String {
    let total = checked.verdicts.clauses.len();
    let held = checked
        .verdicts
        .clauses
        .iter()
        .filter(|clause| clause.judgement.verdict == Verdict::Holds)
        .count();
    match total {
        0 => "nothing is claimed".to_string(),
        1 if held == 1 => "its one clause holds".to_string(),
        _ if held == total => format!("all {total} clauses hold"),
        _ => format!("{held} of {total} clauses hold"),
    }
}

fn json(view: &View) -> serde_json::Value {
    let codes: Vec<serde_json::Value> = view
        .codes
        .iter()
        .map(|checked| {
            let report = crate::report::describe::summary(view, checked);
            serde_json::to_value(report).expect("plain data")
        })
        .collect();
    serde_json::json!({
        "format": "cosetta-check",
        "version": 1,
        "codes": codes,
        "findings": render::json(&view.findings, view.sources),
    })
}
