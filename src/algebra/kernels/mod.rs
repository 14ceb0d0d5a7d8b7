//! Inner loops that are compiled once more for the processor's wider instructions.
//!
//! Each kernel has one body in safe code; where the processor has AVX2 a second compilation of the
//! same body is taken, so both paths give the same answers. This is the only place with `unsafe`.

pub mod lightest;
