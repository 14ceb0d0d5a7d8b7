//! Calls: functions, constructions, steps, and declared families.

use super::expression::{mistyped, wrong};
use super::{Evaluator, Outcome, Scope, Stop};
use crate::code::{Code, OriginKind};
use crate::construct;
use crate::finding::{Finding, catalogue};
use crate::source::Span;
use crate::step;
use crate::syntax::tree::{
    Argument, CodeDeclaration, DeclarationKind, Expression, ExpressionKind, MatrixDeclaration,
    Name, Parameter, Step,
};
use crate::value::{Channel, Given, Value, bind_arguments};
use num_rational::BigRational;
use petgraph::graph::NodeIndex;

impl Evaluator<'_> {
    fn given(&self, arguments: &[Argument], scope: &Scope) -> Outcome<Vec<Given>> {
        arguments
            .iter()
            .map(|argument| {
                Ok(Given {
                    name: argument
                        .name
                        .as_ref()
                        .map(|name| (name.text.clone(), name.span)),
                    value: self.evaluate(&argument.value, scope)?,
                    span: argument.value.span,
                })
            })
            .collect()
    }

    /// As [`Evaluator::given`], but a word that a parameter takes is that word, although the code so
    /// far may have a quantity of this name.
    fn given_to_step(
        &self,
        parameters: &[crate::value::Parameter],
        arguments: &[Argument],
        scope: &Scope,
    ) -> Outcome<Vec<Given>> {
        let mut given = Vec::with_capacity(arguments.len());
        for (place, argument) in arguments.iter().enumerate() {
            let parameter = match &argument.name {
                Some(name) => parameters.iter().find(|known| known.name == name.text),
                None => parameters.get(place),
            };
            match &argument.value.kind {
                ExpressionKind::Name(word)
                    if scope.local(word).is_none()
                        && parameter.is_some_and(|known| known.words.contains(&word.as_str())) =>
                {
                    given.push(Given {
                        name: argument
                            .name
                            .as_ref()
                            .map(|name| (name.text.clone(), name.span)),
                        value: Value::Text(word.as_str().into()),
                        span: argument.value.span,
                    });
                }
                _ => given.extend(self.given(std::slice::from_ref(argument), scope)?),
            }
        }
        Ok(given)
    }

    /// `f(arguments)`
    pub(super) fn call(
        &self,
        function: &Name,
        arguments: &[Argument],
        span: Span,
        scope: &Scope,
    ) -> Outcome<Value> {
        let name = function.text.as_str();
        if let Some(value) = scope.local(name) {
            return Err(mistyped(
                function.span,
                &format!("`{name}` takes no arguments"),
                value,
            ));
        }
        if let Some(subject) = &scope.subject
            && self.program.lookup(scope.file, name).is_none()
        {
            let values: Vec<Value> = self
                .given(arguments, scope)?
                .into_iter()
                .map(|given| given.value)
                .collect();
            if let Some(measured) = self.measures.measure(&subject.code, name, &values) {
                let measured = measured.map_err(|trouble| Stop::from(trouble.at(span)))?;
                return self.measured(measured, name);
            }
        }
        if let Some(node) = self.program.lookup(scope.file, name) {
            let given = self.given(arguments, scope)?;
            let value = self.declared(node, given, span, scope)?;
            return Ok(self.renamed(value, name, arguments, span, scope));
        }
        if let Some(entry) = construct::construction(name) {
            let given = self.given(arguments, scope)?;
            let call = self.bind(name, span, entry.parameters, given, scope)?;
            let made = (entry.run)(&call)?;
            return Ok(Value::Code(Code::new(
                made,
                self.text(span),
                span,
                OriginKind::Start,
            )));
        }
        if let Some(entry) = construct::function(name) {
            let given = self.given(arguments, scope)?;
            let call = self.bind(name, span, entry.parameters, given, scope)?;
            return Ok((entry.run)(&call)?);
        }
        if name == "bsc" || name == "bec" {
            return self.channel(name, arguments, span, scope);
        }
        let mut finding = Finding::new(
            catalogue::UNKNOWN_NAME,
            function.span,
            format!("there is no `{name}` to call"),
        );
        if step::step(name).is_some() {
            finding = finding.help(format!("it is a step: write `… then {name}`"));
        }
        Err(Stop::Finding(Box::new(finding)))
    }

    /// A member of a family, shown with the values it was called with.
    fn renamed(
        &self,
        value: Value,
        name: &str,
        arguments: &[Argument],
        span: Span,
        scope: &Scope,
    ) -> Value {
        let Value::Code(code) = value else {
            return value;
        };
        let shown: Vec<String> = arguments
            .iter()
            .map(|argument| {
                let text = match (&argument.value.kind, self.evaluate(&argument.value, scope)) {
                    (ExpressionKind::Integer(_), _) => self.text(argument.value.span),
                    (_, Ok(value @ (Value::Integer(_) | Value::Rational(_) | Value::Set(_)))) => {
                        value.to_string()
                    }
                    _ => self.text(argument.value.span),
                };
                match &argument.name {
                    Some(name) => format!("{}: {text}", name.text),
                    None => text,
                }
            })
            .collect();
        Value::Code(code.named(format!("{name}({})", shown.join(", ")), span))
    }

    fn channel(
        &self,
        name: &str,
        arguments: &[Argument],
        span: Span,
        scope: &Scope,
    ) -> Outcome<Value> {
        let given = self.given(arguments, scope)?;
        let bound = bind_arguments(name, span, &["rate"], &[false], given)?;
        let (value, place) = bound
            .into_iter()
            .flatten()
            .next()
            .expect("the needed argument was bound");
        let rate = match value {
            Value::Rational(rate) => rate,
            Value::Integer(number) => BigRational::from_integer(number),
            other => return Err(mistyped(place, "a rate is a number", &other)),
        };
        let (zero, one) = (
            BigRational::from_integer(0.into()),
            BigRational::from_integer(1.into()),
        );
        if rate < zero || rate > one {
            return Err(wrong(
                catalogue::BAD_ARGUMENT,
                place,
                format!("a rate is a probability from 0 to 1, not {rate}"),
            ));
        }
        Ok(Value::Channel(if name == "bsc" {
            Channel::Symmetric(rate)
        } else {
            Channel::Erasure(rate)
        }))
    }

    /// `CODE then STEP`
    pub(super) fn then(&self, code: &Expression, applied: &Step, scope: &Scope) -> Outcome<Value> {
        let before = match self.evaluate(code, scope)? {
            Value::Code(code) => code,
            other => return Err(mistyped(code.span, "a step follows a code", &other)),
        };
        let name = applied.name.text.as_str();
        let Some(entry) = step::step(name) else {
            let finding = Finding::new(
                catalogue::UNKNOWN_NAME,
                applied.name.span,
                format!("there is no step `{name}`"),
            );
            return Err(Stop::Finding(Box::new(finding)));
        };
        let inner = scope.inside(&before);
        let given = self.given_to_step(entry.parameters, &applied.arguments, &inner)?;
        let call = self.bind(name, applied.span, entry.parameters, given, &inner)?;
        let made = step::apply(entry, &before, &call)?;
        if made.length == 0 {
            return Err(wrong(
                catalogue::SHAPE,
                applied.span,
                "no position is left".into(),
            ));
        }
        let text = self.step_text(applied, &inner);
        Ok(Value::Code(Code::new(
            made,
            text,
            applied.span,
            OriginKind::Step,
        )))
    }

    /// A step as written, with numbers in place of expressions: `shorten(first: 56)`.
    fn step_text(&self, applied: &Step, scope: &Scope) -> String {
        if applied.arguments.is_empty() {
            return applied.name.text.clone();
        }
        let shown: Vec<String> = applied
            .arguments
            .iter()
            .map(|argument| {
                let text = match self.evaluate(&argument.value, scope) {
                    Ok(value @ Value::Integer(_)) => value.to_string(),
                    _ => self.text(argument.value.span),
                };
                match &argument.name {
                    Some(name) => format!("{}: {text}", name.text),
                    None => text,
                }
            })
            .collect();
        format!("{}({})", applied.name.text, shown.join(", "))
    }

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
