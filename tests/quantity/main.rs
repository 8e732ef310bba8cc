//! Reading and writing of amounts against hand-worked values, and every factor against the general library `uom`.

mod against_uom;
mod published;
mod reading;
