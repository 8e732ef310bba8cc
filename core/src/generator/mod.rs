//! The generator clock of the United States and storage time anywhere: category by calendar month, headroom, containers that fill
//! and are picked up day by day.
//!
//! Pure functions: masses by month in, categories and a [`Calendar`] out. Help for a licensed person; states may be stricter.

mod calendar;
mod category;
mod days;

pub use calendar::{
    Calendar, Clock, Container, Line, PickUp, PickUps, SATELLITE_DAYS, SATELLITE_M3, Storage, simulate,
};
pub use category::{CATEGORY, Category, Made, SATELLITE, STORAGE, category, headroom};
pub use days::{MONTH_NAMES, MONTHS, date_of, month_of};
