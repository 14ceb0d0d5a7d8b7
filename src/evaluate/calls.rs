//! Calls: functions, constructions, steps, and declared families.

use super::expression::{mistyped, wrong};
use super::{Evaluator, Outcome, Scope, Stop};
use crate::code::{Code, OriginKind};
use crate::construct;
use crate::finding::{Finding, catalogue};
use crate::source::Span;
use crate::step;
use crate::syntax::tree::{Argument, Expression, ExpressionKind, Name, Step};
use crate::value::{Channel, Given, Value, bind_arguments};
use num_rational::BigRational;

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
}
