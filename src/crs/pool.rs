//! Operations shared by threads: PROJ's objects serve one thread at a time.

use super::ffi::Operation;
use std::fmt;
use std::sync::{Condvar, Mutex, PoisonError};

/// How to make one operation.
#[derive(Debug, Clone, PartialEq)]
pub(super) enum Recipe {
    /// From one CRS to another.
    Between(String, String),
    /// A projected CRS's own projection.
    ProjectionOf(String),
}

impl Recipe {
    fn make(&self) -> Result<Operation, String> {
        match self {
            Self::Between(from, to) => Operation::between(from, to),
            Self::ProjectionOf(crs) => Operation::projection_of(crs),
        }
    }
}

/// Equal operations, made as threads ask for them.
pub(super) struct Pool {
    recipe: Recipe,
    idle: Mutex<Vec<Operation>>,
    returned: Condvar,
}

impl fmt::Debug for Pool {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        f.debug_struct("Pool").field("recipe", &self.recipe).finish_non_exhaustive()
    }
}

impl Pool {
    /// A pool that is known to work: its first operation is made at once.
    pub fn new(recipe: Recipe) -> Result<Self, String> {
        let first = recipe.make()?;
        Ok(Self { recipe, idle: Mutex::new(vec![first]), returned: Condvar::new() })
    }

    /// Lends an operation to `work`, which must not ask the pool for another.
    pub fn with<T>(&self, work: impl FnOnce(&mut Operation) -> T) -> T {
        let idle = self.idle.lock().unwrap_or_else(PoisonError::into_inner).pop();
        // One was made before, so another can be; if not (out of memory, say), wait for one to come back.
        let made = idle.or_else(|| self.recipe.make().ok());
        let mut operation = made.unwrap_or_else(|| {
            let mut idle = self.idle.lock().unwrap_or_else(PoisonError::into_inner);
            loop {
                match idle.pop() {
                    Some(operation) => break operation,
                    None => idle = self.returned.wait(idle).unwrap_or_else(PoisonError::into_inner),
                }
            }
        });
        let result = work(&mut operation);
        self.idle.lock().unwrap_or_else(PoisonError::into_inner).push(operation);
        self.returned.notify_one();
        result
    }
}
