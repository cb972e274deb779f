//! Voltage drop of relay supplies along control cable.

use crate::units::{Current, Resistance, Voltage};

/// A load fed through a pair, or pairs in parallel.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Loop {
    /// Resistance of one conductor in ohms a metre.
    pub conductor_ohm_per_m: f64,
    /// Length of the cable in metres, one way.
    pub length_m: f64,
    /// Pairs in parallel, at least 1.
    pub pairs: u32,
    /// Supply voltage at the near end.
    pub supply: Voltage,
    /// Resistance of the load; coils in parallel share one loop when they share a return.
    pub load: Resistance,
}

impl Loop {
    /// Resistance there and back: 2 r L/pairs.
    pub fn resistance(self) -> Resistance {
        Resistance::new(2.0 * self.conductor_ohm_per_m * self.length_m / f64::from(self.pairs))
    }

    /// Voltage at the load.
    pub fn load_voltage(self) -> Voltage {
        let share = self.load.ohms() / (self.load.ohms() + self.resistance().ohms());
        Voltage::new(self.supply.volts() * share)
    }

    /// Current through the load.
    pub fn current(self) -> Current {
        Current::new(1000.0 * self.load_voltage().volts() / self.load.ohms())
    }

    /// Drop in per cent of the supply.
    pub fn drop_percent(self) -> f64 {
        100.0 * (1.0 - self.load_voltage().volts() / self.supply.volts())
    }

    /// The longest cable in metres at which the load still gets `least`: R (V/Vmin − 1)/(2r/pairs); not below 0.
    ///
    /// `length_m` plays no part. To be asked for the hottest coil and the lowest supply.
    pub fn longest_m(self, least: Voltage) -> f64 {
        let excess = self.supply.volts() / least.volts() - 1.0;
        (self.load.ohms() * excess * f64::from(self.pairs) / (2.0 * self.conductor_ohm_per_m)).max(0.0)
    }
}

/// Relays with a feed conductor each and one return for all.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct SharedReturn {
    /// Resistance of one conductor over the whole length.
    pub conductor: Resistance,
    /// Current of one relay, taken as constant.
    pub relay: Current,
    /// Relays on at once.
    pub relays_on: u32,
    /// Supply voltage at the near end.
    pub supply: Voltage,
}

impl SharedReturn {
    /// Drop along one feed.
    pub fn feed_drop(self) -> Voltage {
        Voltage::new(self.relay.milliamperes() / 1000.0 * self.conductor.ohms())
    }

    /// Drop along the return, which carries the sum.
    pub fn return_drop(self) -> Voltage {
        Voltage::new(self.feed_drop().volts() * f64::from(self.relays_on))
    }

    /// What a coil gets. A little low, for the current of a real coil falls with its voltage.
    pub fn coil_voltage(self) -> Voltage {
        Voltage::new(self.supply.volts() - self.feed_drop().volts() - self.return_drop().volts())
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn at_the_longest_run_the_load_gets_just_the_least() {
        let cable = Loop {
            conductor_ohm_per_m: 0.0842,
            length_m: 0.0,
            pairs: 2,
            supply: Voltage::new(12.0),
            load: Resistance::new(360.0),
        };
        let longest = Loop { length_m: cable.longest_m(Voltage::new(9.0)), ..cable };
        assert!((longest.load_voltage().volts() - 9.0).abs() < 1e-9);
        assert!(cable.longest_m(Voltage::new(13.0)).abs() < 1e-12);
    }
}
