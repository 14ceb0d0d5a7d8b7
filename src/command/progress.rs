//! A progress bar on a terminal.

use crate::derive::search::Progress;
use indicatif::{ProgressBar, ProgressStyle};
use std::io::IsTerminal;
use std::time::{Duration, Instant};

/// Shows long searches on standard error when that is a terminal; silent otherwise.
pub struct Bar {
    bar: Option<ProgressBar>,
    started: Instant,
}

impl Bar {
    /// A bar that appears when there is something to wait for.
    pub fn new() -> Bar {
        let terminal = std::io::stderr().is_terminal();
        Bar {
            bar: terminal.then(|| {
                let bar = ProgressBar::new(0);
                let template = "{msg} [{bar:30}] {percent}% {elapsed}";
                if let Ok(style) = ProgressStyle::with_template(template) {
                    bar.set_style(style.progress_chars("=> "));
                }
                bar
            }),
            started: Instant::now(),
        }
    }
}

impl Progress for Bar {
    fn tick(&self, what: &str, done: u64, total: u64) {
        let Some(bar) = &self.bar else { return };
        if self.started.elapsed() < Duration::from_millis(500) {
            return;
        }
        bar.set_length(total);
        bar.set_position(done);
        bar.set_message(what.to_string());
    }
}

impl Drop for Bar {
    fn drop(&mut self) {
        if let Some(bar) = &self.bar {
            bar.finish_and_clear();
        }
    }
}
