//! Material flow cost accounting.

/// The cost of one quantity centre, split between product and loss.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct FlowCost {
    /// What the product carries.
    pub product: f64,
    /// What the loss carries: the full cost of waste.
    pub loss: f64,
}

/// Splits cost between product and loss: material, energy and system by mass, waste management to the loss in full.
///
/// `loss_share` is the mass of loss over all mass that leaves, 0 to 1; `material`, `energy`, `system` and `waste` are the
/// cost classes in one currency.
///
/// Source: ISO 14051:2011 (the framework), with allocation by mass as METI 2007 describes (seen in a secondary source).
///
/// ```
/// use thimbleworth::money::flow_cost;
/// // 100 kg in, 70 kg of product: an illustration, numbers from memory
/// let cost = flow_cost(0.3, 1000.0, 50.0, 800.0, 80.0);
/// assert_eq!((cost.product, cost.loss), (1295.0, 635.0));
/// ```
#[must_use]
pub fn flow_cost(loss_share: f64, material: f64, energy: f64, system: f64, waste: f64) -> FlowCost {
    let shared = material + energy + system;
    // C_product = (1 − s)(C_material + C_energy + C_system); C_loss = s (…) + C_waste
    FlowCost { product: (1.0 - loss_share) * shared, loss: loss_share * shared + waste }
}
