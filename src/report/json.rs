//! The report for machines.

use serde_json::Value;

use super::Report;

/// The report as the machine-readable contract has it.
pub fn json(report: &Report) -> Value {
    serde_json::to_value(report).expect("the model has string keys and no failing parts")
}
