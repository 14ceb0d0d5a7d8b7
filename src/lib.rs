//! Cosetta: a small declarative language for error-correcting codes, and its compiler.
//!
//! Text flows one way through the rooms of this crate: [`source`] → [`syntax`] → [`graph`] →
//! [`evaluate`] → [`derive`] → [`require`] → findings, then [`report`] and [`emit`]. A room uses
//! only the rooms listed above it here.

pub mod source;

pub mod finding;

pub mod syntax;

pub mod graph;

pub mod algebra;

pub mod code;

pub mod value;

pub mod construct;

pub mod step;

pub mod evaluate;

pub mod derive;

pub mod require;

pub mod project;

pub mod report;

pub mod emit;

pub mod command;
