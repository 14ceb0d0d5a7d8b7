//! The codes that a program declares, each member of a family with its arguments.

use super::expression::wrong;
use super::{Evaluator, Outcome, Scope};
use crate::code::Code;
use crate::finding::catalogue;
use crate::source::Span;
use crate::syntax::tree::{BitGroup, ClauseKind, CodeDeclaration, DeclarationKind, Expression};
use crate::value::{Given, Value};
use num_bigint::BigInt;
use num_traits::{One, ToPrimitive};
use petgraph::graph::NodeIndex;

/// A declared code, or a member of a declared family, ready to be judged.
pub struct CompiledCode {
    /// The declaration's name.
    pub name: String,
    /// Parameter names and values, none for a plain code.
    pub arguments: Vec<(String, Value)>,
    /// The `##` text before the declaration.
    pub documentation: Option<String>,
    /// The code.
    pub code: Code,
    /// The names that hold in its clauses.
    pub scope: Scope,
    /// Its declaration in the program.
    pub node: NodeIndex,
    /// Where it is declared.
    pub span: Span,
    /// The names of its positions, if they are given.
    pub position_names: Option<Vec<String>>,
}

impl CompiledCode {
    /// The name with its arguments: `guarded(r: 5)`.
    pub fn title(&self) -> String {
        if self.arguments.is_empty() {
            return self.name.clone();
        }
        let shown: Vec<String> = self
            .arguments
            .iter()
            .map(|(name, value)| format!("{name}: {value}"))
            .collect();
        format!("{}({})", self.name, shown.join(", "))
    }
}

