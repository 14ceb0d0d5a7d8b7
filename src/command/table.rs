//! `cosetta table`: a family's members side by side.

use super::{Specs, complain, files, output_style, print, progress::Bar, show_findings, status};
use crate::derive::Verdict;
use crate::project::{self, Options, View};
use crate::report::describe;
use crate::report::table::{FamilyTable, Figures, Member};
use clap::{Args, ValueEnum};
use std::process::ExitCode;

/// Arguments of `table`.
#[derive(Args)]
pub struct Arguments {
    #[command(flatten)]
    specs: Specs,
    /// Only this family; may be given more than once
    #[arg(long, value_name = "NAME")]
    code: Vec<String>,
    /// How the table is written
    #[arg(long, value_enum, default_value = "text")]
    format: Format,
}

#[derive(Clone, Copy, ValueEnum)]
enum Format {
    Text,
    Csv,
    Json,
}

pub(super) fn run(arguments: &Arguments) -> ExitCode {
    let files = match files::specs(&arguments.specs.files) {
        Ok(files) => files,
        Err(message) => return complain(&message),
    };
    let options = Options {
        seconds: arguments.specs.budget,
        only: arguments.code.clone(),
        ..Options::default()
    };
    project::run(&files, &files::Disk, &options, &Bar::new(), |view| {
        show_findings(&view.findings, view.sources);
        let tables = tables(&view);
        let written: Vec<String> = match arguments.format {
            Format::Text => tables
                .iter()
                .map(|table| table.text(output_style()))
                .collect(),
            Format::Csv => tables.iter().map(FamilyTable::csv).collect(),
            Format::Json if tables.len() == 1 => vec![format!("{:#}\n", tables[0].json())],
            Format::Json => {
                let all: Vec<serde_json::Value> = tables.iter().map(FamilyTable::json).collect();
                vec![format!("{:#}\n", serde_json::Value::Array(all))]
            }
        };
        print(&written.join("\n"));
        if tables.is_empty() {
            return complain(
                "these specs declare no family with a finite domain, as in `code name(r in 2..8)`",
            );
        }
        status(project::class(&view.findings))
    })
}

/// One table for each family that has members.
fn tables(view: &View) -> Vec<FamilyTable> {
    let mut tables: Vec<FamilyTable> = Vec::new();
    for checked in &view.codes {
        let compiled = &checked.compiled;
        if compiled.arguments.is_empty() {
            continue;
        }
        let summary = describe::summary(view, checked);
        let verdicts = summary.requirements.iter().map(|entry| entry.verdict);
        let verdict = verdicts.max_by_key(|verdict| match verdict {
            Verdict::Holds => 0,
            Verdict::Undecided => 1,
            Verdict::Fails => 2,
        });
        let says = summary
            .requirements
            .iter()
            .find(|entry| Some(entry.verdict) == verdict && entry.verdict != Verdict::Holds)
            .map(|entry| format!("{}: {}", entry.text, entry.says));
        let member = Member {
            arguments: summary.arguments,
            figures: Some(Figures::new(summary.n, summary.k, summary.d)),
            verdict,
            says,
        };
        match tables.iter_mut().find(|table| table.name == compiled.name) {
            Some(table) => table.members.push(member),
            None => tables.push(FamilyTable::new(&compiled.name, vec![member])),
        }
    }
    tables
}
