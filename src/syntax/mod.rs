//! From text to a typed tree with spans.

pub mod tree;
