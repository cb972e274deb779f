//! A priced bill: what is needed, what is bought, what is left over, and what it costs.

use rust_decimal::Decimal;

use crate::cutting::CutPlan;
use crate::units::Money;

/// The priced bill of one option.
#[derive(Clone, Debug, Default)]
pub struct Bill {
    /// One line an offer that is bought, and one for each part that is unpriced or comes from stock alone.
    pub lines: Vec<BillLine>,
    /// The cut plans by part.
    pub cut_plans: Vec<PartCutPlan>,
    /// Sum of the lines, each rounded to minor units.
    pub materials: Money,
    /// Freight lines.
    pub freight_lines: Vec<Charge>,
    /// Their sum.
    pub freight: Money,
    /// Tax lines, one a class.
    pub tax_lines: Vec<Charge>,
    /// Their sum.
    pub tax: Money,
    /// Contingency on materials and freight.
    pub contingency: Money,
    /// The sum of the above.
    pub total: Money,
    /// Parts without a price; the totals are incomplete while there is one.
    pub unpriced: Vec<Unpriced>,
    /// Hints that cost nothing to read: cheaper price breaks, parts that would also fit.
    pub hints: Vec<String>,
}

/// One line of a bill.
#[derive(Clone, Debug)]
pub struct BillLine {
    /// The part's id.
    pub part: String,
    /// What it is.
    pub description: String,
    /// The roles it serves.
    pub roles: Vec<String>,
    /// The offer that is bought; none when nothing is, or when there is no offer.
    pub offer: Option<String>,
    /// Units needed, waste and spares included.
    pub needed: Decimal,
    /// Units taken from stock on hand.
    pub on_hand: Decimal,
    /// Units bought.
    pub bought: Decimal,
    /// Packs bought.
    pub packs: u64,
    /// Units in a pack.
    pub pack: Decimal,
    /// Units left over.
    pub left: Decimal,
    /// The unit.
    pub unit: String,
    /// The price of one pack in the project's currency; none when unpriced.
    pub pack_price: Option<Money>,
    /// Packs × pack price, rounded to minor units; none when unpriced.
    pub amount: Option<Money>,
    /// Supplier slot.
    pub supplier: String,
    /// The day of the price.
    pub priced_on: String,
    /// Calendar days to delivery.
    pub lead_days: Option<u32>,
    /// Tax class of the part.
    pub tax_class: String,
    /// Weight of what is bought in kilograms.
    pub weight_kg: Decimal,
    /// Freight group.
    pub ship_group: String,
    /// Parts that may stand in.
    pub alternates: Vec<String>,
    /// Where the price stands: file and line.
    pub price_source: String,
    /// How quantity and price came about.
    pub reason: Vec<String>,
}

/// The cut plan of one part.
#[derive(Clone, Debug)]
pub struct PartCutPlan {
    /// The part.
    pub part: String,
    /// What it is.
    pub description: String,
    /// The plan.
    pub plan: CutPlan,
}

/// One freight or tax line.
#[derive(Clone, Debug)]
pub struct Charge {
    /// What it is for.
    pub name: String,
    /// The amount, rounded to minor units.
    pub amount: Money,
    /// How it came about.
    pub reason: String,
}

/// A part without a price.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Unpriced {
    /// The part, or the role when the catalogue has no part.
    pub part: String,
    /// How many are needed beyond stock.
    pub quantity: Decimal,
    /// The unit.
    pub unit: String,
    /// Why there is no price.
    pub why: String,
}
