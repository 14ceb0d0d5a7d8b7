//! A call with its arguments bound to the parameters of what is called.

use super::{Parameter, Trouble, Value, element_of, items_of};
use crate::algebra::{Element, Field, Matrix};
use crate::code::Code;
use crate::finding::{Code as FindingCode, Finding, Found, catalogue, near_names};
use crate::source::{Loader, Span};
use num_bigint::BigInt;
use num_traits::ToPrimitive;
use std::sync::Arc;

/// An argument as given: its name if by name, its value, where it stands.
#[derive(Clone, Debug)]
pub struct Given {
    /// The name and where it stands, if given by name.
    pub name: Option<(String, Span)>,
    /// The value.
    pub value: Value,
    /// Where the value stands.
    pub span: Span,
}

/// A call with its arguments bound.
pub struct Call<'a> {
    /// What is called.
    pub name: &'a str,
    /// Name and arguments in the text.
    pub span: Span,
    /// The field meant where the call stands, if any.
    pub context: Option<Field>,
    /// How to read files.
    pub loader: &'a dyn Loader,
    /// The file that the call stands in, as shown.
    pub file: &'a str,
    parameters: &'a [Parameter],
    bound: Vec<Option<(Value, Span)>>,
    unnamed: Option<Span>,
}

impl<'a> Call<'a> {
    /// Binds arguments to parameters: by name, or by place in order.
    ///
    /// # Errors
    /// When one is missing, superfluous, unknown or given twice.
    pub fn bind(
        name: &'a str,
        span: Span,
        parameters: &'a [Parameter],
        given: Vec<Given>,
        context: Option<Field>,
        loader: &'a dyn Loader,
        file: &'a str,
    ) -> Found<Call<'a>> {
        let names: Vec<&str> = parameters.iter().map(|parameter| parameter.name).collect();
        let optional: Vec<bool> = parameters
            .iter()
            .map(|parameter| parameter.optional)
            .collect();
        let unnamed = given
            .iter()
            .find(|argument| argument.name.is_none())
            .map(|argument| argument.span);
        let bound = bind_arguments(name, span, &names, &optional, given)?;
        Ok(Call {
            name,
            span,
            context,
            loader,
            file,
            parameters,
            bound,
            unnamed,
        })
    }

    /// Where the first argument stands that was given by place and not by name, if there is one.
    pub fn unnamed(&self) -> Option<Span> {
        self.unnamed
    }

    fn index(&self, name: &str) -> usize {
        self.parameters
            .iter()
            .position(|parameter| parameter.name == name)
            .expect("a construction asks only for its own parameters")
    }

    /// Whether the argument was given.
    pub fn has(&self, name: &str) -> bool {
        self.bound[self.index(name)].is_some()
    }

    /// The value of an argument that must be there.
    pub fn value(&self, name: &str) -> &Value {
        let (value, _) = self.bound[self.index(name)]
            .as_ref()
            .expect("a needed argument was checked when bound");
        value
    }

    /// Where an argument stands; the whole call when it was not given.
    pub fn span_of(&self, name: &str) -> Span {
        self.bound[self.index(name)]
            .as_ref()
            .map_or(self.span, |(_, span)| *span)
    }

    /// A finding about an argument.
    pub fn wrong(&self, name: &str, code: FindingCode, message: impl Into<String>) -> Box<Finding> {
        Box::new(Finding::new(code, self.span_of(name), message))
    }

    /// A finding about the call as a whole.
    pub fn trouble(&self, code: FindingCode, message: impl Into<String>) -> Box<Finding> {
        Box::new(Finding::new(code, self.span, message))
    }

    fn mistyped(&self, name: &str) -> Box<Finding> {
        let parameter = &self.parameters[self.index(name)];
        self.wrong(
            name,
            catalogue::WRONG_TYPE,
            format!(
                "`{}` of `{}` takes {}, not {}",
                name,
                self.name,
                parameter.takes,
                self.value(name).kind()
            ),
        )
    }

    /// An integer argument.
    ///
    /// # Errors
    /// When it is none.
    pub fn integer(&self, name: &str) -> Found<&BigInt> {
        match self.value(name) {
            Value::Integer(number) => Ok(number),
            _ => Err(self.mistyped(name)),
        }
    }

    /// An integer argument within bounds.
    ///
    /// # Errors
    /// When it is none, or outside.
    pub fn size(&self, name: &str, least: usize, most: usize) -> Found<usize> {
        let number = self.integer(name)?;
        number
            .to_usize()
            .filter(|size| (least..=most).contains(size))
            .ok_or_else(|| {
                self.wrong(
                    name,
                    catalogue::BAD_ARGUMENT,
                    format!(
                        "`{name}` of `{}` is {number}, but it lies in {least}..{most}",
                        self.name
                    ),
                )
            })
    }

    /// A matrix argument; a vector or list of elements is a matrix of one row.
    ///
    /// # Errors
    /// When it is none.
    pub fn matrix(&self, name: &str) -> Found<Arc<Matrix>> {
        match self.value(name) {
            Value::Matrix(matrix) => Ok(matrix.clone()),
            Value::Incidence(incidence) => {
                let field = self.field()?;
                Ok(Arc::new(incidence.matrix(field)))
            }
            Value::Vector(field, entries) => Ok(Arc::new(Matrix::from_rows(
                field,
                entries.len(),
                &[entries.to_vec()],
            ))),
            _ => Err(self.mistyped(name)),
        }
    }

    /// A code argument.
    ///
    /// # Errors
    /// When it is none.
    pub fn code(&self, name: &str) -> Found<&Code> {
        match self.value(name) {
            Value::Code(code) => Ok(code),
            _ => Err(self.mistyped(name)),
        }
    }

    /// A field argument.
    ///
    /// # Errors
    /// When it is none.
    pub fn field_argument(&self, name: &str) -> Found<&Field> {
        match self.value(name) {
            Value::Field(field) => Ok(field),
            _ => Err(self.mistyped(name)),
        }
    }

    /// The members of a set or list argument.
    ///
    /// # Errors
    /// When it is none.
    pub fn items(&self, name: &str) -> Found<Vec<Value>> {
        items_of(self.value(name)).map_err(|_| self.mistyped(name))
    }

    /// A set or list of integers, none negative.
    ///
    /// # Errors
    /// When a member is no such integer.
    pub fn naturals(&self, name: &str) -> Found<Vec<u64>> {
        self.items(name)?
            .iter()
            .map(|item| match item {
                Value::Integer(number) => number.to_u64().ok_or_else(|| {
                    self.wrong(
                        name,
                        catalogue::BAD_ARGUMENT,
                        format!("{number} is not a whole number from 0 on"),
                    )
                }),
                other => Err(self.wrong(
                    name,
                    catalogue::WRONG_TYPE,
                    format!(
                        "`{name}` of `{}` takes integers, not {}",
                        self.name,
                        other.kind()
                    ),
                )),
            })
            .collect()
    }

    /// A set or list of elements of `field`.
    ///
    /// # Errors
    /// When a member is none.
    pub fn elements(&self, name: &str, field: &Field) -> Found<Vec<Element>> {
        self.items(name)?
            .iter()
            .map(|item| self.at(name, element_of(field, item)))
            .collect()
    }

    /// One element of `field`.
    ///
    /// # Errors
    /// When it is none.
    pub fn element(&self, name: &str, field: &Field) -> Found<Element> {
        self.at(name, element_of(field, self.value(name)))
    }

    /// A trouble placed at an argument.
    ///
    /// # Errors
    /// The trouble.
    pub fn at<T>(&self, name: &str, result: Result<T, Trouble>) -> Found<T> {
        result.map_err(|trouble| trouble.at(self.span_of(name)))
    }

    /// The field meant where the call stands.
    ///
    /// # Errors
    /// When none is.
    pub fn field(&self) -> Found<&Field> {
        self.context.as_ref().ok_or_else(|| {
            Box::new(
                Finding::new(
                    catalogue::FIELD_UNSTATED,
                    self.span,
                    format!("which field `{}` is meant over does not follow", self.name),
                )
                .help(
                    "state it: `code NAME over FIELD = …`, or `… over GF(2)` behind the expression",
                ),
            )
        })
    }
}

