//! `cosetta emit`: matrices to files.

use super::{complain, files, print, progress::Bar, seconds, show_findings, status};
use crate::emit::{self, Delivery, Form, What};
use crate::evaluate::{CompiledCode, Stop};
use crate::finding::{Class, Finding, catalogue, near_names};
use crate::project::{self, Options, View};
use crate::source::Span;
use crate::syntax::tree::{Artefact, DeclarationKind, Deliver};
use clap::Args;
use std::path::{Path, PathBuf};
use std::process::ExitCode;

/// Arguments of `emit`.
#[derive(Args)]
pub struct Arguments {
    /// The spec
    file: String,
    /// The code, or a member of a family: `guarded(5)`; without it, all that the spec delivers
    code: Option<String>,
    /// What is written: check_matrix or generator_matrix
    what: Option<String>,
    /// The format: mtx, alist, npy, csv, txt, json, png, tex, mem
    #[arg(long = "as", value_name = "FORMAT", default_value = "txt")]
    format: String,
    /// The form of the matrix; as built where there is one, unless said
    #[arg(long, value_name = "FORM", value_parser = ["as-built", "systematic", "reduced"])]
    form: Option<String>,
    /// Where it is written; `-`, standard output, unless said
    #[arg(short, long, value_name = "PATH", default_value = "-")]
    output: String,
    /// Work allowed on each code, in nominal seconds of one core
    #[arg(long, value_name = "TIME", default_value = "10s", value_parser = seconds)]
    budget: f64,
}

pub(super) fn run(arguments: &Arguments) -> ExitCode {
    let files = match files::specs(std::slice::from_ref(&arguments.file)) {
        Ok(files) => files,
        Err(message) => return complain(&message),
    };
    let mut options = Options {
        seconds: arguments.budget,
        ..Options::default()
    };
    if let Some(code) = &arguments.code {
        let Some(what) = &arguments.what else {
            return complain("say what of the code is written: check_matrix or generator_matrix");
        };
        // The member is named in the language itself, and read as a delivery.
        let form = arguments
            .form
            .as_ref()
            .map(|form| format!(" in {} form", form.replace('-', "_")));
        let form = form.unwrap_or_default();
        options.request = Some(format!(
            "deliver {code} to \"-\" {what}{form} as {}\n",
            arguments.format
        ));
        options.only = vec![code.split('(').next().unwrap_or(code).trim().to_string()];
        return project::run(&files, &files::Disk, &options, &Bar::new(), |view| {
            one(&view, &arguments.output)
        });
    }
    project::run(&files, &files::Disk, &options, &Bar::new(), |view| {
        all(&view)
    })
}

/// Writes the one artefact of the request.
fn one(view: &View, output: &str) -> ExitCode {
    let request = view.request.expect("a request was made");
    let parsed = crate::syntax::parse(request, &view.sources.get(request).text);
    let mut findings = view.findings.clone();
    findings.extend(parsed.findings);
    let deliver = parsed
        .file
        .declarations
        .iter()
        .find_map(|declaration| match &declaration.kind {
            DeclarationKind::Deliver(deliver) => Some(deliver),
            _ => None,
        });
    let files = match deliver.map(|deliver| prepared(view, deliver, 0)) {
        Some(Ok(files)) => files,
        Some(Err(finding)) => {
            findings.push(*finding);
            Vec::new()
        }
        None => Vec::new(),
    };
    show_findings(&findings, view.sources);
    let [(_, bytes)] = files.as_slice() else {
        return status(Class::Malformed);
    };
    match output {
        "-" => {
            use std::io::Write;
            let mut out = std::io::stdout().lock();
            if let Err(error) = out.write_all(bytes).and_then(|()| out.flush()) {
                return complain(&format!("cannot write: {error}"));
            }
        }
        path => {
            if let Err(error) = emit::write_whole(Path::new(path), bytes) {
                return complain(&format!("cannot write {path}: {error}"));
            }
        }
    }
    status(project::class(&findings))
}

