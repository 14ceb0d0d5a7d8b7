//! The values of declarations, and the members of families.

use super::expression::{mistyped, wrong};
use super::{Evaluator, Outcome, Scope, Stop};
use crate::code::Code;
use crate::finding::{Finding, catalogue};
use crate::source::Span;
use crate::syntax::tree::{
    CodeDeclaration, DeclarationKind, Expression, ExpressionKind, MatrixDeclaration, Parameter,
};
use crate::value::{Given, Value, bind_arguments};
use petgraph::graph::NodeIndex;

impl Evaluator<'_> {
    /// The value of a declaration, with arguments if it is a family.
    pub(super) fn declared(
        &self,
        node: NodeIndex,
        given: Vec<Given>,
        span: Span,
        scope: &Scope,
    ) -> Outcome<Value> {
        if self.program.broken(node) {
            return Err(Stop::Reported);
        }
        let declaration = self.program.declaration(node);
        let file = self.program.graph[node].file;
        let name = self.program.graph[node].name.clone();
        let (parameters, generic): (&[Parameter], Option<&Expression>) = match &declaration.kind {
            DeclarationKind::Let(declaration) => (&declaration.parameters, None),
            DeclarationKind::Matrix(declaration) => {
                (&declaration.parameters, declaration.over.as_ref())
            }
            DeclarationKind::Code(declaration) => {
                (&declaration.parameters, declaration.over.as_ref())
            }
            _ => (&[], None),
        };
        let mut home = Scope::of_file(file);
        let mut key = String::new();
        if let Some(generic) = generic.and_then(|over| self.generic_name(over, file)) {
            let Some(field) = scope.field.clone() else {
                let finding = Finding::new(
                    catalogue::FIELD_UNSTATED,
                    span,
                    format!(
                        "`{name}` works over any field; which one is meant here does not follow"
                    ),
                )
                .help(
                    "state it: `code NAME over FIELD = …`, or `… over GF(2)` behind the expression",
                );
                return Err(Stop::Finding(Box::new(finding)));
            };
            key = format!("{} {:?} {}", field.order(), field.modulus(), field.symbol());
            home = home.with(generic, Value::Field(field));
        }
        let arguments = self.arguments(&name, parameters, given, span, &home)?;
        for (parameter, value) in parameters.iter().zip(&arguments) {
            key.push_str(&format!(" {value}"));
            home = home.with(&parameter.name.text, value.clone());
        }
        if let Some(known) = self.memo.borrow().get(&(node, key.clone())) {
            return known.clone().map_err(|()| Stop::Reported);
        }
        let result = self.fresh(&declaration.kind, &home);
        let parametrised = !parameters.is_empty()
            || generic.is_some_and(|over| self.generic_name(over, file).is_some());
        match result {
            Ok(value) => {
                self.memo
                    .borrow_mut()
                    .insert((node, key), Ok(value.clone()));
                Ok(value)
            }
            Err(stop) if parametrised => Err(self.called_from(stop, &name, span)),
            Err(stop) => {
                self.give_up(stop, span);
                self.memo.borrow_mut().insert((node, key), Err(()));
                Err(Stop::Reported)
            }
        }
    }

    /// A finding inside a family, seen from where the member was asked for. Inside the library a
    /// stranger has nothing to mend, so the place becomes the call.
    fn called_from(&self, stop: Stop, name: &str, span: Span) -> Stop {
        let Stop::Finding(mut finding) = stop else {
            return stop;
        };
        if finding.span == span || finding.span.source == span.source {
            return Stop::Finding(finding);
        }
        if self.sources.get(finding.span.source).library {
            let inside = finding.span;
            finding.span = span;
            finding.message = format!("{name}: {}", finding.message);
            finding = Box::new(finding.related(inside, format!("in the library's `{name}`")));
        } else {
            finding =
                Box::new(finding.related(span, format!("asked for here, as a member of `{name}`")));
        }
        Stop::Finding(finding)
    }

    /// The name that a declaration is generic over: one in `over` that is no declared field.
    pub(super) fn generic_name<'e>(&self, over: &'e Expression, file: usize) -> Option<&'e str> {
        match &over.kind {
            ExpressionKind::Name(name) if self.program.lookup(file, name).is_none() => Some(name),
            _ => None,
        }
    }

    fn arguments(
        &self,
        name: &str,
        parameters: &[Parameter],
        given: Vec<Given>,
        span: Span,
        home: &Scope,
    ) -> Outcome<Vec<Value>> {
        let names: Vec<&str> = parameters
            .iter()
            .map(|parameter| parameter.name.text.as_str())
            .collect();
        let optional: Vec<bool> = parameters
            .iter()
            .map(|parameter| parameter.default.is_some())
            .collect();
        let bound = bind_arguments(name, span, &names, &optional, given)?;
        let mut values = Vec::with_capacity(parameters.len());
        let mut inner = home.clone();
        for (parameter, bound) in parameters.iter().zip(bound) {
            let (value, place) = match (bound, &parameter.default) {
                (Some(bound), _) => bound,
                (None, Some(default)) => (self.evaluate(default, &inner)?, span),
                (None, None) => unreachable!("a needed argument was bound"),
            };
            if let Some(domain) = &parameter.domain {
                self.in_domain(&value, domain, &parameter.name.text, name, place, &inner)?;
            }
            inner = inner.with(&parameter.name.text, value.clone());
            values.push(value);
        }
        Ok(values)
    }

    fn in_domain(
        &self,
        value: &Value,
        domain: &Expression,
        parameter: &str,
        callee: &str,
        span: Span,
        scope: &Scope,
    ) -> Outcome<()> {
        let inside = match (&domain.kind, value) {
            // A wide range need not be listed to see whether an integer lies in it.
            (ExpressionKind::Range(first, last), Value::Integer(_)) => {
                let (first, last) = (self.evaluate(first, scope)?, self.evaluate(last, scope)?);
                let order = |left: &Value, right: &Value| {
                    crate::value::compare(left, right)
                        .map_err(|trouble| Stop::from(trouble.at(domain.span)))
                };
                order(&first, value)?.is_le() && order(value, &last)?.is_le()
            }
            _ => {
                let domain_value = self.evaluate(domain, scope)?;
                crate::value::contains(value, &domain_value)
                    .map_err(|trouble| Stop::from(trouble.at(span)))?
            }
        };
        if inside {
            return Ok(());
        }
        let message = format!(
            "`{parameter}` of `{callee}` is {value}, outside its domain {}",
            self.text(domain.span)
        );
        Err(wrong(catalogue::BAD_ARGUMENT, span, message))
    }

    fn fresh(&self, kind: &DeclarationKind, home: &Scope) -> Outcome<Value> {
        match kind {
            DeclarationKind::Field(declaration) => {
                let field = self.field_of(&declaration.value, home)?;
                Ok(Value::Field(field))
            }
            DeclarationKind::Let(declaration) => self.evaluate(&declaration.value, home),
            DeclarationKind::Matrix(declaration) => self.matrix_declared(declaration, home),
            DeclarationKind::Code(declaration) => {
                Ok(Value::Code(self.code_declared(declaration, home)?))
            }
            DeclarationKind::Channel(declaration) => {
                match self.evaluate(&declaration.model, home)? {
                    value @ Value::Channel(_) => Ok(value),
                    other => Err(mistyped(
                        declaration.model.span,
                        "a channel is bsc(rate) or bec(rate)",
                        &other,
                    )),
                }
            }
            DeclarationKind::Use(_) | DeclarationKind::Deliver(_) => Err(Stop::Reported),
        }
    }

    fn matrix_declared(&self, declaration: &MatrixDeclaration, home: &Scope) -> Outcome<Value> {
        let scope = match &declaration.over {
            Some(over) => home.over(&self.field_of(over, home)?),
            None => home.clone(),
        };
        match self.evaluate(&declaration.value, &scope)? {
            value @ Value::Matrix(_) => Ok(value),
            Value::Incidence(incidence) if scope.field.is_some() => {
                let field = scope.field.as_ref().expect("checked");
                Ok(Value::Matrix(std::sync::Arc::new(incidence.matrix(field))))
            }
            other => Err(mistyped(
                declaration.value.span,
                "a matrix is declared here",
                &other,
            )),
        }
    }

    fn code_declared(&self, declaration: &CodeDeclaration, home: &Scope) -> Outcome<Code> {
        let stated = match &declaration.over {
            Some(over) => Some(self.field_of(over, home)?),
            None => None,
        };
        let scope = match &stated {
            Some(field) => home.over(field),
            None => home.clone(),
        };
        let code = match self.evaluate(&declaration.body, &scope)? {
            Value::Code(code) => code,
            other => {
                return Err(mistyped(
                    declaration.body.span,
                    "a code is declared here",
                    &other,
                ));
            }
        };
        if let Some(stated) = stated.filter(|stated| stated != code.field()) {
            let over = declaration.over.as_ref().expect("a stated field");
            let finding = Finding::new(
                catalogue::FIELD_MISMATCH,
                over.span,
                format!(
                    "the code is stated over {stated}, but what is built lies over {}",
                    code.field()
                ),
            )
            .related(declaration.body.span, "built here");
            return Err(Stop::Finding(Box::new(finding)));
        }
        Ok(code)
    }
}
