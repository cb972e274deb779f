//! Two wires closer than 50 m: two coupled lines, solved by even and odd modes.

use nalgebra::{SMatrix, SVector};
use num_complex::Complex64;

use super::line::{LineConstants, pair_constants};
use super::low_wire::{Along, WireSpec, termination_impedance};
use crate::units::Frequency;

type Row = SVector<Complex64, 8>;

/// Where the unknowns of a stretch begin: rear wire alone, even mode, odd mode, front wire alone.
const REAR: usize = 0;
const EVEN: usize = 2;
const ODD: usize = 4;
const FRONT: usize = 6;

/// Which end of a stretch.
#[derive(Clone, Copy)]
enum End {
    Near,
    Far,
}

/// A stretch of line with one mode on it: current A e^{−g(x−xa)} + B e^{−g(xb−x)}, voltage Z (A … − B …).
#[derive(Clone, Copy, Debug)]
struct Stretch {
    gamma: Complex64,
    impedance: Complex64,
    decay: Complex64,
}

impl Stretch {
    fn new(constants: LineConstants, length: f64) -> Self {
        let decay = (-constants.gamma * length).exp();
        Self { gamma: constants.gamma, impedance: constants.impedance, decay }
    }

    /// Adds `sign` times this stretch's current and voltage at one end, as functions of unknowns `first` and `first + 1`.
    fn put(&self, current: &mut Row, voltage: &mut Row, first: usize, end: End, sign: f64) {
        let (forward, backward) = match end {
            End::Near => (Complex64::ONE, self.decay),
            End::Far => (self.decay, Complex64::ONE),
        };
        current[first] += sign * forward;
        current[first + 1] += sign * backward;
        voltage[first] += sign * self.impedance * forward;
        voltage[first + 1] -= sign * self.impedance * backward;
    }

    /// ∫ of the forward and of the backward wave times e^{jκx} over the stretch; `turn` = e^{jκl}.
    fn integrals(&self, kappa: f64, turn: Complex64) -> (Complex64, Complex64) {
        let jk = Complex64::new(0.0, kappa);
        ((turn * self.decay - 1.0) / (jk - self.gamma), (turn - self.decay) / (jk + self.gamma))
    }
}

/// The currents of one drive: amplitudes of the stretches and the end currents of both wires.
#[derive(Clone, Copy, Debug)]
struct Drive {
    amplitudes: Row,
    rear_feed: Complex64,
    rear_end: Complex64,
    front_feed: Complex64,
    front_end: Complex64,
}

/// A coupled pair prepared for one frequency; x runs from the feed of the rear wire.
#[derive(Clone, Debug)]
pub(super) struct CoupledPair {
    length: f64,
    stagger: f64,
    /// How far the front wire stands to the left of the rear wire, in metres.
    pub(super) offset: f64,
    alone: Stretch,
    even: Stretch,
    odd: Stretch,
    drives: [Drive; 2],
}

impl CoupledPair {
    /// Solves both drives: 1 V behind the receiver load of the rear wire, then of the front wire.
    ///
    /// The receiver loads equal the characteristic impedance of one wire alone.
    pub(super) fn new(
        frequency: Frequency,
        n2: Option<Complex64>,
        wires: (&WireSpec, &WireSpec),
        stagger: f64,
        offset: f64,
    ) -> Option<Self> {
        let WireSpec { length, height, radius, termination: _ } = *wires.0;
        let modes = pair_constants(frequency, n2, height, radius, offset.abs());
        let alone = Stretch::new(modes.single, stagger);
        let even = Stretch::new(modes.even, length - stagger);
        let odd = Stretch::new(modes.odd, length - stagger);
        let load = modes.single.impedance;
        let ends = (
            termination_impedance(wires.0.termination, load),
            termination_impedance(wires.1.termination, load),
        );
        let inverse = equations(&alone, &even, &odd, load, ends).try_inverse()?;
        // the unit voltage stands in the equation of the driven feed: row 0 for the rear wire, row 3 for the front
        let solve = |row: usize| drive(&alone, &even, &odd, inverse.column(row).into_owned());
        Some(Self { length, stagger, offset, alone, even, odd, drives: [solve(0), solve(3)] })
    }

