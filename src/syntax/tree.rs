//! The syntax tree: every node carries the span it was read from, nothing is resolved yet.

use crate::source::Span;
use num_bigint::BigInt;
use num_rational::BigRational;

/// A name and where it stands.
#[derive(Clone, PartialEq, Eq, Debug)]
pub struct Name {
    /// The identifier itself.
    pub text: String,
    /// Where it stands.
    pub span: Span,
}

/// A quoted string, unescaped, and where it stands (quotes included).
#[derive(Clone, PartialEq, Eq, Debug)]
pub struct Text {
    /// The content.
    pub value: String,
    /// Where it stands.
    pub span: Span,
}

/// One file: the declarations that could be read, in order.
#[derive(Clone, Debug, Default)]
pub struct File {
    /// In the order of the file.
    pub declarations: Vec<Declaration>,
}

/// One declaration with the `##` text before it.
#[derive(Clone, Debug)]
pub struct Declaration {
    /// The `##` lines before it, without the marks, joined by newlines.
    pub documentation: Option<String>,
    /// From its keyword to its last token.
    pub span: Span,
    /// What it declares.
    pub kind: DeclarationKind,
}

/// What a declaration declares.
#[derive(Clone, Debug)]
pub enum DeclarationKind {
    /// `use "file.coset" (a, b)`
    Use(Use),
    /// `field NAME = GF(q) where …`
    Field(FieldDeclaration),
    /// `let NAME(params) = EXPR`
    Let(Let),
    /// `matrix NAME(params) over FIELD = EXPR`
    Matrix(MatrixDeclaration),
    /// `code NAME(params) over FIELD = BODY clause*`
    Code(CodeDeclaration),
    /// `channel NAME = MODEL`
    Channel(ChannelDeclaration),
    /// `deliver CODE to "folder" …`
    Deliver(Deliver),
}

/// `use "file.coset"`, or with names only those.
#[derive(Clone, Debug)]
pub struct Use {
    /// The file, relative to the one that says so.
    pub path: Text,
    /// The names taken; `None` takes all.
    pub names: Option<Vec<Name>>,
}

/// `field NAME = GF(…) …`
#[derive(Clone, Debug)]
pub struct FieldDeclaration {
    /// The field's name.
    pub name: Name,
    /// A field literal or the name of another field.
    pub value: Expression,
}

/// `let NAME(params) = EXPR`
#[derive(Clone, Debug)]
pub struct Let {
    /// The value's name.
    pub name: Name,
    /// Parameters, none for a plain value.
    pub parameters: Vec<Parameter>,
    /// The value.
    pub value: Expression,
}

/// `matrix NAME(params) over FIELD = EXPR`
#[derive(Clone, Debug)]
pub struct MatrixDeclaration {
    /// The matrix's name.
    pub name: Name,
    /// Parameters, none for a plain matrix.
    pub parameters: Vec<Parameter>,
    /// The field of its entries.
    pub over: Option<Expression>,
    /// The matrix.
    pub value: Expression,
}

/// `code NAME(params) over FIELD = BODY clause*`
#[derive(Clone, Debug)]
pub struct CodeDeclaration {
    /// The code's name.
    pub name: Name,
    /// Parameters, none for a plain code.
    pub parameters: Vec<Parameter>,
    /// Its field; an undeclared name makes a parametrised code generic over it.
    pub over: Option<Expression>,
    /// Construction and steps.
    pub body: Expression,
    /// `is`, `require`, `prefer`, `bits`, `note`, in order.
    pub clauses: Vec<Clause>,
}

/// `NAME in DOMAIN = DEFAULT`, both optional.
#[derive(Clone, Debug)]
pub struct Parameter {
    /// Its name.
    pub name: Name,
    /// The finite set it ranges over.
    pub domain: Option<Expression>,
    /// The value when none is given.
    pub default: Option<Expression>,
}

/// `channel NAME = bsc(0.004)`
#[derive(Clone, Debug)]
pub struct ChannelDeclaration {
    /// The channel's name.
    pub name: Name,
    /// A call that names the model and its figures.
    pub model: Expression,
}

/// `deliver CODE to "folder" WHAT as FORMAT, FORMAT …`
#[derive(Clone, Debug)]
pub struct Deliver {
    /// A code's name, or a member of a family.
    pub code: Expression,
    /// The folder, relative to the spec.
    pub folder: Text,
    /// What is written there.
    pub artefacts: Vec<Artefact>,
}

/// `check_matrix as mtx, npy` or `check_matrix in systematic form as mtx`
#[derive(Clone, Debug)]
pub struct Artefact {
    /// What is written.
    pub what: Name,
    /// `as_built`, `systematic` or `reduced`, if stated.
    pub form: Option<Name>,
    /// In which formats.
    pub formats: Vec<Name>,
}

/// One clause of a code.
#[derive(Clone, Debug)]
pub struct Clause {
    /// The whole clause.
    pub span: Span,
    /// What it says.
    pub kind: ClauseKind,
}

