//! Builds the forms with words of their own: fields, rows, columns, points, monomials, choices.

use super::grammar::Rule;
use super::reader::{Node, Reader};
use super::tree::*;
use crate::finding::{Finding, Found, catalogue};
use ExpressionKind as Kind;

impl<'a> Reader<'a> {
    /// A primary that begins with a word or a bar.
    pub fn form(&mut self, pair: Node<'a>) -> Found<Kind> {
        match pair.as_rule() {
            Rule::field_literal => self.field_literal(pair),
            Rule::rows => Ok(Kind::Rows(self.rows(pair)?)),
            Rule::blocks => Ok(Kind::Blocks(self.rows(pair)?)),
            Rule::circulants => self.circulants(pair),
            Rule::columns => self.columns(pair),
            Rule::monomials => self.monomials(pair),
            Rule::points => self.points(pair),
            Rule::pick => self.pick(pair),
            other => unreachable!("the grammar has no expression of kind {other:?}"),
        }
    }

    fn field_literal(&mut self, pair: Node<'a>) -> Found<Kind> {
        let (mut order, mut modulus) = (None, None);
        for part in self.parts(pair) {
            match part.as_rule() {
                Rule::relation => modulus = Some(self.relation(part)?),
                Rule::modulus => modulus = Some(Modulus::Polynomial(self.inner_expression(part)?)),
                _ => order = Some(self.expression(part)?),
            }
        }
        let Some(order) = order else {
            unreachable!("the grammar gives a field its order");
        };
        Ok(Kind::Field(Box::new(FieldLiteral { order, modulus })))
    }

    fn relation(&mut self, pair: Node<'a>) -> Found<Modulus> {
        let span = self.span(&pair);
        let mut sides = Vec::new();
        for part in self.parts(pair) {
            sides.push(self.expression(part)?);
        }
        let mut symbols = Vec::new();
        sides
            .iter()
            .for_each(|side| collect_names(side, &mut symbols));
        let finding = |message: &str| {
            Finding::new(catalogue::SYNTAX, span, message)
                .label("the relation of the generator")
                .help("write the generator's equation, such as `where a^4 = a + 1`")
        };
        let Some(symbol) = symbols.first().cloned() else {
            return Err(Box::new(finding("the relation names no generator")));
        };
        if let Some(other) = symbols.iter().find(|name| name.text != symbol.text) {
            let message = format!(
                "the relation names two generators, `{}` and `{}`",
                symbol.text, other.text
            );
            return Err(Box::new(finding(&message)));
        }
        match <[Expression; 2]>::try_from(sides) {
            Ok([left, right]) => Ok(Modulus::Relation {
                symbol,
                left,
                right,
            }),
            Err(_) => unreachable!("the grammar gives a relation two sides"),
        }
    }

    fn rows(&mut self, pair: Node<'a>) -> Found<Vec<Vec<Expression>>> {
        let mut rows = Vec::new();
        for row in self.parts(pair) {
            let entries = self
                .parts(row)
                .map(|entry| self.row_entry(entry))
                .collect::<Found<_>>()?;
            rows.push(entries);
        }
        Ok(rows)
    }

    /// An entry of a row: an atom with its sign and its exponent.
    fn row_entry(&mut self, pair: Node<'a>) -> Found<Expression> {
        let span = self.span(&pair);
        let (mut sign, mut value, mut exponent) = (None, None, None);
        for part in self.parts(pair) {
            match part.as_rule() {
                Rule::minus => sign = Some(self.span(&part)),
                Rule::row_exponent => exponent = Some(self.row_entry(part)?),
                _ => value = Some(self.expression(part)?),
            }
        }
        let Some(mut value) = value else {
            unreachable!("the grammar gives an entry its value");
        };
        if let Some(exponent) = exponent {
            value = Expression {
                span: value.span.to(exponent.span),
                kind: Kind::Binary(BinaryOperator::Power, Box::new(value), Box::new(exponent)),
            };
        }
        if sign.is_some() {
            value = Expression {
                span,
                kind: Kind::Unary(UnaryOperator::Negate, Box::new(value)),
            };
        }
        Ok(value)
    }

    fn circulants(&mut self, pair: Node<'a>) -> Found<Kind> {
        let (mut size, mut rows) = (None, Vec::new());
        for part in self.parts(pair) {
            if part.as_rule() != Rule::shifts {
                size = Some(Box::new(self.expression(part)?));
                continue;
            }
            let mut row = Vec::new();
            for entry in self.parts(part) {
                let zero = entry.as_rule() == Rule::zero_block;
                row.push(if zero {
                    None
                } else {
                    Some(self.row_entry(entry)?)
                });
            }
            rows.push(row);
        }
        match size {
            Some(size) => Ok(Kind::Circulants { size, rows }),
            None => unreachable!("the grammar gives circulants their size"),
        }
    }