/// Binds arguments to the names of parameters, in the order of these.
///
/// # Errors
/// When one is missing, superfluous, unknown or given twice.
pub fn bind_arguments(
    callee: &str,
    span: Span,
    names: &[&str],
    optional: &[bool],
    given: Vec<Given>,
) -> Found<Vec<Option<(Value, Span)>>> {
    let mut bound: Vec<Option<(Value, Span)>> = vec![None; names.len()];
    let mut place = 0;
    for argument in given {
        let at = match &argument.name {
            Some((name, name_span)) => names
                .iter()
                .position(|known| known == name)
                .ok_or_else(|| unknown_parameter(callee, names, name, *name_span))?,
            None => {
                let at = place;
                place += 1;
                if at >= names.len() {
                    return Err(too_many(callee, names, argument.span));
                }
                at
            }
        };
        if bound[at].is_some() {
            let message = format!("`{}` of `{callee}` is given twice", names[at]);
            return Err(Box::new(Finding::new(
                catalogue::BAD_ARGUMENT,
                argument.span,
                message,
            )));
        }
        bound[at] = Some((argument.value, argument.span));
    }
    for at in 0..names.len() {
        if bound[at].is_none() && !optional[at] {
            let finding = Finding::new(
                catalogue::BAD_ARGUMENT,
                span,
                format!("`{callee}` needs its argument `{}`", names[at]),
            )
            .help(format!("write `{callee}({}: …)`", names[at]));
            return Err(Box::new(finding));
        }
    }
    Ok(bound)
}

fn unknown_parameter(callee: &str, names: &[&str], name: &str, span: Span) -> Box<Finding> {
    let finding = Finding::new(
        catalogue::BAD_ARGUMENT,
        span,
        format!("`{callee}` has no argument `{name}`"),
    );
    let near = near_names(name, names.iter().copied());
    Box::new(match (near.first(), names.is_empty()) {
        (Some(near), _) => finding.help(format!("did you mean `{near}`?")),
        (None, true) => finding.help("it takes no arguments"),
        (None, false) => finding.help(format!("it takes {}", listed(names))),
    })
}

fn too_many(callee: &str, names: &[&str], span: Span) -> Box<Finding> {
    let finding = Finding::new(
        catalogue::BAD_ARGUMENT,
        span,
        format!("`{callee}` takes no further argument"),
    );
    Box::new(if names.is_empty() {
        finding.help("it takes none: leave out the parentheses")
    } else {
        finding.help(format!("it takes {}", listed(names)))
    })
}

fn listed(names: &[&str]) -> String {
    let quoted: Vec<String> = names.iter().map(|name| format!("`{name}`")).collect();
    quoted.join(", ")
}

impl super::Incidence {
    /// The incidence matrix over a field: a row a block, a column a point.
    pub fn matrix(&self, field: &Field) -> Matrix {
        let mut matrix = Matrix::zero(field, self.blocks.len(), self.points);
        for (row, block) in self.blocks.iter().enumerate() {
            for &point in block {
                matrix.set(row, point, 1);
            }
        }
        matrix
    }
}
