//! `[stations]` or `[[stations]]`: a table, or an array of tables.

use serde::de::value::{MapAccessDeserializer, SeqAccessDeserializer};
use serde::de::{MapAccess, SeqAccess, Visitor};
use serde::{Deserialize, Deserializer, Serialize};
use std::fmt;
use std::marker::PhantomData;

/// A table, or an array of tables.
#[derive(Debug, Clone, PartialEq, Serialize)]
#[serde(untagged)]
pub enum OneOrMany<T> {
    /// `[stations]`
    One(Box<T>),
    /// `[[stations]]`
    Many(Vec<T>),
}

impl<T> Default for OneOrMany<T> {
    fn default() -> Self {
        Self::Many(Vec::new())
    }
}

impl<T> OneOrMany<T> {
    /// All of them.
    pub fn iter(&self) -> impl Iterator<Item = &T> {
        match self {
            Self::One(one) => std::slice::from_ref(one.as_ref()).iter(),
            Self::Many(many) => many.iter(),
        }
    }
}

// By hand, not untagged: an untagged enum forgets which key was wrong, and where.
impl<'de, T: Deserialize<'de>> Deserialize<'de> for OneOrMany<T> {
    fn deserialize<D: Deserializer<'de>>(deserializer: D) -> Result<Self, D::Error> {
        struct Either<T>(PhantomData<T>);
        impl<'de, T: Deserialize<'de>> Visitor<'de> for Either<T> {
            type Value = OneOrMany<T>;
            fn expecting(&self, f: &mut fmt::Formatter) -> fmt::Result {
                f.write_str("a table such as [stations] with file = \"…\", or several as [[stations]]")
            }
            fn visit_map<M: MapAccess<'de>>(self, map: M) -> Result<Self::Value, M::Error> {
                T::deserialize(MapAccessDeserializer::new(map)).map(|one| OneOrMany::One(Box::new(one)))
            }
            fn visit_seq<S: SeqAccess<'de>>(self, seq: S) -> Result<Self::Value, S::Error> {
                Vec::deserialize(SeqAccessDeserializer::new(seq)).map(OneOrMany::Many)
            }
        }
        deserializer.deserialize_any(Either(PhantomData))
    }
}