/// What a clause says.
#[derive(Clone, Debug)]
// A code has few clauses, and matching on a claim is plainer without a box.
#[allow(clippy::large_enum_variant)]
pub enum ClauseKind {
    /// `is [n, k, d] with weights {…}`
    Claim(Claim),
    /// `require …` or `prefer …`
    Requirement(Requirement),
    /// `bits data[63..0], check[7..0]`
    Bits(Vec<BitGroup>),
    /// `note "…"`
    Note(Text),
}

/// `is [n, k, d]`, each a bound, and the weights if claimed.
#[derive(Clone, Debug)]
pub struct Claim {
    /// The claimed length.
    pub length: Bound,
    /// The claimed dimension.
    pub dimension: Bound,
    /// The claimed distance; `is [n, k]` leaves it open.
    pub distance: Option<Bound>,
    /// The claimed weight distribution: weight and number of words.
    pub weights: Option<Weights>,
}

/// `with weights {0: 1, 8: 759}`
#[derive(Clone, Debug)]
pub struct Weights {
    /// The braces and all between.
    pub span: Span,
    /// Weight and how many words have it.
    pub entries: Vec<(Expression, Expression)>,
}

/// One entry of a claim.
#[derive(Clone, Debug)]
pub struct Bound {
    /// The entry.
    pub span: Span,
    /// What it says.
    pub kind: BoundKind,
}

/// What an entry of a claim says.
#[derive(Clone, Debug)]
pub enum BoundKind {
    /// `_`
    Open,
    /// `4`
    Exactly(Expression),
    /// `>= 43`
    Compared(BinaryOperator, Expression),
}

/// `require CONDITION` or `prefer CONDITION`.
#[derive(Clone, Debug)]
pub struct Requirement {
    /// `require` fails the spec, `prefer` warns.
    pub strength: Strength,
    /// The condition's text as written, white space folded.
    pub text: String,
    /// The condition alone.
    pub span: Span,
    /// The condition.
    pub condition: Condition,
}

/// How binding a requirement is.
#[derive(Clone, Copy, PartialEq, Eq, Debug)]
pub enum Strength {
    /// A failure fails the spec.
    Require,
    /// A failure warns.
    Prefer,
}

/// The condition of a requirement.
#[derive(Clone, Debug)]
pub enum Condition {
    /// Words of the requirement vocabulary with operands between them: `corrects 1 while detecting 2`.
    Phrase(Vec<PhrasePart>),
    /// A comparison or a property: `d >= 4`, `mds`, `row_weight <= 36`.
    Expression(Expression),
}

/// A part of a phrase.
#[derive(Clone, Debug)]
pub enum PhrasePart {
    /// A word of the vocabulary.
    Word(Name),
    /// An operand.
    Operand(Expression),
}

/// `data[63..0]`: names for consecutive positions, in the order written.
#[derive(Clone, Debug)]
pub struct BitGroup {
    /// The group's name.
    pub name: Name,
    /// Its index range as written; `None` for a single position.
    pub range: Option<(Expression, Expression)>,
    /// The whole group.
    pub span: Span,
}

/// An expression and where it stands.
#[derive(Clone, Debug)]
pub struct Expression {
    /// Where it stands.
    pub span: Span,
    /// What it is.
    pub kind: ExpressionKind,
}

/// What an expression is. Codes, matrices and numbers share one grammar; types are checked when
/// an expression is evaluated.
#[derive(Clone, Debug)]
pub enum ExpressionKind {
    /// `42`, `0x1d`
    Integer(BigInt),
    /// `0.004`, `1e-12`, exact
    Decimal(BigRational),
    /// `true`, `false`
    Boolean(bool),
    /// `"text"`
    Text(String),
    /// A name.
    Name(String),
    /// `f(a, name: b)`
    Call {
        /// What is called.
        function: Name,
        /// In order.
        arguments: Vec<Argument>,
    },
    /// `v[i]`
    Index(Box<Expression>, Box<Expression>),
    /// `dual.d`
    Member(Box<Expression>, Name),
    /// `-x`, `not x`
    Unary(UnaryOperator, Box<Expression>),
    /// `x + y`
    Binary(BinaryOperator, Box<Expression>, Box<Expression>),
    /// `a..b`, inclusive
    Range(Box<Expression>, Box<Expression>),
    /// `{a, b..c}`; a range among the items stands for its members
    Set(Vec<Expression>),
    /// `[a, b]`
    List(Vec<Expression>),
    /// `{ ELEMENT for x in S, y in T where COND }`; a list when written in `[ ]`
    Comprehension(Box<Comprehension>),
    /// `A if C else B`
    Conditional {
        /// The condition.
        condition: Box<Expression>,
        /// The value when it holds.
        then: Box<Expression>,
        /// The value otherwise.
        otherwise: Box<Expression>,
    },
    /// `GF(q) where a^m = …` or `GF(q) modulus POLYNOMIAL`
    Field(Box<FieldLiteral>),
    /// `| 1 0 | | 0 1 |`
    Rows(Vec<Vec<Expression>>),
    /// `blocks | A B | | C D |`
    Blocks(Vec<Vec<Expression>>),
    /// `circulants of size z | 0 - | …`
    Circulants {
        /// The size of a block.
        size: Box<Expression>,
        /// The shifts; `None` for the zero block.
        rows: Vec<Vec<Option<Expression>>>,
    },
    /// `columns v of height r where … sorted by … take …`
    Columns(Box<Columns>),
    /// `monomials …`
    Monomials(Box<Monomials>),
    /// `points …`
    Points(Box<Points>),
    /// `EXPR over FIELD`
    Over(Box<Expression>, Box<Expression>),
    /// `CODE then STEP`
    Then(Box<Expression>, Step),
    /// `pick r in S minimizing n from CODE where COND`
    Pick(Box<Pick>),
}

