//! Ties every name in every declaration to what it means, or says that it means nothing.

use super::walk::{Mention, Role, mentions};
use super::{Builtins, Edge, Program, suggestion};
use crate::finding::{Finding, catalogue};
use crate::source::Span;
use crate::syntax::tree::{
    Declaration, DeclarationKind, Expression, ExpressionKind, Modulus, Parameter,
};
use petgraph::graph::NodeIndex;
use std::collections::BTreeSet;

/// Words that arguments of constructions and steps take as they stand.
const CHOICES: &[&str] = &[
    "first",
    "last",
    "zero",
    "tail_biting",
    "truncated",
    "polynomial",
    "dual",
    "normal",
    "ones",
    "zeros",
    "rows",
    "columns",
    "highest",
    "lowest",
    "conway",
];

/// Variables of polynomials wherever nothing else is called so.
const VARIABLES: &[&str] = &["x", "y", "z"];

/// The generator of a field whose modulus is not stated.
const GENERATOR: &str = "a";

/// Functions that speak of the groups of bits that a code names.
const GROUPING: &[&str] = &["bits", "groups"];

/// Adds an edge for each use of a declaration; the uses come back for the remarks.
pub fn resolve(
    program: &mut Program,
    builtins: &Builtins,
    findings: &mut Vec<Finding>,
) -> BTreeSet<(usize, String)> {
    let mut used = BTreeSet::new();
    let mut verdicts = Vec::new();
    let resolver = Resolver {
        program,
        builtins,
        symbols: symbols(program),
    };
    for node in program.graph.node_indices() {
        let file = program.graph[node].file;
        let declaration = program.declaration(node);
        findings.extend(repeated_parameters(declaration));
        let known = |name: &str| resolver.exists(file, name);
        for mention in mentions(&declaration.kind, &known) {
            used.insert((file, mention.text.to_string()));
            let verdict = resolver.judge(node, file, &mention);
            verdicts.push((node, mention.clause, mention.span, verdict));
        }
    }
    for (node, clause, span, verdict) in verdicts {
        match verdict {
            Verdict::Fine => continue,
            Verdict::Uses(target) => {
                program.graph.add_edge(node, target, Edge { span });
                continue;
            }
            Verdict::Broken => {}
            Verdict::Unknown(finding) => findings.push(*finding),
        }
        match clause {
            Some(clause) => drop(program.broken_clauses.insert((node, clause))),
            None => drop(program.broken.insert(node)),
        }
    }
    used
}

enum Verdict {
    /// Known to the compiler, or bound.
    Fine,
    /// A declaration.
    Uses(NodeIndex),
    /// A declaration that could not be read, which a finding says.
    Broken,
    /// Nothing.
    Unknown(Box<Finding>),
}

struct Resolver<'p> {
    program: &'p Program,
    builtins: &'p Builtins,
    symbols: BTreeSet<&'p str>,
}

