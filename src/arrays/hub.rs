//! Where a hub stands.

use crate::plan::Position;
use crate::project::HubPlace;

/// What a metre of line costs on either side of a hub, relative to each other.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct LineCost {
    /// One metre of one equal leg.
    pub leg: f64,
    /// One metre of the line that goes on.
    pub onward: f64,
}

/// The hub's place for legs from `sources` and one line on to `onward`.
///
/// `"best"` is the place of least coax cost when all legs are as long as the longest, found to 0.1 m.
pub fn place(choice: HubPlace, sources: &[Position], onward: Position, cost: LineCost) -> Position {
    let centre = Position::mean(sources);
    match choice {
        HubPlace::Centre => centre,
        HubPlace::At(offset) => centre.plus(offset.into()),
        HubPlace::Best => cheapest(centre, sources, onward, cost),
    }
}

/// Compass search from the centre; the cost is convex, so the only minimum is the least.
#[expect(clippy::cast_precision_loss, reason = "a handful of legs")]
fn cheapest(centre: Position, sources: &[Position], onward: Position, cost: LineCost) -> Position {
    const DIRECTIONS: usize = 32;
    let price = |hub: Position| {
        let longest = sources.iter().map(|source| hub.distance_m(*source)).fold(0.0, f64::max);
        cost.leg * longest * sources.len() as f64 + cost.onward * hub.distance_m(onward)
    };
    let (mut here, mut least) = (centre, price(centre));
    let mut step = 256.0;
    while step > 0.02 {
        let best = (0..DIRECTIONS)
            .map(|n| std::f64::consts::TAU * n as f64 / DIRECTIONS as f64)
            .map(|angle| here.plus(Position::from_metres(step * libm::cos(angle), step * libm::sin(angle))))
            .map(|hub| (price(hub), hub))
            .min_by(|a, b| a.0.total_cmp(&b.0));
        match best {
            Some((price, hub)) if price < least - 1e-9 => (here, least) = (hub, price),
            _ => step /= 2.0,
        }
    }
    let tenth = |metres: f64| (metres * 10.0).round() / 10.0;
    Position::from_metres(tenth(here.forward_m()), tenth(here.right_m()))
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn the_best_hub_of_a_pair_moves_toward_the_receiver_only_when_the_main_costs_enough() {
        let pair = [Position::from_metres(0.0, -60.0), Position::from_metres(0.0, 60.0)];
        let receiver = Position::from_metres(-200.0, 0.0);
        let dear = place(HubPlace::Best, &pair, receiver, LineCost { leg: 1.0, onward: 1.0 });
        // Two legs of √(60² + x²) against 200 − x: the derivative 2x/√(60² + x²) = 1 gives x = 60/√3.
        assert!((dear.forward_m() + 60.0 / 3.0_f64.sqrt()).abs() < 0.11, "{dear:?}");
        let cheap = place(HubPlace::Best, &pair, receiver, LineCost { leg: 1.0, onward: 0.0 });
        assert!(cheap.forward_m().abs() < 0.11);
    }
}
