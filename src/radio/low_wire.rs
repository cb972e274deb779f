//! The terminated low wire: travelling wave, its image and its downleads.

use num_complex::Complex64;

use super::element::Termination;
use super::ground::Reflection;
use super::line::{LineConstants, line_terms};
use crate::units::Frequency;

/// A wire as the formulas want it, in metres.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(super) struct WireSpec {
    pub(super) length: f64,
    pub(super) height: f64,
    pub(super) radius: f64,
    pub(super) termination: Termination,
}

impl WireSpec {
    pub(super) fn constants(&self, frequency: Frequency, n2: Option<Complex64>) -> LineConstants {
        line_terms(frequency, n2, self.height, self.radius).constants(frequency)
    }
}

/// The current reflection coefficient Γ = (Z₀ − R)/(Z₀ + R) that a termination makes on a line of impedance Z₀.
pub fn reflection_coefficient(termination: Termination, impedance: Complex64) -> Complex64 {
    match termination {
        Termination::Matched => Complex64::ZERO,
        Termination::Reflection(value) => value.into(),
        Termination::Total(resistance) => (impedance - resistance.ohms()) / (impedance + resistance.ohms()),
    }
}

/// The impedance in ohms that a termination stands for.
pub(super) fn termination_impedance(termination: Termination, impedance: Complex64) -> Complex64 {
    match termination {
        Termination::Matched => impedance,
        Termination::Reflection(value) => impedance * (1.0 - value) / (1.0 + value),
        Termination::Total(resistance) => resistance.ohms().into(),
    }
}

/// The two line integrals of a wire in one direction: along the wire, and the currents of the downleads.
#[derive(Clone, Copy, Debug, Default)]
pub(super) struct Along {
    /// ∫ I(x) e^{jκx} dx.
    pub(super) wire: Complex64,
    /// I(0) − I(L) e^{jκL}, each at its own place.
    pub(super) leads: Complex64,
}

/// One wire with a unit current wave at its feed.
#[derive(Clone, Copy, Debug)]
pub(super) struct LoneWire {
    length: f64,
    gamma: Complex64,
    decay: Complex64,
    rho_growth: Complex64,
    rho: Complex64,
    feed_current: Complex64,
    end_current: Complex64,
    /// Current at the feed for 1 V behind a receiver of the line's impedance.
    pub(super) drive: Complex64,
}

impl LoneWire {
    pub(super) fn new(frequency: Frequency, n2: Option<Complex64>, wire: &WireSpec) -> Self {
        let constants = wire.constants(frequency, n2);
        let gamma_l = constants.gamma * wire.length;
        let reflected = reflection_coefficient(wire.termination, constants.impedance);
        let decay = (-gamma_l).exp();
        let rho = reflected * decay * decay;
        Self {
            length: wire.length,
            gamma: constants.gamma,
            decay,
            rho_growth: reflected * decay,
            rho,
            feed_current: 1.0 + rho,
            end_current: decay * (1.0 + reflected),
            drive: 0.5 / constants.impedance,
        }
    }

    /// The integrals at κ = k sin θ cos φ, per ampere of the outgoing wave at the feed.
    pub(super) fn along(&self, kappa: f64) -> Along {
        let turn = Complex64::cis(kappa * self.length);
        let jk = Complex64::new(0.0, kappa);
        let outgoing = (turn * self.decay - 1.0) / (jk - self.gamma);
        let returned = (turn * self.rho_growth - self.rho) / (jk + self.gamma);
        Along { wire: outgoing + returned, leads: self.feed_current - self.end_current * turn }
    }
}

/// What the ground and the height make of the integrals at one elevation.
#[derive(Clone, Copy, Debug)]
pub(super) struct HeightFactors {
    over: Complex64,
    across: Complex64,
    leads: Complex64,
}

impl HeightFactors {
    /// At the angle with this sine and cosine from the zenith.
    pub(super) fn new(wavenumber: f64, height: f64, sin: f64, cos: f64, ground: Reflection) -> Self {
        let phase = wavenumber * height * cos;
        let up = Complex64::cis(phase);
        let half = Complex64::cis(0.5 * phase);
        let sinc = if phase == 0.0 { 1.0 } else { (0.5 * phase).sin() / (0.5 * phase) };
        Self {
            over: cos * (up - ground.vertical * up.conj()),
            across: -(up + ground.horizontal * up.conj()),
            leads: -sin * height * sinc * (half + ground.vertical * half.conj()),
        }
    }

    /// `(E_θ, E_φ)` of a wire along x.
    pub(super) fn field(&self, cos_phi: f64, sin_phi: f64, along: Along) -> (Complex64, Complex64) {
        (cos_phi * self.over * along.wire + self.leads * along.leads, sin_phi * self.across * along.wire)
    }
}