    /// The integrals of (rear wire, front wire) for both drives, at κ = k sin θ cos φ, without the sideways offset.
    pub(super) fn along(&self, kappa: f64) -> [(Along, Along); 2] {
        let to_front = Complex64::cis(kappa * self.stagger);
        let to_end = Complex64::cis(kappa * self.length);
        let turn = to_end * to_front.conj();
        let (alone_out, alone_back) = self.alone.integrals(kappa, to_front);
        let (even_out, even_back) = self.even.integrals(kappa, turn);
        let (odd_out, odd_back) = self.odd.integrals(kappa, turn);
        self.drives.map(|drive| {
            let a = &drive.amplitudes;
            let even = a[EVEN] * even_out + a[EVEN + 1] * even_back;
            let odd = a[ODD] * odd_out + a[ODD + 1] * odd_back;
            let rear = Along {
                wire: a[REAR] * alone_out + a[REAR + 1] * alone_back + to_front * (even + odd),
                leads: drive.rear_feed - drive.rear_end * to_end,
            };
            let front = Along {
                wire: to_front * (even - odd) + to_end * (a[FRONT] * alone_out + a[FRONT + 1] * alone_back),
                leads: to_front * (drive.front_feed - drive.front_end * to_end),
            };
            (rear, front)
        })
    }
}

/// Current and voltage of one wire at one end of the common stretch; the front wire has the odd mode reversed.
fn common(even: &Stretch, odd: &Stretch, end: End, odd_sign: f64) -> (Row, Row) {
    let (mut current, mut voltage) = (Row::zeros(), Row::zeros());
    even.put(&mut current, &mut voltage, EVEN, end, 1.0);
    odd.put(&mut current, &mut voltage, ODD, end, odd_sign);
    (current, voltage)
}

fn single(alone: &Stretch, first: usize, end: End) -> (Row, Row) {
    let (mut current, mut voltage) = (Row::zeros(), Row::zeros());
    alone.put(&mut current, &mut voltage, first, end, 1.0);
    (current, voltage)
}

/// Feeds, terminations and continuity, in order along the pair.
fn equations(
    alone: &Stretch,
    even: &Stretch,
    odd: &Stretch,
    load: Complex64,
    (rear_end, front_end): (Complex64, Complex64),
) -> SMatrix<Complex64, 8, 8> {
    let (feed_i, feed_v) = single(alone, REAR, End::Near);
    let (before_i, before_v) = single(alone, REAR, End::Far);
    let (rear_near_i, rear_near_v) = common(even, odd, End::Near, 1.0);
    let (front_near_i, front_near_v) = common(even, odd, End::Near, -1.0);
    let (rear_far_i, rear_far_v) = common(even, odd, End::Far, 1.0);
    let (front_far_i, front_far_v) = common(even, odd, End::Far, -1.0);
    let (after_i, after_v) = single(alone, FRONT, End::Near);
    let (last_i, last_v) = single(alone, FRONT, End::Far);
    let rows = [
        feed_v + feed_i * load,
        before_i - rear_near_i,
        before_v - rear_near_v,
        front_near_v + front_near_i * load,
        rear_far_v - rear_far_i * rear_end,
        front_far_i - after_i,
        front_far_v - after_v,
        last_v - last_i * front_end,
    ];
    SMatrix::from_rows(&rows.map(|row| row.transpose()))
}

fn drive(alone: &Stretch, even: &Stretch, odd: &Stretch, amplitudes: Row) -> Drive {
    let current = |(row, _): (Row, Row)| row.dot(&amplitudes);
    Drive {
        amplitudes,
        rear_feed: current(single(alone, REAR, End::Near)),
        rear_end: current(common(even, odd, End::Far, 1.0)),
        front_feed: current(common(even, odd, End::Near, -1.0)),
        front_end: current(single(alone, FRONT, End::Far)),
    }
}
