//! What money does over years, and how cost follows material: published arithmetic as functions.

mod flow;
mod invest;

pub use flow::{FlowCost, flow_cost};
pub use invest::{Investment, Payback, Rate};