impl Evaluator<'_> {
    /// The declaration of a compiled code.
    pub fn declaration_of(&self, code: &CompiledCode) -> &CodeDeclaration {
        match &self.program.declaration(code.node).kind {
            DeclarationKind::Code(declaration) => declaration,
            _ => unreachable!("a compiled code is declared as one"),
        }
    }

    /// Evaluates a declared code; of a family, every member within its domains. What cannot be
    /// built is reported and left out. A family whose domains are not stated has no members of
    /// its own.
    pub fn compile(&self, node: NodeIndex) -> Vec<CompiledCode> {
        let DeclarationKind::Code(declaration) = &self.program.declaration(node).kind else {
            return Vec::new();
        };
        let file = self.program.graph[node].file;
        let generic = declaration
            .over
            .as_ref()
            .and_then(|over| self.generic_name(over, file));
        let open = declaration
            .parameters
            .iter()
            .any(|parameter| parameter.domain.is_none());
        if self.program.broken(node) || generic.is_some() || open {
            return Vec::new();
        }
        let home = Scope::of_file(file);
        let span = declaration.name.span;
        match self.choices_of(&declaration.parameters, &home, span) {
            Ok(choices) => choices
                .into_iter()
                .filter_map(|choice| self.compile_member(node, choice, span))
                .collect(),
            Err(stop) => {
                self.give_up(stop, span);
                Vec::new()
            }
        }
    }

    /// Evaluates a declaration without parameters for its mistakes alone.
    pub fn try_declaration(&self, node: NodeIndex) {
        let plain = match &self.program.declaration(node).kind {
            DeclarationKind::Let(declaration) => declaration.parameters.is_empty(),
            DeclarationKind::Matrix(declaration) => {
                let file = self.program.graph[node].file;
                let generic = declaration
                    .over
                    .as_ref()
                    .and_then(|over| self.generic_name(over, file));
                declaration.parameters.is_empty() && generic.is_none()
            }
            DeclarationKind::Field(_) | DeclarationKind::Channel(_) => true,
            _ => false,
        };
        if plain {
            let span = self.program.graph[node].span;
            let scope = Scope::of_file(self.program.graph[node].file);
            if let Err(stop) = self.declared(node, Vec::new(), span, &scope) {
                self.give_up(stop, span);
            }
        }
    }

    /// Evaluates one member of a family (or a plain code, with no values) given in the order of
    /// its parameters; what cannot be built is reported.
    pub fn compile_member(
        &self,
        node: NodeIndex,
        values: Vec<Value>,
        span: Span,
    ) -> Option<CompiledCode> {
        match self.try_member(node, values, span) {
            Ok(compiled) => Some(compiled),
            Err(stop) => {
                self.give_up(stop, span);
                None
            }
        }
    }

    fn try_member(&self, node: NodeIndex, values: Vec<Value>, span: Span) -> Outcome<CompiledCode> {
        let declaration = self.program.declaration(node);
        let DeclarationKind::Code(body) = &declaration.kind else {
            return Err(wrong(
                catalogue::WRONG_TYPE,
                span,
                "a code is needed here".into(),
            ));
        };
        let file = self.program.graph[node].file;
        let given = values
            .iter()
            .map(|value| Given {
                name: None,
                value: value.clone(),
                span,
            })
            .collect();
        let home = Scope::of_file(file);
        let Value::Code(code) = self.declared(node, given, span, &home)? else {
            unreachable!("a code declaration has a code as its value");
        };
        let mut scope = home.over(code.field());
        let mut arguments = Vec::new();
        for (parameter, value) in body.parameters.iter().zip(values) {
            scope = scope.with(&parameter.name.text, value.clone());
            arguments.push((parameter.name.text.clone(), value));
        }
        let position_names = match self.position_names(body, &code, &scope) {
            Ok(names) => names,
            Err(stop) => {
                self.give_up(stop, span);
                None
            }
        };
        Ok(CompiledCode {
            name: body.name.text.clone(),
            arguments,
            documentation: declaration.documentation.clone(),
            code,
            scope,
            node,
            span: body.name.span,
            position_names,
        })
    }

    /// The code that an expression such as `guarded(5)` names, for `deliver` and the command
    /// line.
    ///
    /// # Errors
    /// When it names none.
    pub fn code_named(&self, expression: &Expression, file: usize) -> Outcome<CompiledCode> {
        use crate::syntax::tree::ExpressionKind;
        let scope = Scope::of_file(file);
        let (name, arguments) = match &expression.kind {
            ExpressionKind::Name(name) => (name.as_str(), &[][..]),
            ExpressionKind::Call {
                function,
                arguments,
            } => (function.text.as_str(), arguments.as_slice()),
            _ => {
                return Err(wrong(
                    catalogue::WRONG_TYPE,
                    expression.span,
                    "a declared code is named here".into(),
                ));
            }
        };
        let Some(node) = self.program.lookup(file, name) else {
            return Err(wrong(
                catalogue::UNKNOWN_NAME,
                expression.span,
                format!("there is no code `{name}`"),
            ));
        };
        let DeclarationKind::Code(declaration) = &self.program.declaration(node).kind else {
            return Err(wrong(
                catalogue::WRONG_TYPE,
                expression.span,
                format!("`{name}` is no code"),
            ));
        };
        let mut values = vec![None; declaration.parameters.len()];
        for (place, argument) in arguments.iter().enumerate() {
            let at = match &argument.name {
                None => Some(place),
                Some(name) => declaration
                    .parameters
                    .iter()
                    .position(|known| known.name.text == name.text),
            };
            let Some(slot) = at.and_then(|at| values.get_mut(at)) else {
                return Err(wrong(
                    catalogue::BAD_ARGUMENT,
                    argument.value.span,
                    format!("`{name}` has no such argument"),
                ));
            };
            *slot = Some(self.evaluate(&argument.value, &scope)?);
        }
        let mut given = Vec::with_capacity(values.len());
        for (parameter, value) in declaration.parameters.iter().zip(values) {
            given.push(match (value, &parameter.default) {
                (Some(value), _) => value,
                (None, Some(default)) => self.evaluate(default, &scope)?,
                (None, None) => {
                    let message = format!("`{name}` needs its argument `{}`", parameter.name.text);
                    return Err(wrong(catalogue::BAD_ARGUMENT, expression.span, message));
                }
            });
        }
        self.try_member(node, given, expression.span)
    }

    fn position_names(
        &self,
        declaration: &CodeDeclaration,
        code: &Code,
        scope: &Scope,
    ) -> Outcome<Option<Vec<String>>> {
        let mut found: Option<Vec<String>> = None;
        for clause in &declaration.clauses {
            let ClauseKind::Bits(groups) = &clause.kind else {
                continue;
            };
            if found.is_some() {
                return Err(wrong(
                    catalogue::BAD_BITS,
                    clause.span,
                    "the bits are named twice".into(),
                ));
            }
            let mut names = Vec::new();
            for group in groups {
                self.group_names(group, scope, &mut names, code.length(), clause.span)?;
            }
            if names.len() != code.length() {
                let message = format!(
                    "{} bits are named, but the code has {} positions",
                    names.len(),
                    code.length()
                );
                return Err(wrong(catalogue::BAD_BITS, clause.span, message));
            }
            let mut sorted: Vec<&String> = names.iter().collect();
            sorted.sort();
            if let Some(pair) = sorted.windows(2).find(|pair| pair[0] == pair[1]) {
                return Err(wrong(
                    catalogue::BAD_BITS,
                    clause.span,
                    format!("two bits are called {}", pair[0]),
                ));
            }
            found = Some(names);
        }
        Ok(found)
    }

    fn group_names(
        &self,
        group: &BitGroup,
        scope: &Scope,
        names: &mut Vec<String>,
        length: usize,
        span: Span,
    ) -> Outcome<()> {
        let Some((from, to)) = &group.range else {
            names.push(group.name.text.clone());
            return Ok(());
        };
        let end = |expression: &Expression| match self.evaluate(expression, scope)? {
            Value::Integer(number) => Ok(number),
            other => Err(super::expression::mistyped(
                expression.span,
                "a bit's index is an integer",
                &other,
            )),
        };
        let (from, to) = (end(from)?, end(to)?);
        let count = (&from - &to).magnitude().clone() + 1u32;
        if count
            .to_usize()
            .is_none_or(|count| names.len() + count > length)
        {
            let last = length.saturating_sub(names.len());
            let message = format!(
                "these names cover more than the code's {length} positions: {last} are left for `{}`, which names {count}",
                group.name.text
            );
            return Err(wrong(catalogue::BAD_BITS, span, message));
        }
        let step = if from <= to {
            BigInt::one()
        } else {
            -BigInt::one()
        };
        let mut at = from;
        loop {
            names.push(format!("{}[{at}]", group.name.text));
            if at == to {
                return Ok(());
            }
            at += &step;
        }
    }
}

/// The names of positions for messages: the given ones, or their numbers.
pub fn position_names(names: Option<&[String]>, positions: &[usize]) -> Vec<String> {
    positions
        .iter()
        .map(|&at| match names.and_then(|names| names.get(at)) {
            Some(name) => format!("{name} (position {at})"),
            None => format!("position {at}"),
        })
        .collect()
}
