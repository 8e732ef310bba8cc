//! What sections are made of.
mod card;
mod field;
mod figures;
mod mend;
mod name;
mod paper;
mod rows;
mod toolbar;
mod working;

pub(crate) use card::tools;
pub(crate) use field::{Ask, Field, Options, said, value_of};
pub(crate) use figures::{Line, Sheet, figure_button};
pub(crate) use mend::{Mend, basis_of};
pub(crate) use name::Name;
pub(crate) use paper::{MOST_ROWS, folded, framed, unfolded, words, words_table};
pub(crate) use rows::Rows;
pub(crate) use toolbar::{Export, Toolbar, Wish};
pub(crate) use working::Working;

use std::ops::Deref;
use std::rc::Rc;

/// A shared value that is the same only when it is the very same: results hold numbers and are never compared by value.
pub(crate) struct ByRc<T>(pub(crate) Rc<T>);

impl<T> Clone for ByRc<T> {
    fn clone(&self) -> Self {
        Self(Rc::clone(&self.0))
    }
}

impl<T> PartialEq for ByRc<T> {
    fn eq(&self, other: &Self) -> bool {
        Rc::ptr_eq(&self.0, &other.0)
    }
}

impl<T> Deref for ByRc<T> {
    type Target = T;
    fn deref(&self) -> &T {
        &self.0
    }
}
