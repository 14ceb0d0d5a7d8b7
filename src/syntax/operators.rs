//! Puts a flat list of operands and operators in order of precedence.
//!
//! Loosest first: `or`, `and`, `not`, comparisons, `..`, `+ -`, `* / mod div`, unary `-`, `^`.
//! Two stacks instead of recursion (Dijkstra 1961), so that a long chain needs no call stack.

use super::tree::{BinaryOperator as Binary, Expression, ExpressionKind as Kind, UnaryOperator};
use crate::finding::{Finding, Found, catalogue};
use crate::source::Span;

/// What stands between two operands.
#[derive(Clone, Copy, PartialEq, Eq, Debug)]
pub enum Infix {
    /// An operator of the tree.
    Operator(Binary),
    /// `..`
    Range,
}

impl Infix {
    /// The operator written so, if there is one.
    pub fn read(text: &str) -> Option<Infix> {
        Some(Infix::Operator(match text {
            "+" => Binary::Add,
            "-" => Binary::Subtract,
            "*" => Binary::Multiply,
            "/" => Binary::Divide,
            "div" => Binary::Quotient,
            "mod" => Binary::Modulo,
            "^" => Binary::Power,
            "=" => Binary::Equal,
            "!=" => Binary::Unequal,
            "<" => Binary::Less,
            "<=" => Binary::AtMost,
            ">" => Binary::Greater,
            ">=" => Binary::AtLeast,
            "in" => Binary::In,
            "and" => Binary::And,
            "or" => Binary::Or,
            ".." => return Some(Infix::Range),
            _ => return None,
        }))
    }

    fn level(self) -> u8 {
        use Binary::*;
        match self {
            Infix::Operator(Or) => 1,
            Infix::Operator(And) => 2,
            Infix::Operator(Equal | Unequal | Less | AtMost | Greater | AtLeast | In) => COMPARISON,
            Infix::Range => RANGE,
            Infix::Operator(Add | Subtract) => 6,
            Infix::Operator(Multiply | Divide | Quotient | Modulo) => 7,
            Infix::Operator(Power) => POWER,
        }
    }
}

const NOT: u8 = 3;
const COMPARISON: u8 = 4;
const RANGE: u8 = 5;
const NEGATE: u8 = 8;
const POWER: u8 = 9;

enum Waiting {
    Prefix(UnaryOperator, Span),
    Infix(Infix, Span),
}

impl Waiting {
    fn level(&self) -> u8 {
        match self {
            Waiting::Prefix(UnaryOperator::Not, _) => NOT,
            Waiting::Prefix(UnaryOperator::Negate, _) => NEGATE,
            Waiting::Infix(infix, _) => infix.level(),
        }
    }
}

/// Takes operands and operators in the order they are written.
pub struct Order<'a> {
    text: &'a str,
    operands: Vec<Expression>,
    waiting: Vec<Waiting>,
}

impl<'a> Order<'a> {
    /// An empty list; `text` is the whole file, for messages.
    pub fn new(text: &'a str) -> Order<'a> {
        Order {
            text,
            operands: Vec::new(),
            waiting: Vec::new(),
        }
    }

    /// A `-` or `not` before an operand.
    pub fn prefix(&mut self, operator: UnaryOperator, span: Span) {
        self.waiting.push(Waiting::Prefix(operator, span));
    }

    /// An operand.
    pub fn operand(&mut self, operand: Expression) {
        self.operands.push(operand);
    }

    /// Takes the last operand back, to put an index or a member on it.
    pub fn last(&mut self) -> Option<Expression> {
        self.operands.pop()
    }

    /// An operator between two operands.
    ///
    /// # Errors
    /// When comparisons or ranges are chained.
    pub fn infix(&mut self, infix: Infix, span: Span) -> Found<()> {
        let level = infix.level();
        while let Some(top) = self.waiting.last() {
            let reduces = top.level() > level || top.level() == level && level != POWER;
            if !reduces {
                break;
            }
            let chains = matches!(top, Waiting::Infix(first, _) if first.level() == level);
            if chains && matches!(level, COMPARISON | RANGE) {
                return Err(Box::new(self.chained(level, span)));
            }
            self.reduce();
        }
        self.waiting.push(Waiting::Infix(infix, span));
        Ok(())
    }

    /// The whole expression; `None` when no operand was given.
    pub fn finish(mut self) -> Option<Expression> {
        while !self.waiting.is_empty() {
            self.reduce();
        }
        self.operands.pop()
    }

    fn reduce(&mut self) {
        let (Some(waiting), Some(right)) = (self.waiting.pop(), self.operands.pop()) else {
            return;
        };
        let built = match waiting {
            Waiting::Prefix(operator, span) => Expression {
                span: span.to(right.span),
                kind: Kind::Unary(operator, Box::new(right)),
            },
            Waiting::Infix(infix, _) => {
                let Some(left) = self.operands.pop() else {
                    return;
                };
                let span = left.span.to(right.span);
                let (left, right) = (Box::new(left), Box::new(right));
                let kind = match infix {
                    Infix::Operator(operator) => Kind::Binary(operator, left, right),
                    Infix::Range => Kind::Range(left, right),
                };
                Expression { span, kind }
            }
        };
        self.operands.push(built);
    }

    fn chained(&self, level: u8, second: Span) -> Finding {
        if level == RANGE {
            return Finding::new(catalogue::SYNTAX, second, "a range has two ends")
                .label("a second `..`")
                .help("write `first..last`; both ends belong to the range");
        }
        let finding = Finding::new(catalogue::SYNTAX, second, "comparisons do not chain")
            .label("a second comparison");
        let written = |span: Span| {
            self.text
                .get(span.start as usize..span.end as usize)
                .unwrap_or("")
        };
        match (self.waiting.last(), self.operands.as_slice()) {
            (Some(Waiting::Infix(_, first)), [.., left, middle]) => finding.help(format!(
                "join two comparisons with `and`: `{} {} {} and {} {} …`",
                written(left.span),
                written(*first),
                written(middle.span),
                written(middle.span),
                written(second),
            )),
            _ => finding.help("join two comparisons with `and`"),
        }
    }
}
