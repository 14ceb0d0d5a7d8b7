//! `cosetta graph`: what depends on what.
