//! Builds expressions from the pairs that the grammar yields.

use super::grammar::{Rule, is_mark};
use super::literals;
use super::operators::{Infix, Order};
use super::reader::{Node, Reader};
use super::tree::*;
use crate::finding::{Finding, Found, catalogue};
use ExpressionKind as Kind;

/// How many operators and steps may hang on one another in one declaration.
pub const MAX_CHAIN: usize = 1000;

impl<'a> Reader<'a> {
    /// An expression from any of the rules that stand for one.
    pub fn expression(&mut self, pair: Node<'a>) -> Found<Expression> {
        match pair.as_rule() {
            Rule::expression | Rule::phrase_operand => self.chain(pair),
            Rule::conditional => self.conditional(pair),
            Rule::logic | Rule::range | Rule::sum => self.ordered(pair),
            Rule::primary | Rule::field_operand => {
                let inner = self.only(pair);
                self.primary(inner)
            }
            _ => self.primary(pair),
        }
    }

    /// The expression that is the single part of `pair`.
    pub fn inner_expression(&mut self, pair: Node<'a>) -> Found<Expression> {
        let inner = self.only(pair);
        self.expression(inner)
    }

    fn deepen(&mut self, by: usize, pair: &Node<'a>) -> Found<()> {
        self.chain += by;
        if self.chain <= MAX_CHAIN {
            return Ok(());
        }
        let message = format!("more than {MAX_CHAIN} operators hang on one another here");
        Err(Box::new(
            Finding::new(catalogue::LIMIT, self.span(pair), message)
                .label("too long a chain")
                .help("name a part of it with `let` and use the name here"),
        ))
    }

    fn chain(&mut self, pair: Node<'a>) -> Found<Expression> {
        let links = pair.clone().into_inner().count().saturating_sub(1);
        self.deepen(links, &pair)?;
        let mut parts = pair.into_inner();
        let mut value = match parts.next() {
            Some(first) => self.expression(first)?,
            None => unreachable!("the grammar begins a chain with an expression"),
        };
        for part in parts {
            let span = value.span.to(self.span(&part));
            let kind = match part.as_rule() {
                Rule::over => Kind::Over(Box::new(value), Box::new(self.inner_expression(part)?)),
                _ => {
                    let step = self.only(part);
                    Kind::Then(Box::new(value), self.step(step)?)
                }
            };
            value = Expression { span, kind };
        }
        self.chain -= links;
        Ok(value)
    }

    fn step(&mut self, pair: Node<'a>) -> Found<Step> {
        let span = self.span(&pair);
        let (name, arguments) = self.name_and_arguments(pair)?;
        Ok(Step {
            name,
            arguments: arguments.unwrap_or_default(),
            span,
        })
    }

    fn conditional(&mut self, pair: Node<'a>) -> Found<Expression> {
        let parts: Vec<_> = self.parts(pair.clone()).collect();
        let links = parts.len() - 1;
        self.deepen(links, &pair)?;
        let mut values = Vec::with_capacity(parts.len());
        for part in parts {
            values.push(self.expression(part)?);
        }
        self.chain -= links;
        let mut values = values.into_iter().rev();
        let Some(mut value) = values.next() else {
            unreachable!("the grammar gives a conditional a value");
        };
        while let (Some(condition), Some(then)) = (values.next(), values.next()) {
            value = Expression {
                span: then.span.to(value.span),
                kind: Kind::Conditional {
                    condition: Box::new(condition),
                    then: Box::new(then),
                    otherwise: Box::new(value),
                },
            };
        }
        Ok(value)
    }

    fn ordered(&mut self, pair: Node<'a>) -> Found<Expression> {
        let links = depth_of_list(&pair);
        self.deepen(links, &pair)?;
        let mut order = Order::new(self.text);
        for part in pair.into_inner() {
            let span = self.span(&part);
            match part.as_rule() {
                Rule::prefix if part.as_str() == "-" => order.prefix(UnaryOperator::Negate, span),
                Rule::prefix => order.prefix(UnaryOperator::Not, span),
                Rule::primary => order.operand(self.inner_primary(part)?),
                Rule::index | Rule::member => {
                    let Some(value) = order.last() else {
                        unreachable!("the grammar puts an index after a value");
                    };
                    let span = value.span.to(span);
                    let value = Box::new(value);
                    let kind = if part.as_rule() == Rule::index {
                        Kind::Index(value, Box::new(self.inner_expression(part)?))
                    } else {
                        Kind::Member(value, self.inner_name(part))
                    };
                    order.operand(Expression { span, kind });
                }
                _ => match Infix::read(part.as_str()) {
                    Some(infix) => order.infix(infix, span)?,
                    None => unreachable!("the grammar has no other operator"),
                },
            }
        }
        self.chain -= links;
        match order.finish() {
            Some(value) => Ok(value),
            None => unreachable!("the grammar gives a list of operands one at least"),
        }
    }

