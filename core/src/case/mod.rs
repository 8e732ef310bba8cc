//! The case for switching: a route in place of the present one as an investment, with what must be true for it.
//!
//! | file | what it holds |
//! | --- | --- |
//! | `switch` | what switching costs and saves by the central figures, and what stands in the way of saying so |
//! | `turning` | at which number of results, and at which price, the case turns |
//! | `mix` | the mix of routes over all workloads that lowers a figure most for what it costs |
//! | `drawn` | the same in every draw of a sampled run: intervals, odds of payback within each number of years |

mod drawn;
mod mix;
mod switch;
mod turning;

pub use drawn::{DrawnCase, drawn};
pub use mix::{Bound, HAZARDOUS_WASTE, LeftOut, Mix, Mixes, mixes};
pub use switch::{Switch, not_ranked, switch};
pub use turning::{PriceTurn, Turn, turning_prices, turning_results};

/// The figures on which a case rests; [`headline`](crate::odds::headline) has them drawn.
pub const NEEDED: [&str; 3] = ["cost.year", "cost.once", "cost.back"];
