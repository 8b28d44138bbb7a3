//! Lists in scenario files: no longer than they may be.

use std::fmt;
use std::marker::PhantomData;

use serde::Deserialize;
use serde::de::{Deserializer, Error, SeqAccess, Visitor};

/// A list of at most `MAX` items.
pub(super) struct List<T, const MAX: usize>(Vec<T>);

impl<T, const MAX: usize> List<T, MAX> {
    /// Its items, each turned into something else.
    pub fn map<U>(self, into: impl FnMut(T) -> U) -> Vec<U> {
        self.0.into_iter().map(into).collect()
    }
}

impl<T, const MAX: usize> Default for List<T, MAX> {
    fn default() -> Self {
        List(Vec::new())
    }
}

impl<'de, T: Deserialize<'de>, const MAX: usize> Deserialize<'de> for List<T, MAX> {
    fn deserialize<D: Deserializer<'de>>(deserializer: D) -> Result<Self, D::Error> {
        deserializer.deserialize_seq(Items(PhantomData))
    }
}

struct Items<T, const MAX: usize>(PhantomData<T>);

impl<'de, T: Deserialize<'de>, const MAX: usize> Visitor<'de> for Items<T, MAX> {
    type Value = List<T, MAX>;

    fn expecting(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        write!(f, "a list")
    }

    fn visit_seq<A: SeqAccess<'de>>(self, mut items: A) -> Result<Self::Value, A::Error> {
        let mut list = Vec::new();
        while let Some(item) = items.next_element()? {
            if list.len() == MAX {
                return Err(A::Error::custom(format!(
                    "a list has more than {MAX} items\nthe limit here is {MAX}; take some out"
                )));
            }
            list.push(item);
        }
        Ok(List(list))
    }
}