    fn inner_primary(&mut self, pair: Node<'a>) -> Found<Expression> {
        let inner = self.only(pair);
        self.primary(inner)
    }

    fn primary(&mut self, pair: Node<'a>) -> Found<Expression> {
        let span = self.span(&pair);
        let text = pair.as_str();
        let kind = match pair.as_rule() {
            Rule::integer | Rule::hexadecimal | Rule::binary => {
                literals::integer(text, span, self.text)?
            }
            Rule::decimal => literals::decimal(text, span)?,
            Rule::boolean => Kind::Boolean(text == "true"),
            Rule::string => Kind::Text(literals::unescape(text)),
            Rule::name => Kind::Name(text.to_string()),
            Rule::named | Rule::row_named => match self.name_and_arguments(pair)? {
                (function, Some(arguments)) => Kind::Call {
                    function,
                    arguments,
                },
                (name, None) => Kind::Name(name.text),
            },
            Rule::set | Rule::list => self.collection(pair)?,
            Rule::bracketed => {
                let inner = self.inner_expression(pair)?;
                return Ok(Expression {
                    span,
                    kind: inner.kind,
                });
            }
            _ => self.form(pair)?,
        };
        Ok(Expression { span, kind })
    }

    /// A name, and arguments if there are parentheses.
    pub fn name_and_arguments(&mut self, pair: Node<'a>) -> Found<(Name, Option<Vec<Argument>>)> {
        let mut parts = pair.into_inner();
        let name = match parts.next() {
            Some(first) => self.name(&first),
            None => unreachable!("the grammar begins a call with a name"),
        };
        let arguments = parts.next().map(|list| self.arguments(list)).transpose()?;
        Ok((name, arguments))
    }

    /// The arguments between parentheses.
    pub fn arguments(&mut self, pair: Node<'a>) -> Found<Vec<Argument>> {
        let mut arguments = Vec::new();
        for argument in self.parts(pair) {
            let mut name = None;
            for part in self.parts(argument) {
                if part.as_rule() == Rule::label {
                    name = Some(self.name(&part));
                } else {
                    arguments.push(Argument {
                        name: name.take(),
                        value: self.expression(part)?,
                    });
                }
            }
        }
        Ok(arguments)
    }

    fn collection(&mut self, pair: Node<'a>) -> Found<Kind> {
        let list = pair.as_rule() == Rule::list;
        let mut items = Vec::new();
        for part in self.parts(pair) {
            if part.as_rule() != Rule::comprehension {
                items.push(self.expression(part)?);
                continue;
            }
            let Some(element) = items.pop() else {
                unreachable!("the grammar puts an element before `for`");
            };
            let (mut binders, mut condition) = (Vec::new(), None);
            for part in self.parts(part) {
                match part.as_rule() {
                    Rule::binder => {
                        let (name, domain) = self.binder(part)?;
                        binders.push((name, domain));
                    }
                    _ => condition = Some(self.inner_expression(part)?),
                }
            }
            let comprehension = Comprehension {
                element,
                binders,
                condition,
                list,
            };
            return Ok(Kind::Comprehension(Box::new(comprehension)));
        }
        Ok(if list {
            Kind::List(items)
        } else {
            Kind::Set(items)
        })
    }

    /// `x in S`
    pub fn binder(&mut self, pair: Node<'a>) -> Found<(Name, Expression)> {
        let mut parts = self.parts(pair);
        match (parts.next(), parts.next()) {
            (Some(name), Some(domain)) => Ok((self.name(&name), self.domain(domain)?)),
            _ => unreachable!("the grammar gives a variable its domain"),
        }
    }

    /// `in S`
    pub fn domain(&mut self, pair: Node<'a>) -> Found<Expression> {
        let inner = self.only(pair);
        if inner.as_rule() != Rule::plain_field {
            return self.expression(inner);
        }
        let span = self.span(&inner);
        let order = self.inner_expression(inner)?;
        let literal = FieldLiteral {
            order,
            modulus: None,
        };
        Ok(Expression {
            span,
            kind: Kind::Field(Box::new(literal)),
        })
    }

    /// The parts of a pair that carry meaning.
    pub fn parts(&self, pair: Node<'a>) -> impl Iterator<Item = Node<'a>> + use<'a> {
        pair.into_inner().filter(|part| !is_mark(part.as_rule()))
    }
}

/// How deep the tree of a flat list of operands and operators may become: the number of its
/// operators, where a power counts only if it stands on another.
fn depth_of_list(pair: &Node<'_>) -> usize {
    let mut power_before = false;
    pair.clone()
        .into_inner()
        .filter(|part| part.as_rule() != Rule::primary)
        .filter(|part| {
            let power = part.as_str() == "^";
            let counts = !power || power_before;
            power_before = power;
            counts
        })
        .count()
}
