//! Families: columns, monomials, points, and members of a parametrised code chosen by search.

use super::expression::{mistyped, placed, wrong};
use super::{Evaluator, MEMBERS, Outcome, Scope};
use crate::algebra::{Field, Matrix};
use crate::code::Code;
use crate::finding::{Finding, catalogue};
use crate::source::Span;
use crate::syntax::tree::{
    Columns, Expression, MonomialShape, Monomials, Name, Parameter, Pick, PointShape, Points,
};
use crate::value::{self, CODE_LENGTH, Value};
use std::cmp::Ordering;
use std::sync::Arc;

/// The most vectors, points or monomials that a condition is asked about.
const CANDIDATES: u64 = 1 << 20;

impl Evaluator<'_> {
    fn family_field(&self, span: Span, scope: &Scope, what: &str) -> Outcome<Field> {
        scope.field.clone().ok_or_else(|| {
            Box::new(
                Finding::new(
                    catalogue::FIELD_UNSTATED,
                    span,
                    format!("over which field these {what} lie does not follow"),
                )
                .help("state it with `over FIELD`"),
            )
            .into()
        })
    }

    /// `columns v of height r where … sorted by … take …`
    pub(super) fn columns(&self, columns: &Columns, span: Span, scope: &Scope) -> Outcome<Value> {
        let field = self.family_field(span, scope, "columns")?;
        let height = self.size(&columns.height, scope, "the height", 1, 64)?;
        let count = self.candidates(field.order(), height, columns.height.span, "columns")?;
        let mut chosen: Vec<(Vec<Value>, Arc<Vec<u32>>)> = Vec::new();
        for index in 0..count {
            let vector = Arc::new(vector_at(index, field.order(), height));
            let inner = scope.with(
                &columns.variable.text,
                Value::Vector(field.clone(), vector.clone()),
            );
            let wanted = match &columns.condition {
                Some(condition) => self.condition(condition, &inner)?,
                None => true,
            };
            if !wanted {
                continue;
            }
            let mut keys = Vec::with_capacity(columns.sort.len());
            for key in &columns.sort {
                keys.push(self.evaluate(&key.value, &inner)?);
            }
            chosen.push((keys, vector));
            if chosen.len() > CODE_LENGTH {
                return Err(wrong(
                    catalogue::LIMIT,
                    span,
                    format!("more than {CODE_LENGTH} columns"),
                ));
            }
        }
        self.sort(columns, &mut chosen, span)?;
        if let Some(take) = &columns.take {
            let wanted = self.size(take, scope, "the number of columns", 0, CODE_LENGTH)?;
            if wanted > chosen.len() {
                let message = format!("there are only {} such columns, not {wanted}", chosen.len());
                return Err(wrong(catalogue::EMPTY_CHOICE, take.span, message));
            }
            chosen.truncate(wanted);
        }
        self.fits(height, chosen.len(), span)?;
        let mut matrix = Matrix::zero(&field, height, chosen.len());
        for (column, (_, vector)) in chosen.iter().enumerate() {
            for (row, &entry) in vector.iter().enumerate() {
                if entry != 0 {
                    matrix.set(row, column, entry);
                }
            }
        }
        Ok(Value::Matrix(Arc::new(matrix)))
    }

    fn sort(
        &self,
        columns: &Columns,
        chosen: &mut [(Vec<Value>, Arc<Vec<u32>>)],
        span: Span,
    ) -> Outcome<()> {
        let mut trouble = None;
        chosen.sort_by(|(left, _), (right, _)| {
            for (at, key) in columns.sort.iter().enumerate() {
                match value::compare(&left[at], &right[at]) {
                    Ok(Ordering::Equal) => {}
                    Ok(order) if key.descending => return order.reverse(),
                    Ok(order) => return order,
                    Err(found) => {
                        trouble.get_or_insert(found);
                        return Ordering::Equal;
                    }
                }
            }
            Ordering::Equal
        });
        match trouble {
            Some(found) => Err(found.at(span).into()),
            None => Ok(()),
        }
    }

    fn candidates(&self, order: u64, variables: usize, span: Span, what: &str) -> Outcome<u64> {
        order
            .checked_pow(variables as u32)
            .filter(|&count| count <= CANDIDATES)
            .ok_or_else(|| {
                let message = format!("{order}^{variables} {what} would have to be looked at; the limit is {CANDIDATES}");
                wrong(catalogue::LIMIT, span, message)
            })
    }

    /// `points in m variables where …`, `points (x, y) where …`
    pub(super) fn points(&self, points: &Points, span: Span, scope: &Scope) -> Outcome<Value> {
        let field = self.family_field(span, scope, "points")?;
        let (variables, names) = match &points.shape {
            PointShape::Variables(count) => (
                self.size(count, scope, "the number of variables", 0, 64)?,
                None,
            ),
            PointShape::Named(names) => {
                distinct(names.iter())?;
                (names.len(), Some(names))
            }
        };
        let count = self.candidates(field.order(), variables, span, "points")?;
        let mut coordinates = Vec::new();
        for index in 0..count {
            let point = vector_at(index, field.order(), variables);
            if let Some(condition) = &points.condition {
                let mut inner = scope.clone();
                match names {
                    Some(names) => {
                        for (name, &coordinate) in names.iter().zip(&point) {
                            inner =
                                inner.with(&name.text, Value::Element(field.clone(), coordinate));
                        }
                    }
                    None => {
                        inner = inner.with(
                            "point",
                            Value::Vector(field.clone(), Arc::new(point.clone())),
                        );
                    }
                }
                if !self.condition(condition, &inner)? {
                    continue;
                }
            }
            coordinates.push(point);
        }
        Ok(Value::Points(Arc::new(value::Points {
            field,
            variables,
            coordinates,
        })))
    }

    /// `monomials in m variables where …`, `monomials x^i * y^j where …`
    pub(super) fn monomials(
        &self,
        monomials: &Monomials,
        span: Span,
        scope: &Scope,
    ) -> Outcome<Value> {
        let field = self.family_field(span, scope, "monomials")?;
        let (variables, names) = match &monomials.shape {
            MonomialShape::Variables(count) => (
                self.size(count, scope, "the number of variables", 0, 64)?,
                None,
            ),
            MonomialShape::Pattern(pairs) => {
                distinct(pairs.iter().map(|(variable, _)| variable))?;
                distinct(pairs.iter().map(|(_, exponent)| exponent))?;
                (pairs.len(), Some(pairs))
            }
        };
        let count = self.candidates(field.order(), variables, span, "monomials")?;
        let mut exponents: Vec<Vec<u32>> = Vec::new();
        for index in 0..count {
            let vector = vector_at(index, field.order(), variables);
            if let Some(condition) = &monomials.condition {
                let degree: u64 = vector.iter().map(|&exponent| u64::from(exponent)).sum();
                let mut inner = scope.with("degree", Value::integer(degree));
                for (at, (_, exponent)) in names.into_iter().flatten().enumerate() {
                    inner = inner.with(&exponent.text, Value::integer(vector[at]));
                }
                if !self.condition(condition, &inner)? {
                    continue;
                }
            }
            exponents.push(vector);
        }
        // By degree, then the first variable's exponent highest first.
        exponents.sort_by(|left, right| {
            let degree = |vector: &[u32]| {
                vector
                    .iter()
                    .map(|&exponent| u64::from(exponent))
                    .sum::<u64>()
            };
            degree(left)
                .cmp(&degree(right))
                .then_with(|| right.cmp(left))
        });
        Ok(Value::Monomials(Arc::new(value::Monomials {
            variables,
            exponents,
        })))
    }

    /// All choices of the parameters' values, leftmost slowest.
    pub(super) fn choices_of(
        &self,
        parameters: &[Parameter],
        scope: &Scope,
        span: Span,
    ) -> Outcome<Vec<Vec<Value>>> {
        let mut choices: Vec<Vec<Value>> = vec![Vec::new()];
        for (at, parameter) in parameters.iter().enumerate() {
            let Some(domain) = &parameter.domain else {
                return Err(wrong(
                    catalogue::BAD_ARGUMENT,
                    parameter.name.span,
                    format!(
                        "the domain of `{}` is not stated, as in `{0} in 2..8`",
                        parameter.name.text
                    ),
                ));
            };
            let mut widened = Vec::new();
            for choice in &choices {
                let mut inner = scope.clone();
                for (known, value) in parameters[..at].iter().zip(choice) {
                    inner = inner.with(&known.name.text, value.clone());
                }
                let domain_value = self.evaluate(domain, &inner)?;
                for value in placed(value::items_of(&domain_value), domain.span)? {
                    let mut next = choice.clone();
                    next.push(value);
                    widened.push(next);
                    if widened.len() > MEMBERS {
                        let message =
                            format!("more than {MEMBERS} members would have to be looked at");
                        return Err(wrong(catalogue::LIMIT, span, message));
                    }
                }
            }
            choices = widened;
        }
        Ok(choices)
    }

    /// `pick r in S minimizing n from CODE where COND`
    pub(super) fn pick(&self, pick: &Pick, span: Span, scope: &Scope) -> Outcome<Value> {
        let mut best: Option<(Value, Code, String)> = None;
        let choices = self.choices_of(&pick.parameters, scope, span)?;
        let total = choices.len();
        let mut impossible = None;
        for choice in choices {
            let mut inner = scope.clone();
            let mut named = Vec::new();
            for (parameter, value) in pick.parameters.iter().zip(&choice) {
                inner = inner.with(&parameter.name.text, value.clone());
                named.push(format!("{} = {value}", parameter.name.text));
            }
            // A member that cannot be built is no candidate; only if none can is it a mistake.
            let code = match self.evaluate(&pick.from, &inner) {
                Ok(Value::Code(code)) => code,
                Ok(other) => {
                    return Err(mistyped(
                        pick.from.span,
                        "`pick` chooses among codes",
                        &other,
                    ));
                }
                Err(super::Stop::Finding(finding)) if finding.code != catalogue::LIMIT => {
                    impossible.get_or_insert(finding);
                    continue;
                }
                Err(stop) => return Err(stop),
            };
            let about = inner.inside(&code).about(&code, Vec::new());
            if let Some(condition) = &pick.condition
                && !self.condition(condition, &about)?
            {
                continue;
            }
            let measure = self.evaluate(&pick.measure, &about)?;
            let better = match &best {
                None => true,
                Some((known, ..)) => {
                    let order = placed(value::compare(&measure, known), pick.measure.span)?;
                    order
                        == if pick.maximize {
                            Ordering::Greater
                        } else {
                            Ordering::Less
                        }
                }
            };
            if better {
                best = Some((measure, code, named.join(", ")));
            }
        }
        match best {
            Some((measure, code, choice)) => {
                let measured = self.text(pick.measure.span);
                Ok(Value::Code(code.named(
                    format!(
                        "{} with {choice} ({measured} = {measure})",
                        self.text(pick.from.span)
                    ),
                    span,
                )))
            }
            None => Err(self.nothing_to_pick(pick, total, impossible, span)),
        }
    }

    fn nothing_to_pick(
        &self,
        pick: &Pick,
        total: usize,
        impossible: Option<Box<Finding>>,
        span: Span,
    ) -> super::Stop {
        let mut finding = Finding::new(
            catalogue::EMPTY_CHOICE,
            span,
            match &pick.condition {
                Some(condition) if impossible.is_none() => format!(
                    "none of the {total} candidates satisfies `{}`",
                    self.text(condition.span)
                ),
                _ => format!("none of the {total} candidates can be chosen"),
            },
        )
        .help("widen the domains, or weaken the condition after `where`");
        if let Some(reason) = impossible {
            finding = finding.related(reason.span, format!("one candidate: {}", reason.message));
        }
        super::Stop::Finding(Box::new(finding))
    }

    /// `EXPR over FIELD`
    pub(super) fn over(
        &self,
        value: &Expression,
        field: &Expression,
        scope: &Scope,
    ) -> Outcome<Value> {
        let stated = self.field_of(field, scope)?;
        let inner = self.evaluate(value, &scope.over(&stated))?;
        let own = match &inner {
            Value::Code(code) => Some(code.field()),
            Value::Matrix(matrix) => Some(matrix.field()),
            _ => None,
        };
        if let Some(own) = own.filter(|own| **own != stated) {
            let message = format!("this is over {own}, not over {stated}");
            return Err(wrong(catalogue::FIELD_MISMATCH, value.span, message));
        }
        Ok(inner)
    }

    /// The field an expression names.
    ///
    /// # Errors
    /// When it names none.
    pub(super) fn field_of(&self, expression: &Expression, scope: &Scope) -> Outcome<Field> {
        match self.evaluate(expression, scope)? {
            Value::Field(field) => Ok(field),
            other => Err(mistyped(
                expression.span,
                "a field is needed after `over`",
                &other,
            )),
        }
    }
}

/// That each of some names stands for one thing.
fn distinct<'a>(names: impl Iterator<Item = &'a Name>) -> Outcome<()> {
    let mut seen = std::collections::HashSet::new();
    for name in names {
        if !seen.insert(name.text.as_str()) {
            let message = format!(
                "`{}` is named twice here, so it would mean two things",
                name.text
            );
            return Err(wrong(catalogue::DUPLICATE_NAME, name.span, message));
        }
    }
    Ok(())
}

/// The index-th vector in numeric order, first entry most significant.
fn vector_at(index: u64, order: u64, length: usize) -> Vec<u32> {
    let mut vector = vec![0; length];
    let mut rest = index;
    for entry in vector.iter_mut().rev() {
        *entry = (rest % order) as u32;
        rest /= order;
    }
    vector
}
