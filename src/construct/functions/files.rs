//! Matrices from files.

use super::Function;
use crate::algebra::formats;
use crate::finding::{Finding, Found, catalogue};
use crate::value::{Call, Value, needed};
use std::sync::Arc;

/// The register of this file.
pub const FUNCTIONS: &[Function] = &[Function {
    name: "file",
    parameters: &[needed(
        "path",
        "a string",
        "relative to the spec; the ending names the format: mtx, alist, npy, csv, txt or json",
    )],
    says: "The matrix in a file, over the field meant.",
    theory: "",
    example: "\
# The file holds three rows: 1 0 1 0 1 0 1, 0 1 1 0 0 1 1 and 0 0 0 1 1 1 1.
field bit = GF(2)
code gauge_word over bit
  = check(file(\"gauge_word.txt\"))
  is [7, 4, 3]
",
    run: file,
}];

fn file(call: &Call) -> Found<Value> {
    let Value::Text(path) = call.value("path") else {
        let message = format!(
            "`file` takes a path in quotes, not {}",
            call.value("path").kind()
        );
        return Err(call.wrong("path", catalogue::WRONG_TYPE, message));
    };
    let field = call.field()?;
    let (name, bytes) = call.loader.load(call.file, path).map_err(|error| {
        let message = format!("cannot read {error}");
        let finding = Finding::new(catalogue::UNREADABLE_FILE, call.span_of("path"), message);
        Box::new(finding.help("paths are relative to the spec, and stay below the project's root"))
    })?;
    let matrix = formats::read(&name, &bytes, field).map_err(|error| {
        let place = error
            .line
            .map_or(String::new(), |line| format!(", line {line}"));
        let message = format!("{name}{place}: {}", error.says);
        call.wrong("path", catalogue::BAD_FILE_CONTENT, message)
    })?;
    Ok(Value::Matrix(Arc::new(matrix)))
}
