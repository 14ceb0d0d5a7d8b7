//! What names mean at a place.

use crate::algebra::Field;
use crate::code::Code;
use crate::value::Value;
use std::sync::Arc;

/// The names and the field that hold at a place in a file. Cheap to clone and to widen.
#[derive(Clone, Default)]
pub struct Scope {
    /// The index of the file among the program's.
    pub file: usize,
    /// The field meant here, if one is.
    pub field: Option<Field>,
    /// The code whose quantities can be named here, if any.
    pub subject: Option<Arc<Subject>>,
    locals: Option<Arc<Local>>,
}

/// A code whose quantities can be named, and values assumed for some of them.
pub struct Subject {
    /// The code.
    pub code: Code,
    /// Assumed values, while the cases of an unsettled quantity are gone through.
    pub assumed: Vec<(String, Value)>,
}

struct Local {
    name: String,
    value: Value,
    outer: Option<Arc<Local>>,
}

impl Scope {
    /// The scope of a file's declarations.
    pub fn of_file(file: usize) -> Scope {
        Scope {
            file,
            ..Scope::default()
        }
    }

    /// With a further name.
    pub fn with(&self, name: impl Into<String>, value: Value) -> Scope {
        Scope {
            locals: Some(Arc::new(Local {
                name: name.into(),
                value,
                outer: self.locals.clone(),
            })),
            ..self.clone()
        }
    }

    /// With another field.
    pub fn over(&self, field: &Field) -> Scope {
        Scope {
            field: Some(field.clone()),
            ..self.clone()
        }
    }

    /// With the code so far of a derivation: its n, k, q as names, its field meant.
    pub fn inside(&self, code: &Code) -> Scope {
        self.over(code.field())
            .with("n", Value::integer(code.length()))
            .with("k", Value::integer(code.dimension()))
            .with("q", Value::integer(code.field().order()))
    }

    /// With a code whose quantities can be named.
    pub fn about(&self, code: &Code, assumed: Vec<(String, Value)>) -> Scope {
        Scope {
            subject: Some(Arc::new(Subject {
                code: code.clone(),
                assumed,
            })),
            field: Some(code.field().clone()),
            ..self.clone()
        }
    }

    /// The value of a local name.
    pub fn local(&self, name: &str) -> Option<&Value> {
        let mut next = self.locals.as_deref();
        while let Some(local) = next {
            if local.name == name {
                return Some(&local.value);
            }
            next = local.outer.as_deref();
        }
        None
    }
}