/// An argument of a call.
#[derive(Clone, Debug)]
pub struct Argument {
    /// Its name, if given by name.
    pub name: Option<Name>,
    /// Its value.
    pub value: Expression,
}

/// `then NAME(arguments)`
#[derive(Clone, Debug)]
pub struct Step {
    /// The step.
    pub name: Name,
    /// Its arguments, none without parentheses.
    pub arguments: Vec<Argument>,
    /// Name and arguments.
    pub span: Span,
}

/// Operators with one operand.
#[derive(Clone, Copy, PartialEq, Eq, Debug)]
pub enum UnaryOperator {
    /// `-`
    Negate,
    /// `not`
    Not,
}

/// Operators with two operands.
#[derive(Clone, Copy, PartialEq, Eq, Debug)]
pub enum BinaryOperator {
    /// `+`
    Add,
    /// `-`
    Subtract,
    /// `*`
    Multiply,
    /// `/`, exact
    Divide,
    /// `div`, floored
    Quotient,
    /// `mod`, never negative
    Modulo,
    /// `^`
    Power,
    /// `=`
    Equal,
    /// `!=`
    Unequal,
    /// `<`
    Less,
    /// `<=`
    AtMost,
    /// `>`
    Greater,
    /// `>=`
    AtLeast,
    /// `in`
    In,
    /// `and`
    And,
    /// `or`
    Or,
}

/// The variables, domains and condition of a comprehension.
#[derive(Clone, Debug)]
pub struct Comprehension {
    /// What each choice contributes.
    pub element: Expression,
    /// `x in S`, leftmost slowest.
    pub binders: Vec<(Name, Expression)>,
    /// Which choices count.
    pub condition: Option<Expression>,
    /// A list in `[ ]` keeps order and repetition; a set does not.
    pub list: bool,
}

/// `GF(ORDER)` and what is stated of its modulus.
#[derive(Clone, Debug)]
pub struct FieldLiteral {
    /// The order, `2^8` or `256`.
    pub order: Expression,
    /// What is stated of its modulus.
    pub modulus: Option<Modulus>,
}

/// What is stated of a field's modulus.
#[derive(Clone, Debug)]
pub enum Modulus {
    /// `where a^4 = a + 1`: the modulus, and that its root `a` generates the field.
    Relation {
        /// The generator's name.
        symbol: Name,
        /// The left side.
        left: Expression,
        /// The right side.
        right: Expression,
    },
    /// `modulus x^8 + x^4 + x^3 + x + 1`: irreducible is enough.
    Polynomial(Expression),
}

/// A family of columns in numeric order, the first row most significant.
#[derive(Clone, Debug)]
pub struct Columns {
    /// The name of a column in the condition and the order.
    pub variable: Name,
    /// How many rows.
    pub height: Expression,
    /// Which vectors are taken.
    pub condition: Option<Expression>,
    /// In which order, most important first.
    pub sort: Vec<SortKey>,
    /// How many of them.
    pub take: Option<Expression>,
}

/// One key of an order.
#[derive(Clone, Debug)]
pub struct SortKey {
    /// What is compared.
    pub value: Expression,
    /// `descending` was written.
    pub descending: bool,
}

/// A set of monomials.
#[derive(Clone, Debug)]
pub struct Monomials {
    /// In how many variables, or of which shape.
    pub shape: MonomialShape,
    /// Which of them.
    pub condition: Option<Expression>,
}

/// Which monomials are meant.
#[derive(Clone, Debug)]
pub enum MonomialShape {
    /// `in m variables`; the condition may speak of `degree`.
    Variables(Expression),
    /// `x^i * y^j`: the variables with the names of their exponents.
    Pattern(Vec<(Name, Name)>),
}

/// A set of points.
#[derive(Clone, Debug)]
pub struct Points {
    /// In how many variables, or with which coordinate names.
    pub shape: PointShape,
    /// Which of them.
    pub condition: Option<Expression>,
}

/// Which points are meant.
#[derive(Clone, Debug)]
pub enum PointShape {
    /// `in m variables`
    Variables(Expression),
    /// `(x, y)`
    Named(Vec<Name>),
}

/// `pick PARAMS minimizing EXPR from CODE where COND`
#[derive(Clone, Debug)]
pub struct Pick {
    /// The parameters and their domains.
    pub parameters: Vec<Parameter>,
    /// Whether the largest is wanted.
    pub maximize: bool,
    /// What is compared.
    pub measure: Expression,
    /// The candidates.
    pub from: Expression,
    /// Which of them may be chosen.
    pub condition: Option<Expression>,
}