impl Resolver<'_> {
    /// Whether a file can use `name`, readable or not.
    fn exists(&self, file: usize, name: &str) -> bool {
        self.program.lookup(file, name).is_some() || self.unreadable(file, name)
    }

    fn unreadable(&self, file: usize, name: &str) -> bool {
        let file = &self.program.files[file];
        file.missing.contains(name) || file.broken.iter().any(|broken| broken.text == name)
    }

    fn judge(&self, user: NodeIndex, file: usize, mention: &Mention<'_>) -> Verdict {
        let name = mention.text;
        if mention.role == Role::Step {
            let known = self.builtins.steps.contains(&name);
            return if known {
                Verdict::Fine
            } else {
                self.unknown_step(file, mention)
            };
        }
        let word = mention.role == Role::Choice && CHOICES.contains(&name);
        if let Some(node) = self.program.lookup(file, name) {
            // A code called `first` may still say `data: first`.
            return if word && node == user {
                Verdict::Fine
            } else {
                Verdict::Uses(node)
            };
        }
        if self.unreadable(file, name) {
            return Verdict::Broken;
        }
        let known = self.builtins.functions.contains(&name)
            || mention.properties && self.builtins.properties.contains(&name)
            || match mention.role {
                Role::Function => mention.properties && GROUPING.contains(&name),
                Role::Choice => {
                    CHOICES.contains(&name) || self.free(name) || self.near(file, mention).is_none()
                }
                _ => self.free(name),
            };
        if known {
            Verdict::Fine
        } else if self.program.files[file].uncertain {
            Verdict::Broken
        } else {
            self.unknown(file, mention)
        }
    }

    /// Whether a name stands for itself: a polynomial's variable or a field's generator.
    fn free(&self, name: &str) -> bool {
        VARIABLES.contains(&name) || name == GENERATOR || self.symbols.contains(name)
    }

    fn near(&self, file: usize, mention: &Mention<'_>) -> Option<String> {
        let program = self.program;
        let mut names: Vec<&str> = program.library.keys().map(String::as_str).collect();
        let own = &program.files[file];
        names.extend(own.own.keys().chain(own.imports.keys()).map(String::as_str));
        names.extend(
            mention
                .bound
                .iter()
                .copied()
                .filter(|bound| bound.len() > 1),
        );
        names.extend(&self.builtins.functions);
        if mention.properties {
            names.extend(&self.builtins.properties);
        }
        suggestion(mention.text, names)
    }

    fn unknown(&self, file: usize, mention: &Mention<'_>) -> Verdict {
        let name = mention.text;
        let called = mention.role == Role::Function;
        let finding =
            |message: String| Finding::new(catalogue::UNKNOWN_NAME, mention.span, message);
        if self.builtins.steps.contains(&name) {
            let message = format!(
                "`{name}` is a step, not a {}",
                if called { "construction" } else { "code" }
            );
            let finding = finding(message).label("a step");
            return found(finding.help(format!("a step changes a code: write `CODE then {name}`")));
        }
        if mention.stepping && name == "d" {
            return found(
                finding("`d` is not known while a code is being built".to_string())
                    .label("the distance")
                    .help("in a step's arguments `n`, `k` and `q` are those of the code so far; the distance is derived when the code is whole"),
            );
        }
        if self.builtins.properties.contains(&name) {
            return found(
                finding(format!("`{name}` has no meaning here")).label("a property of a code").help(
                    "a code's properties are spoken of in its clauses (`is`, `require`, `prefer`) and in a `pick`; `n`, `k` and `q` also in a step's arguments",
                ),
            );
        }
        let what = if called {
            "there is no construction or function"
        } else {
            "nothing is called"
        };
        let finding = finding(format!("{what} `{name}`")).label("unknown name");
        found(match self.near(file, mention) {
            Some(help) => finding.help(help),
            None => finding.help(format!(
                "declare `{name}`, or bring it in with `use \"file.coset\"`"
            )),
        })
    }

    fn unknown_step(&self, file: usize, mention: &Mention<'_>) -> Verdict {
        let name = mention.text;
        let finding =
            |message: String| Finding::new(catalogue::UNKNOWN_NAME, mention.span, message);
        if self.unreadable(file, name) {
            return Verdict::Broken;
        }
        let declared = self
            .program
            .lookup(file, name)
            .map(|node| self.program.graph[node].kind);
        if declared.is_some() || self.builtins.functions.contains(&name) {
            let what = match declared {
                None => "construction",
                Some(kind) => kind.word(),
            };
            return found(finding(format!("`{name}` is a {what}, not a step")).label("not a step").help(format!(
                "to join it to the code so far, name it in a step: `then concatenate({name}(…))`"
            )));
        }
        let near = suggestion(name, self.builtins.steps.iter().copied());
        let finding = finding(format!("there is no step `{name}`")).label("unknown step");
        found(match near {
            Some(help) => finding.help(help),
            None => finding.help("the steps are `extend`, `shorten`, `puncture`, `dual` and others; the language reference lists them"),
        })
    }
}

fn found(finding: Finding) -> Verdict {
    Verdict::Unknown(Box::new(finding))
}

/// The generators that the program's fields name.
fn symbols(program: &Program) -> BTreeSet<&str> {
    let mut symbols = BTreeSet::new();
    for declaration in program
        .files
        .iter()
        .flat_map(|file| &file.tree.declarations)
    {
        let fields: [Option<&Expression>; 2] = match &declaration.kind {
            DeclarationKind::Field(it) => [Some(&it.value), None],
            DeclarationKind::Matrix(it) => [it.over.as_ref(), Some(&it.value)],
            DeclarationKind::Code(it) => [it.over.as_ref(), Some(&it.body)],
            DeclarationKind::Let(it) => [Some(&it.value), None],
            _ => [None, None],
        };
        for field in fields.into_iter().flatten() {
            collect(field, &mut symbols);
        }
    }
    symbols
}

fn collect<'p>(expression: &'p Expression, symbols: &mut BTreeSet<&'p str>) {
    match &expression.kind {
        ExpressionKind::Field(literal) => {
            if let Some(Modulus::Relation { symbol, .. }) = &literal.modulus {
                symbols.insert(&symbol.text);
            }
        }
        ExpressionKind::Over(value, field) => {
            collect(value, symbols);
            collect(field, symbols);
        }
        ExpressionKind::Then(code, _) => collect(code, symbols),
        ExpressionKind::Call { arguments, .. } => {
            arguments
                .iter()
                .for_each(|argument| collect(&argument.value, symbols));
        }
        _ => {}
    }
}

fn repeated_parameters(declaration: &Declaration) -> Vec<Finding> {
    let parameters: &[Parameter] = match &declaration.kind {
        DeclarationKind::Let(it) => &it.parameters,
        DeclarationKind::Matrix(it) => &it.parameters,
        DeclarationKind::Code(it) => &it.parameters,
        _ => &[],
    };
    let again = |(index, parameter): (usize, &Parameter)| {
        let first = parameters[..index]
            .iter()
            .find(|first| first.name.text == parameter.name.text)?;
        Some(repeated(
            &parameter.name.text,
            parameter.name.span,
            first.name.span,
        ))
    };
    parameters.iter().enumerate().filter_map(again).collect()
}

fn repeated(name: &str, span: Span, first: Span) -> Finding {
    Finding::new(
        catalogue::DUPLICATE_NAME,
        span,
        format!("two parameters are called `{name}`"),
    )
    .label("named again")
    .related(first, "named first here")
    .help("give one of them another name")
}
