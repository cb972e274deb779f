//! The allowances of a shop: every one has a key in `[practice]` and a default.

use std::collections::BTreeMap;

use rust_decimal::Decimal;

use crate::units::{Force, Length, Money, Percent, Voltage};

/// Every allowance, resolved.
#[derive(Clone, Debug)]
pub struct Practice {
    /// Routed length over straight length; `None` takes the terrain's.
    pub route_factor: Option<Decimal>,
    /// Rise from the ground to a box, each end.
    pub riser: Length,
    /// Spare loop at a box, each end.
    pub service_loop: Length,
    /// Loop that lets rain drip off, each end.
    pub drip_loop: Length,
    /// Depth of buried cable, 0 on the surface.
    pub burial_depth: Length,
    /// Stripped at each end.
    pub strip: Length,
    /// Finished and cut coax lengths are rounded up to this.
    pub round_up: Length,
    /// Least trim allowance of a delay line.
    pub trim_least: Length,
    /// Trim allowance over finished length.
    pub trim_ratio: Decimal,
    /// Slack of an antenna wire over its span.
    pub wire_slack: Option<Decimal>,
    /// Wire for wrap and tie-off, each end.
    pub wire_tail: Length,
    /// Antenna wires are rounded up to this.
    pub wire_round_up: Length,
    /// Longest bay between supports; `None` computes it from tension and sag.
    pub max_bay: Option<Length>,
    /// Tension of the wire.
    pub wire_tension: Force,
    /// Allowed sag.
    pub max_sag: Length,
    /// Rods in the earth set of a wire's end; `None` takes the soil's.
    pub rods_per_set: Option<u32>,
    /// Distance between rods of a set; `None` takes a rod's length.
    pub rod_spacing: Option<Length>,
    /// Radials in the earth set of a wire's end; `None` takes the soil's.
    pub radials_per_set: Option<u32>,
    /// Their length; `None` takes the soil's, shortened where sets would overlap.
    pub radial_length: Option<Length>,
    /// Rods at a vertical; `None` takes the soil's.
    pub vertical_rods: Option<u32>,
    /// Radials at a vertical; `None` takes the soil's.
    pub vertical_radials: Option<u32>,
    /// Their length; `None` takes the soil's, shortened where sets would overlap.
    pub vertical_radial_length: Option<Length>,
    /// Coax used up by a choke wound from the line itself.
    pub choke_coax: Length,
    /// Control supply.
    pub control_supply: Voltage,
    /// Whether hubs get arresters of their own.
    pub hub_arresters: HubArresters,
    /// Lost at each cut.
    pub loss_per_cut: Length,
    /// Offcuts at least this long are kept.
    pub keep_at_least: Length,
    /// Joints in long runs.
    pub joint: Joint,
    /// Waste by role, over the defaults.
    pub waste: BTreeMap<String, Percent>,
    /// Spares by role, over the defaults.
    pub spares: BTreeMap<String, u32>,
}

/// Whether a hub gets a coax arrester on each outgoing line.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum HubArresters {
    /// Advised only.
    Advised,
    /// Bought.
    Bought,
}

/// Where joints are allowed and what they cost.
#[derive(Clone, Debug, Default)]
pub struct Joint {
    /// Money for one joint.
    pub price: Money,
    /// Grid of the places where a run may be joined.
    pub step: Length,
    /// Shortest part of a joined run.
    pub least: Length,
    /// Extra length at each part.
    pub extra: Length,
    /// Roles that may be joined: main, control, antenna-wire.
    pub allowed: Vec<String>,
}

impl Default for Practice {
    /// The values of common practice (no source).
    fn default() -> Self {
        Self {
            route_factor: None,
            riser: Length::from_mm(1_000),
            service_loop: Length::from_mm(1_000),
            drip_loop: Length::from_mm(300),
            burial_depth: Length::ZERO,
            strip: Length::from_mm(25),
            round_up: Length::from_mm(100),
            trim_least: Length::from_mm(300),
            trim_ratio: Decimal::new(2, 2),
            wire_slack: None,
            wire_tail: Length::from_mm(500),
            wire_round_up: Length::from_mm(1_000),
            max_bay: None,
            wire_tension: Force::new(50.0),
            max_sag: Length::from_mm(500),
            rods_per_set: None,
            rod_spacing: None,
            radials_per_set: None,
            radial_length: None,
            vertical_rods: None,
            vertical_radials: None,
            vertical_radial_length: None,
            choke_coax: Length::ZERO,
            control_supply: Voltage::new(12.0),
            hub_arresters: HubArresters::Advised,
            loss_per_cut: Length::from_mm(20),
            keep_at_least: Length::from_mm(2_000),
            joint: Joint::default(),
            waste: BTreeMap::new(),
            spares: BTreeMap::new(),
        }
    }
}
