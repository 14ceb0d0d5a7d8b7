//! The command line: one file a subcommand. Parses arguments, calls the library, prints, and sets
//! the exit status; nothing is decided here.

mod check;
mod draw;
mod emit;
mod explain;
mod files;
mod progress;
mod report;
mod table;

use crate::finding::render::{self, Style};
use crate::finding::{Class, Finding};
use crate::source::Sources;
use clap::{Args, Parser, Subcommand};
use std::io::IsTerminal;
use std::process::ExitCode;

/// Says which error-correcting code is meant, and proves what it does.
#[derive(Parser)]
#[command(name = "cosetta", version, about, max_term_width = 100)]
struct Line {
    #[command(subcommand)]
    command: Command,
}

#[derive(Subcommand)]
enum Command {
    /// Prove or refute every claim and requirement
    Check(check::Arguments),
    /// Show all that is derived of each code, with its grounds
    Report(report::Arguments),
    /// Show the members of a family side by side
    Table(table::Arguments),
    /// Write matrices to files
    Emit(emit::Arguments),
    /// Draw what depends on what
    Graph(draw::Arguments),
    /// Explain a word of the language, a requirement or a finding
    Explain(explain::Arguments),
}

/// The specs that a command works on, and what it may spend.
#[derive(Args)]
struct Specs {
    /// Specs; a folder stands for every *.coset below it
    #[arg(required = true, value_name = "FILE")]
    files: Vec<String>,
    /// Work allowed on each code, in nominal seconds of one core
    #[arg(long, value_name = "TIME", default_value = "10s", value_parser = seconds)]
    budget: f64,
}

/// `60s`, `2m`, `500ms` or plain seconds.
fn seconds(text: &str) -> Result<f64, String> {
    let (number, scale) = [("ms", 0.001), ("s", 1.0), ("m", 60.0), ("h", 3600.0)]
        .iter()
        .find_map(|&(unit, scale)| Some((text.strip_suffix(unit)?, scale)))
        .unwrap_or((text, 1.0));
    number
        .trim()
        .parse::<f64>()
        .ok()
        .filter(|number| number.is_finite() && *number >= 0.0)
        .map(|number| number * scale)
        .ok_or_else(|| "a time is written 60s, 500ms or 2m".to_string())
}

/// Stack enough for the deepest expression that the parser lets through.
const STACK: usize = 1 << 29;

/// Runs the program and gives its exit status.
pub fn main() -> ExitCode {
    let line = Line::parse();
    std::thread::Builder::new()
        .stack_size(STACK)
        .spawn(move || run(line.command))
        .expect("a thread can be started")
        .join()
        .unwrap_or(ExitCode::from(101))
}

fn run(command: Command) -> ExitCode {
    match command {
        Command::Check(arguments) => check::run(&arguments),
        Command::Report(arguments) => report::run(&arguments),
        Command::Table(arguments) => table::run(&arguments),
        Command::Emit(arguments) => emit::run(&arguments),
        Command::Graph(arguments) => draw::run(&arguments),
        Command::Explain(arguments) => explain::run(&arguments),
    }
}

/// The exit status that goes with the worst finding.
fn status(class: Class) -> ExitCode {
    ExitCode::from(match class {
        Class::Remark => 0,
        Class::Refuted => 1,
        Class::Malformed => 2,
        Class::Undecided => 3,
    })
}

/// A complaint about the command line itself.
fn complain(message: &str) -> ExitCode {
    eprintln!("cosetta: {message}");
    ExitCode::from(2)
}

/// How to print to a stream.
fn style(terminal: bool) -> Style {
    let color = terminal && std::env::var_os("NO_COLOR").is_none_or(|value| value.is_empty());
    Style {
        color,
        ..Style::default()
    }
}

fn output_style() -> Style {
    style(std::io::stdout().is_terminal())
}

/// Prints findings for a person, on standard error.
fn show_findings(findings: &[Finding], sources: &Sources) {
    if !findings.is_empty() {
        let style = style(std::io::stderr().is_terminal());
        eprint!("{}", render::terminal(findings, sources, style));
    }
}

/// Prints to standard output; a reader that has gone away is no mistake of ours.
fn print(text: &str) {
    use std::io::Write;
    let mut output = std::io::stdout().lock();
    let _ = output.write_all(text.as_bytes());
    let _ = output.flush();
}
