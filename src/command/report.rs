//! `cosetta report`: all that is derived.

use super::{Specs, complain, files, output_style, print, progress::Bar, show_findings, status};
use crate::finding::render;
use crate::project::{self, Options};
use crate::report::{self, Report, describe::describe};
use clap::{Args, ValueEnum};
use std::process::ExitCode;

/// Arguments of `report`.
#[derive(Args)]
pub struct Arguments {
    #[command(flatten)]
    specs: Specs,
    /// Only this code; may be given more than once
    #[arg(long, value_name = "NAME")]
    code: Vec<String>,
    /// How the report is written
    #[arg(long, value_enum, default_value = "text")]
    format: Format,
}

#[derive(Clone, Copy, ValueEnum)]
enum Format {
    Text,
    Json,
    Markdown,
    Html,
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
        let declared = |name: &String| {
            view.program
                .graph
                .node_weights()
                .any(|node| node.name == *name && !node.library)
        };
        if let Some(missing) = arguments.code.iter().find(|name| !declared(name)) {
            return complain(&format!("there is no code `{missing}` in these specs"));
        }
        let codes = view
            .codes
            .iter()
            .map(|checked| describe(&view, checked))
            .collect();
        let report = Report::new(codes, render::json(&view.findings, view.sources));
        match arguments.format {
            Format::Json => print(&format!("{:#}\n", report::json(&report))),
            Format::Text => {
                show_findings(&view.findings, view.sources);
                print(&report::text(&report, output_style()));
            }
            Format::Markdown => print(&report::markdown(&report)),
            Format::Html => print(&report::html(&report)),
        }
        status(project::class(&view.findings))
    })
}
