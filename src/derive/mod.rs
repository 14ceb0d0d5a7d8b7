//! (to come)

pub mod search;
