//! Walks a declaration and lists the names in it that nothing inside it binds.

use crate::source::Span;
use crate::syntax::tree::*;
use ExpressionKind as Kind;

/// How a name is used.
#[derive(Clone, Copy, PartialEq, Eq, Debug)]
pub enum Role {
    /// By itself.
    Name,
    /// As the value of a named argument, where some arguments take words: `data: first`.
    Choice,
    /// Called.
    Function,
    /// After `then`.
    Step,
}

/// A name that is bound outside the declaration, or nowhere.
#[derive(Clone, Debug)]
pub struct Mention<'t> {
    /// The name.
    pub text: &'t str,
    /// Where it stands.
    pub span: Span,
    /// How it is used.
    pub role: Role,
    /// Whether properties of a code can be spoken of here.
    pub properties: bool,
    /// Whether it stands in a step's arguments, where `n`, `k` and `q` are bound.
    pub stepping: bool,
    /// The clause it stands in, counted from 0.
    pub clause: Option<usize>,
    /// The names bound at this place, for near matches.
    pub bound: Vec<&'t str>,
}

/// What is known while walking.
pub struct Walk<'t, 'l> {
    bound: Vec<&'t str>,
    properties: bool,
    stepping: bool,
    clause: Option<usize>,
    mentions: Vec<Mention<'t>>,
    known: &'l dyn Fn(&str) -> bool,
}

/// The free names of a declaration; `known` says whether a name is declared outside.
pub fn mentions<'t>(
    declaration: &'t DeclarationKind,
    known: &dyn Fn(&str) -> bool,
) -> Vec<Mention<'t>> {
    let mut walk = Walk {
        bound: Vec::new(),
        properties: false,
        stepping: false,
        clause: None,
        mentions: Vec::new(),
        known,
    };
    walk.declaration(declaration);
    walk.mentions
}