/// Writes all that the spec delivers, unless something in it fails.
fn all(view: &View) -> ExitCode {
    let mut findings = view.findings.clone();
    let mut files: Vec<(PathBuf, Vec<u8>)> = Vec::new();
    let mut asked = false;
    for (at, file) in view
        .program
        .files
        .iter()
        .enumerate()
        .filter(|(_, file)| !file.library)
    {
        for declaration in &file.tree.declarations {
            let DeclarationKind::Deliver(deliver) = &declaration.kind else {
                continue;
            };
            asked = true;
            let folder = Path::new(&file.name)
                .parent()
                .unwrap_or(Path::new(""))
                .join(&deliver.folder.value);
            match prepared(view, deliver, at) {
                Ok(ready) => files.extend(
                    ready
                        .into_iter()
                        .map(|(name, bytes)| (folder.join(name), bytes)),
                ),
                Err(finding) => findings.push(*finding),
            }
        }
    }
    show_findings(&findings, view.sources);
    let class = project::class(&findings);
    if class != Class::Remark {
        eprintln!("cosetta: nothing is written, for not all holds");
        return status(class);
    }
    if !asked {
        return complain(
            "this spec delivers nothing; name a code, or write `deliver NAME to \"out\" …` in it",
        );
    }
    for (path, bytes) in &files {
        if let Err(error) = emit::write_whole(path, bytes) {
            return complain(&format!("cannot write {}: {error}", path.display()));
        }
        print(&format!("{}\n", path.display()));
    }
    status(class)
}

/// The files of a delivery: names and bytes.
fn prepared(
    view: &View,
    deliver: &Deliver,
    file: usize,
) -> Result<Vec<(String, Vec<u8>)>, Box<Finding>> {
    let span = deliver.code.span;
    let compiled = view
        .evaluator
        .code_named(&deliver.code, file)
        .map_err(|stop| match stop {
            Stop::Finding(finding) => finding,
            _ => Box::new(Finding::new(
                catalogue::UNKNOWN_ARTEFACT,
                span,
                "this code cannot be built, so nothing of it can be written",
            )),
        })?;
    let mut files = Vec::new();
    for artefact in &deliver.artefacts {
        let delivery = delivery(&compiled, artefact)?;
        for format in &artefact.formats {
            let Some(writer) = emit::format(&format.text) else {
                return Err(unknown_format(&format.text, format.span));
            };
            let bytes = (writer.write)(&delivery).map_err(|says| {
                Box::new(Finding::new(catalogue::UNKNOWN_ARTEFACT, format.span, says))
            })?;
            files.push((
                format!(
                    "{}.{}.{}",
                    file_stem(&compiled),
                    artefact.what.text,
                    writer.extension
                ),
                bytes,
            ));
        }
    }
    Ok(files)
}

fn file_stem(compiled: &CompiledCode) -> String {
    let mut stem = compiled.name.clone();
    for (_, value) in &compiled.arguments {
        let text: String = value
            .to_string()
            .chars()
            .filter(char::is_ascii_alphanumeric)
            .collect();
        stem = format!("{stem}-{text}");
    }
    stem
}

fn delivery(compiled: &CompiledCode, artefact: &Artefact) -> Result<Delivery, Box<Finding>> {
    let what = match artefact.what.text.as_str() {
        "check_matrix" => What::CheckMatrix,
        "generator_matrix" => What::GeneratorMatrix,
        other => return Err(unknown_artefact(other, artefact.what.span)),
    };
    let form = match artefact
        .form
        .as_ref()
        .map(|form| (form.text.as_str(), form.span))
    {
        None => None,
        Some(("as_built", _)) => Some(Form::AsBuilt),
        Some(("systematic", _)) => Some(Form::Systematic),
        Some(("reduced", _)) => Some(Form::Reduced),
        Some((other, span)) => {
            let finding = Finding::new(
                catalogue::UNKNOWN_ARTEFACT,
                span,
                format!("there is no form `{other}`"),
            );
            return Err(Box::new(
                finding.help("a matrix comes as_built, systematic or reduced"),
            ));
        }
    };
    emit::delivery(compiled, what, form).map_err(|says| {
        Box::new(Finding::new(
            catalogue::UNKNOWN_ARTEFACT,
            artefact.what.span,
            says,
        ))
    })
}

fn unknown_artefact(name: &str, span: Span) -> Box<Finding> {
    let known = ["check_matrix", "generator_matrix"];
    let finding = Finding::new(
        catalogue::UNKNOWN_ARTEFACT,
        span,
        format!("`{name}` cannot be written"),
    );
    Box::new(match near_names(name, known).first() {
        Some(near) => finding.help(format!("did you mean `{near}`?")),
        None => finding.help(format!("what can be written: {}", known.join(", "))),
    })
}

fn unknown_format(name: &str, span: Span) -> Box<Finding> {
    let known: Vec<&str> = emit::FORMATS.iter().map(|format| format.name).collect();
    let finding = Finding::new(
        catalogue::UNKNOWN_ARTEFACT,
        span,
        format!("there is no format `{name}`"),
    );
    Box::new(match near_names(name, known.iter().copied()).first() {
        Some(near) => finding.help(format!("did you mean `{near}`?")),
        None => finding.help(format!("the formats are {}", known.join(", "))),
    })
}