    fn columns(&mut self, pair: Node<'a>) -> Found<Kind> {
        let (mut variable, mut height) = (None, None);
        let (mut condition, mut sort, mut take) = (None, Vec::new(), None);
        for part in self.parts(pair) {
            match part.as_rule() {
                Rule::name => variable = Some(self.name(&part)),
                Rule::r#where => condition = Some(self.inner_expression(part)?),
                Rule::sorted => sort = self.sort_keys(part)?,
                Rule::take => take = Some(self.inner_expression(part)?),
                _ => height = Some(self.expression(part)?),
            }
        }
        match (variable, height) {
            (Some(variable), Some(height)) => {
                let columns = Columns {
                    variable,
                    height,
                    condition,
                    sort,
                    take,
                };
                Ok(Kind::Columns(Box::new(columns)))
            }
            _ => unreachable!("the grammar gives columns a name and a height"),
        }
    }

    fn sort_keys(&mut self, pair: Node<'a>) -> Found<Vec<SortKey>> {
        let mut keys = Vec::new();
        for key in self.parts(pair) {
            for part in self.parts(key) {
                match (part.as_rule(), keys.last_mut()) {
                    (Rule::direction, Some(SortKey { descending, .. })) => {
                        *descending = part.as_str() == "descending";
                    }
                    _ => keys.push(SortKey {
                        value: self.expression(part)?,
                        descending: false,
                    }),
                }
            }
        }
        Ok(keys)
    }

    fn monomials(&mut self, pair: Node<'a>) -> Found<Kind> {
        let (mut shape, mut condition) = (MonomialShape::Pattern(Vec::new()), None);
        for part in self.parts(pair) {
            match part.as_rule() {
                Rule::r#where => condition = Some(self.inner_expression(part)?),
                Rule::variables => shape = MonomialShape::Variables(self.inner_expression(part)?),
                _ => shape = MonomialShape::Pattern(self.powers(part)),
            }
        }
        Ok(Kind::Monomials(Box::new(Monomials { shape, condition })))
    }

    fn powers(&self, pair: Node<'a>) -> Vec<(Name, Name)> {
        let power = |power| {
            let mut names = self.parts(power);
            match (names.next(), names.next()) {
                (Some(variable), Some(exponent)) => (self.name(&variable), self.name(&exponent)),
                _ => unreachable!("the grammar gives a power two names"),
            }
        };
        self.parts(pair).map(power).collect()
    }

    fn points(&mut self, pair: Node<'a>) -> Found<Kind> {
        let (mut shape, mut condition) = (PointShape::Named(Vec::new()), None);
        for part in self.parts(pair) {
            match part.as_rule() {
                Rule::r#where => condition = Some(self.inner_expression(part)?),
                Rule::variables => shape = PointShape::Variables(self.inner_expression(part)?),
                _ => {
                    let names = self.parts(part).map(|name| self.name(&name)).collect();
                    shape = PointShape::Named(names);
                }
            }
        }
        Ok(Kind::Points(Box::new(Points { shape, condition })))
    }

    fn pick(&mut self, pair: Node<'a>) -> Found<Kind> {
        let (mut parameters, mut maximize, mut condition) = (Vec::new(), false, None);
        let mut values = Vec::new();
        for part in self.parts(pair) {
            match part.as_rule() {
                Rule::binder => {
                    let (name, domain) = self.binder(part)?;
                    parameters.push(Parameter {
                        name,
                        domain: Some(domain),
                        default: None,
                    });
                }
                Rule::aim => maximize = part.as_str() == "maximizing",
                Rule::r#where => condition = Some(self.inner_expression(part)?),
                _ => values.push(self.expression(part)?),
            }
        }
        match <[Expression; 2]>::try_from(values) {
            Ok([measure, from]) => {
                let pick = Pick {
                    parameters,
                    maximize,
                    measure,
                    from,
                    condition,
                };
                Ok(Kind::Pick(Box::new(pick)))
            }
            Err(_) => unreachable!("the grammar gives a choice its measure and its candidates"),
        }
    }
}

/// The plain names of an expression made of sums, products and powers, in the order written.
fn collect_names(expression: &Expression, names: &mut Vec<Name>) {
    match &expression.kind {
        Kind::Name(text) => names.push(Name {
            text: text.clone(),
            span: expression.span,
        }),
        Kind::Unary(_, value) => collect_names(value, names),
        Kind::Binary(_, left, right) => {
            collect_names(left, names);
            collect_names(right, names);
        }
        _ => {}
    }
}