impl<'t> Walk<'t, '_> {
    fn declaration(&mut self, declaration: &'t DeclarationKind) {
        match declaration {
            DeclarationKind::Use(_) => {}
            DeclarationKind::Field(it) => self.expression(&it.value),
            DeclarationKind::Let(it) => {
                self.parameters(&it.parameters);
                self.expression(&it.value);
            }
            DeclarationKind::Matrix(it) => {
                // A domain may speak of the field: it comes first.
                self.over(&it.over, !it.parameters.is_empty());
                self.parameters(&it.parameters);
                self.expression(&it.value);
            }
            DeclarationKind::Code(it) => {
                // A domain may speak of the field: it comes first.
                self.over(&it.over, !it.parameters.is_empty());
                self.parameters(&it.parameters);
                self.expression(&it.body);
                self.clauses(&it.clauses);
            }
            DeclarationKind::Channel(it) => self.expression(&it.model),
            DeclarationKind::Deliver(it) => self.expression(&it.code),
        }
    }

    fn parameters(&mut self, parameters: &'t [Parameter]) {
        for parameter in parameters {
            self.maybe(&parameter.domain);
            self.maybe(&parameter.default);
            self.bound.push(&parameter.name.text);
        }
    }

    /// A field; an undeclared name in a parametrised declaration stands for any.
    fn over(&mut self, field: &'t Option<Expression>, generic: bool) {
        match field {
            Some(Expression {
                kind: Kind::Name(name),
                ..
            }) if generic && !(self.known)(name) => {
                self.bound.push(name);
            }
            field => self.maybe(field),
        }
    }

    fn clauses(&mut self, clauses: &'t [Clause]) {
        let depth = self.bound.len();
        for clause in clauses {
            if let ClauseKind::Bits(groups) = &clause.kind {
                self.bound
                    .extend(groups.iter().map(|group| group.name.text.as_str()));
            }
        }
        self.properties = true;
        for (index, clause) in clauses.iter().enumerate() {
            self.clause = Some(index);
            self.clause(&clause.kind);
        }
        self.properties = false;
        self.clause = None;
        self.bound.truncate(depth);
    }

    fn clause(&mut self, clause: &'t ClauseKind) {
        match clause {
            ClauseKind::Claim(claim) => {
                for bound in [&claim.length, &claim.dimension]
                    .into_iter()
                    .chain(&claim.distance)
                {
                    match &bound.kind {
                        BoundKind::Open => {}
                        BoundKind::Exactly(value) | BoundKind::Compared(_, value) => {
                            self.expression(value)
                        }
                    }
                }
                for (weight, count) in claim.weights.iter().flat_map(|weights| &weights.entries) {
                    self.expression(weight);
                    self.expression(count);
                }
            }
            ClauseKind::Requirement(requirement) => match &requirement.condition {
                Condition::Expression(condition) => self.expression(condition),
                Condition::Phrase(parts) => {
                    for part in parts {
                        if let PhrasePart::Operand(value) = part {
                            self.expression(value);
                        }
                    }
                }
            },
            ClauseKind::Bits(groups) => {
                for (first, last) in groups.iter().filter_map(|group| group.range.as_ref()) {
                    self.expression(first);
                    self.expression(last);
                }
            }
            ClauseKind::Note(_) => {}
        }
    }

    fn mention(&mut self, text: &'t str, span: Span, role: Role) {
        let bound = role != Role::Step && self.bound.contains(&text);
        if !bound {
            self.mentions.push(Mention {
                text,
                span,
                role,
                properties: self.properties,
                stepping: self.stepping,
                clause: self.clause,
                bound: self.bound.clone(),
            });
        }
    }

    fn maybe(&mut self, expression: &'t Option<Expression>) {
        if let Some(expression) = expression {
            self.expression(expression);
        }
    }

    /// Walks an expression with more names bound.
    fn within(
        &mut self,
        names: impl IntoIterator<Item = &'t str>,
        expression: &'t Option<Expression>,
    ) {
        let depth = self.bound.len();
        self.bound.extend(names);
        self.maybe(expression);
        self.bound.truncate(depth);
    }

    fn expression(&mut self, expression: &'t Expression) {
        match &expression.kind {
            Kind::Integer(_) | Kind::Decimal(_) | Kind::Boolean(_) | Kind::Text(_) => {}
            Kind::Name(name) => self.mention(name, expression.span, Role::Name),
            Kind::Call {
                function,
                arguments,
            } => {
                self.mention(&function.text, function.span, Role::Function);
                self.arguments(arguments);
            }
            Kind::Index(left, right)
            | Kind::Binary(_, left, right)
            | Kind::Range(left, right)
            | Kind::Over(left, right) => {
                self.expression(left);
                self.expression(right);
            }
            Kind::Member(value, _) | Kind::Unary(_, value) => self.expression(value),
            Kind::Set(items) | Kind::List(items) => {
                items.iter().for_each(|item| self.expression(item))
            }
            Kind::Conditional {
                condition,
                then,
                otherwise,
            } => {
                self.expression(then);
                self.expression(condition);
                self.expression(otherwise);
            }
            Kind::Rows(rows) | Kind::Blocks(rows) => {
                rows.iter()
                    .flatten()
                    .for_each(|entry| self.expression(entry));
            }
            Kind::Then(code, step) => {
                self.expression(code);
                self.step(step);
            }
            _ => self.form(&expression.kind),
        }
    }

    fn arguments(&mut self, arguments: &'t [Argument]) {
        for argument in arguments {
            match (&argument.name, &argument.value) {
                (
                    Some(_),
                    Expression {
                        kind: Kind::Name(name),
                        span,
                    },
                ) => {
                    self.mention(name, *span, Role::Choice);
                }
                (_, value) => self.expression(value),
            }
        }
    }

    fn step(&mut self, step: &'t Step) {
        self.mention(&step.name.text, step.name.span, Role::Step);
        let depth = self.bound.len();
        let stepping = std::mem::replace(&mut self.stepping, true);
        self.bound.extend(["n", "k", "q"]);
        self.arguments(&step.arguments);
        self.stepping = stepping;
        self.bound.truncate(depth);
    }

    /// The forms that bind names.
    fn form(&mut self, kind: &'t Kind) {
        match kind {
            Kind::Comprehension(it) => {
                let depth = self.bound.len();
                for (name, domain) in &it.binders {
                    self.expression(domain);
                    self.bound.push(&name.text);
                }
                self.maybe(&it.condition);
                self.expression(&it.element);
                self.bound.truncate(depth);
            }
            Kind::Field(it) => self.field(it),
            Kind::Circulants { size, rows } => {
                self.expression(size);
                rows.iter()
                    .flatten()
                    .flatten()
                    .for_each(|shift| self.expression(shift));
            }
            Kind::Columns(it) => {
                self.expression(&it.height);
                self.maybe(&it.take);
                let depth = self.bound.len();
                self.bound.push(&it.variable.text);
                self.maybe(&it.condition);
                it.sort.iter().for_each(|key| self.expression(&key.value));
                self.bound.truncate(depth);
            }
            Kind::Monomials(it) => match &it.shape {
                MonomialShape::Variables(count) => {
                    self.expression(count);
                    self.within(["degree"], &it.condition);
                }
                MonomialShape::Pattern(powers) => {
                    let exponents = powers.iter().map(|(_, exponent)| exponent.text.as_str());
                    self.within(exponents.chain(["degree"]), &it.condition);
                }
            },
            Kind::Points(it) => match &it.shape {
                PointShape::Variables(count) => {
                    self.expression(count);
                    self.maybe(&it.condition);
                }
                PointShape::Named(names) => {
                    self.within(names.iter().map(|name| name.text.as_str()), &it.condition);
                }
            },
            Kind::Pick(it) => self.pick(it),
            _ => {}
        }
    }

    fn field(&mut self, field: &'t FieldLiteral) {
        self.expression(&field.order);
        let depth = self.bound.len();
        match &field.modulus {
            None => {}
            Some(Modulus::Polynomial(polynomial)) => {
                self.bound.push("x");
                self.expression(polynomial);
            }
            Some(Modulus::Relation {
                symbol,
                left,
                right,
            }) => {
                self.bound.push(&symbol.text);
                self.expression(left);
                self.expression(right);
            }
        }
        self.bound.truncate(depth);
    }

    fn pick(&mut self, pick: &'t Pick) {
        let depth = self.bound.len();
        self.parameters(&pick.parameters);
        self.expression(&pick.from);
        let properties = std::mem::replace(&mut self.properties, true);
        self.expression(&pick.measure);
        self.maybe(&pick.condition);
        self.properties = properties;
        self.bound.truncate(depth);
    }
}
