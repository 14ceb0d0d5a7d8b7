//! What a name stands for.

use super::expression::wrong;
use super::{Evaluator, Outcome, Scope, Stop};
use crate::construct;
use crate::finding::{Finding, catalogue};
use crate::graph::{Builtins, NodeKind};
use crate::source::Span;
use crate::step;
use crate::syntax::tree::Name;
use crate::value::{Call, Polynomial, Value};
use std::sync::Arc;

/// Words that are arguments by themselves: `arrange(data: first)`.
pub(super) const WORDS: &[&str] = &["first", "last", "zero", "tail_biting"];

/// The names that the compiler itself knows, with the quantities of codes given by the caller.
pub fn builtins(properties: &[&'static str]) -> Builtins {
    let functions = construct::CONSTRUCTIONS
        .iter()
        .map(|entry| entry.name)
        .chain(construct::functions::all().map(|entry| entry.name))
        .chain(["bsc", "bec"])
        .chain(WORDS.iter().copied())
        .collect();
    Builtins {
        functions,
        steps: step::STEPS.iter().map(|entry| entry.name).collect(),
        properties: properties.to_vec(),
    }
}

impl Evaluator<'_> {
    /// The value of a name.
    pub(super) fn name(&self, name: &str, span: Span, scope: &Scope) -> Outcome<Value> {
        if let Some(value) = scope.local(name) {
            return Ok(value.clone());
        }
        if let Some(subject) = &scope.subject {
            if let Some((_, value)) = subject.assumed.iter().find(|(known, _)| known == name) {
                return Ok(value.clone());
            }
            if let Some(measured) = self.measures.measure(&subject.code, name, &[]) {
                let measured = measured.map_err(|trouble| Stop::from(trouble.at(span)))?;
                return self.measured(measured, name);
            }
        }
        if let Some(node) = self.program.lookup(scope.file, name) {
            return Ok(match self.declared(node, Vec::new(), span, scope)? {
                Value::Code(code) => Value::Code(code.named(name, span)),
                value => value,
            });
        }
        if let Some(value) = self.generator(name, scope) {
            return Ok(value);
        }
        if let Some(index) = crate::value::VARIABLES
            .iter()
            .position(|&known| known == name)
        {
            return Ok(Value::Polynomial(Arc::new(Polynomial::variable(index))));
        }
        if let Some(function) = construct::function(name)
            && function
                .parameters
                .iter()
                .all(|parameter| parameter.optional)
        {
            let call = self.bind(name, span, function.parameters, Vec::new(), scope)?;
            return Ok((function.run)(&call)?);
        }
        if WORDS.contains(&name) {
            return Ok(Value::Text(name.into()));
        }
        Err(self.unknown(name, span))
    }

    /// A field's generator: of the field meant here, or of the only declared field that has one
    /// of this name.
    fn generator(&self, name: &str, scope: &Scope) -> Option<Value> {
        if let Some(field) = scope.field.as_ref().filter(|field| field.symbol() == name) {
            return Some(Value::Element(field.clone(), field.generator()));
        }
        if scope.field.is_some() {
            return None;
        }
        let mut found = None;
        for node in self.program.graph.node_indices() {
            if self.program.graph[node].kind != NodeKind::Field
                || self.program.graph[node].file != scope.file
            {
                continue;
            }
            if let Ok(Value::Field(field)) =
                self.declared(node, Vec::new(), self.program.graph[node].span, scope)
                && field.symbol() == name
            {
                if found.is_some() {
                    return None;
                }
                found = Some(Value::Element(field.clone(), field.generator()));
            }
        }
        found
    }

    fn unknown(&self, name: &str, span: Span) -> Stop {
        let mut finding = Finding::new(
            catalogue::UNKNOWN_NAME,
            span,
            format!("`{name}` has no value here"),
        );
        if construct::construction(name).is_some() || construct::function(name).is_some() {
            finding = finding.help(format!("it takes arguments: `{name}(…)`"));
        } else if step::step(name).is_some() {
            finding = finding.help(format!("it is a step: write `… then {name}`"));
        }
        Stop::Finding(Box::new(finding))
    }

    /// `VALUE.NAME`: a quantity of a code.
    pub(super) fn member(&self, value: &Value, name: &Name, span: Span) -> Outcome<Value> {
        let Value::Code(code) = value else {
            let message = format!(
                "only codes have quantities such as `.{}`; this is {}",
                name.text,
                value.kind()
            );
            return Err(wrong(catalogue::WRONG_TYPE, span, message));
        };
        match self.measures.measure(code, &name.text, &[]) {
            Some(measured) => {
                let measured = measured.map_err(|trouble| Stop::from(trouble.at(name.span)))?;
                self.measured(measured, &name.text)
            }
            None => Err(wrong(
                catalogue::UNKNOWN_NAME,
                name.span,
                format!("a code has no quantity `{}`", name.text),
            )),
        }
    }

    pub(super) fn bind<'c>(
        &'c self,
        name: &'c str,
        span: Span,
        parameters: &'c [crate::value::Parameter],
        given: Vec<crate::value::Given>,
        scope: &Scope,
    ) -> Outcome<Call<'c>> {
        let file = &self.program.files[scope.file].name;
        Ok(Call::bind(
            name,
            span,
            parameters,
            given,
            scope.field.clone(),
            self.loader,
            file,
        )?)
    }
}
