//! `cosetta explain`: the compiler's own documentation.

use super::{complain, print};
use crate::report::explain;
use clap::Args;
use std::process::ExitCode;

/// Arguments of `explain`.
#[derive(Args)]
pub struct Arguments {
    /// A construction, step, function, requirement, property, quantity, code of the library or
    /// finding; or a kind of these, such as `steps`. Without it, an overview
    name: Option<String>,
}

pub(super) fn run(arguments: &Arguments) -> ExitCode {
    let Some(name) = &arguments.name else {
        print(&explain::overview());
        return ExitCode::SUCCESS;
    };
    match explain::explain(name) {
        Ok(text) => {
            print(&text);
            ExitCode::SUCCESS
        }
        Err(message) => complain(&message),
    }
}
