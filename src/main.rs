//! The `cosetta` program: a thin shell around [`cosetta::command`].

use std::process::ExitCode;

fn main() -> ExitCode {
    cosetta::command::main()
}
