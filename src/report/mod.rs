//! What was derived, for whoever reads it: one file an audience.
//!
//! In: the plain data of [`model`], filled in by whoever derived them. Out: text for a terminal or
//! a review, JSON for machines, Markdown, HTML, tables of a family's members, and drawings of the
//! dependency graph. The three kinds of prose share one [`document`], so that they say the same.

pub mod describe;
pub mod document;
pub mod drawing;
pub mod explain;
pub mod html;
pub mod json;
pub mod markdown;
pub mod model;
pub mod table;
pub mod text;

pub use html::html;
pub use json::json;
pub use markdown::markdown;
pub use model::{CodeReport, Report};
pub use text::text;
