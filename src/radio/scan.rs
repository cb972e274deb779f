//! The pattern of every element in place, evaluated over rows of elevation and columns of azimuth.

use num_complex::Complex64;

use super::cluster::{Grouping, group, wire_spec};
use super::coupled::CoupledPair;
use super::element::{ElementKind, RadioElement};
use super::ground::{Soil, reflection};
use super::low_wire::{Along, HeightFactors, LoneWire, WireSpec};
use super::response::Field;
use super::vertical::Vertical;
use crate::units::Frequency;

/// A pattern that elements share; a pair has two feeds, the others one.
#[derive(Clone, Debug)]
enum Shape {
    Vertical(Vertical),
    Lone { height: f64, wire: LoneWire },
    Pair { height: f64, pair: Box<CoupledPair> },
}

/// What a shape is made of, to find equal ones.
#[derive(Clone, Copy, Debug, PartialEq)]
enum Key {
    Vertical(f64),
    Lone(WireSpec),
    Pair(WireSpec, WireSpec, f64, f64),
}

/// An element: its shape, which feed of it, and the place whose phase it carries.
#[derive(Clone, Copy, Debug)]
struct Port {
    shape: usize,
    feed: usize,
    x: usize,
    y: usize,
}

/// All elements prepared for one frequency and soil.
#[derive(Clone, Debug)]
pub(super) struct Scanner {
    pub(super) frequency: Frequency,
    pub(super) wavenumber: f64,
    pub(super) n2: Option<Complex64>,
    pub(super) grouping: Grouping,
    shapes: Vec<Shape>,
    keys: Vec<Key>,
    ports: Vec<Port>,
    xs: Vec<f64>,
    ys: Vec<f64>,
}

/// A shape at one elevation.
enum ShapeRow<'a> {
    Vertical(Complex64),
    Lone(&'a LoneWire, HeightFactors),
    Pair(&'a CoupledPair, HeightFactors),
}

/// One direction and its mirror image about the wanted direction.
#[derive(Clone, Copy, Debug, Default)]
struct Mirrored {
    left: Field,
    right: Field,
}

/// Rounds metres to whole nanometres, so that pairs that differ by rounding alone are found equal.
fn nanometres(metres: f64) -> f64 {
    (metres * 1e9).round() / 1e9
}

/// The place of `value` in `list`, added when new.
fn place(list: &mut Vec<f64>, value: f64) -> usize {
    list.iter().position(|known| known.to_bits() == value.to_bits()).unwrap_or_else(|| {
        list.push(value);
        list.len() - 1
    })
}

impl Scanner {
    pub(super) fn new(elements: &[RadioElement], soil: Soil, frequency: Frequency) -> Self {
        let mut scanner = Self {
            frequency,
            wavenumber: frequency.wavenumber(),
            n2: soil.index_squared(frequency),
            grouping: group(elements),
            shapes: Vec::new(),
            keys: Vec::new(),
            ports: vec![Port { shape: 0, feed: 0, x: 0, y: 0 }; elements.len()],
            xs: Vec::new(),
            ys: Vec::new(),
        };
        let pairs = scanner.grouping.pairs.clone();
        for (rear, front) in pairs {
            scanner.add_pair(elements, rear, front);
        }
        for index in scanner.grouping.lone.clone() {
            scanner.add_lone(elements, index);
        }
        scanner
    }

    fn add_pair(&mut self, elements: &[RadioElement], rear: usize, front: usize) {
        let specs = (wire_spec(&elements[rear].kind), wire_spec(&elements[front].kind));
        let (from, to) = (elements[rear].position, elements[front].position);
        let (stagger, offset) = (nanometres(to.x() - from.x()), nanometres(to.y() - from.y()));
        let shape = match specs {
            (Some(a), Some(b)) => {
                let key = Key::Pair(a, b, stagger, offset);
                self.known(&key).or_else(|| {
                    let pair = CoupledPair::new(self.frequency, self.n2, (&a, &b), stagger, offset)?;
                    Some(self.add((Shape::Pair { height: a.height, pair: Box::new(pair) }, key)))
                })
            }
            (None, _) | (_, None) => None,
        };
        let Some(shape) = shape else {
            self.add_lone(elements, rear);
            self.add_lone(elements, front);
            return;
        };
        let (x, y) = (place(&mut self.xs, from.x()), place(&mut self.ys, from.y()));
        self.ports[rear] = Port { shape, feed: 0, x, y };
        self.ports[front] = Port { shape, feed: 1, x, y };
    }

    fn add_lone(&mut self, elements: &[RadioElement], index: usize) {
        let element = &elements[index];
        let (key, shape) = lone_shape(self.frequency, self.n2, &element.kind);
        let shape = self.known(&key).unwrap_or_else(|| self.add((shape, key)));
        let (x, y) = (place(&mut self.xs, element.position.x()), place(&mut self.ys, element.position.y()));
        self.ports[index] = Port { shape, feed: 0, x, y };
    }

    fn known(&self, key: &Key) -> Option<usize> {
        self.keys.iter().position(|known| known == key)
    }

    fn add(&mut self, (shape, key): (Shape, Key)) -> usize {
        self.shapes.push(shape);
        self.keys.push(key);
        self.shapes.len() - 1
    }

    /// How many elements there are.
    pub(super) fn elements(&self) -> usize {
        self.ports.len()
    }

    /// Whether every element is a vertical, so that no pattern depends on azimuth.
    pub(super) fn all_vertical(&self) -> bool {
        self.shapes.iter().all(|shape| matches!(shape, Shape::Vertical(_)))
    }

    /// The vertical field of every element without its place, towards `sin`, `cos` of the zenith angle; for verticals.
    pub(super) fn vertical_fields(&self, theta: f64) -> Vec<Complex64> {
        let (sin, cos) = theta.sin_cos();
        let ground = reflection(self.n2, theta);
        self.ports
            .iter()
            .map(|port| match &self.shapes[port.shape] {
                Shape::Vertical(vertical) => vertical.field(sin, cos, ground),
                Shape::Lone { .. } | Shape::Pair { .. } => Complex64::ZERO,
            })
            .collect()
    }

    /// Horizontal place (x, y) whose phase element `index` carries.
    pub(super) fn origin(&self, index: usize) -> (f64, f64) {
        (self.xs[self.ports[index].x], self.ys[self.ports[index].y])
    }

    /// Visits every direction (θ of `thetas`, φ of `phis` in 0 to π) with the fields of all elements there and in the
    /// mirrored direction −φ.
    pub(super) fn scan(
        &self,
        thetas: &[f64],
        phis: &[f64],
        mut visit: impl FnMut(usize, usize, &[Field], &[Field]),
    ) {
        let columns: Vec<(f64, f64)> = phis.iter().map(|phi| phi.sin_cos()).collect();
        let mut left = vec![Field::default(); self.ports.len()];
        let mut right = left.clone();
        let mut fields: Vec<[Mirrored; 2]> = vec![[Mirrored::default(); 2]; self.shapes.len()];
        let mut along_x = vec![Complex64::ONE; self.xs.len()];
        let mut along_y = vec![Complex64::ONE; self.ys.len()];
        for (row, &theta) in thetas.iter().enumerate() {
            let (sin, cos) = theta.sin_cos();
            let shapes = self.rows(theta, sin, cos);
            let ks = self.wavenumber * sin;
            for (column, &(sin_phi, cos_phi)) in columns.iter().enumerate() {
                turn_all(&mut along_x, &self.xs, ks * cos_phi);
                turn_all(&mut along_y, &self.ys, ks * sin_phi);
                for (slot, shape) in fields.iter_mut().zip(&shapes) {
                    *slot = shape.fields(ks, sin_phi, cos_phi);
                }
                for (index, port) in self.ports.iter().enumerate() {
                    let own = &fields[port.shape][port.feed];
                    let (forward, sideways) = (along_x[port.x], along_y[port.y]);
                    left[index] = own.left.times(forward * sideways);
                    right[index] = own.right.times(forward * sideways.conj());
                }
                visit(row, column, &left, &right);
            }
        }
    }

    fn rows(&self, theta: f64, sin: f64, cos: f64) -> Vec<ShapeRow<'_>> {
        let ground = reflection(self.n2, theta);
        let factors = |height: f64| HeightFactors::new(self.wavenumber, height, sin, cos, ground);
        self.shapes
            .iter()
            .map(|shape| match shape {
                Shape::Vertical(vertical) => ShapeRow::Vertical(vertical.field(sin, cos, ground)),
                Shape::Lone { height, wire } => ShapeRow::Lone(wire, factors(*height)),
                Shape::Pair { height, pair } => ShapeRow::Pair(pair, factors(*height)),
            })
            .collect()
    }
}

/// The pattern of one element of this kind alone, with its key.
fn lone_shape(frequency: Frequency, n2: Option<Complex64>, kind: &ElementKind) -> (Key, Shape) {
    match kind {
        ElementKind::ShortVertical { height } => {
            let height = height.metres();
            (Key::Vertical(height), Shape::Vertical(Vertical::new(frequency.wavenumber(), height)))
        }
        ElementKind::LowWire { .. } | ElementKind::TwoWayWire { .. } => {
            let spec = wire_spec(kind).expect("invariant: both kinds are wires");
            (Key::Lone(spec), Shape::Lone { height: spec.height, wire: LoneWire::new(frequency, n2, &spec) })
        }
    }
}

/// e^{j factor d} for every distance.
fn turn_all(turns: &mut [Complex64], distances: &[f64], factor: f64) {
    for (turn, distance) in turns.iter_mut().zip(distances) {
        *turn = if *distance == 0.0 { Complex64::ONE } else { Complex64::cis(factor * distance) };
    }
}

impl ShapeRow<'_> {
    /// The fields of both feeds at φ and −φ; the second stays zero where there is one only.
    fn fields(&self, ks: f64, sin_phi: f64, cos_phi: f64) -> [Mirrored; 2] {
        match self {
            Self::Vertical(field) => {
                let field = Field { theta: *field, phi: Complex64::ZERO };
                [Mirrored { left: field, right: field }, Mirrored::default()]
            }
            Self::Lone(wire, factors) => {
                let mut along = wire.along(ks * cos_phi);
                along.wire *= wire.drive;
                along.leads *= wire.drive;
                let (theta, phi) = factors.field(cos_phi, sin_phi, along);
                let mirrored = Mirrored { left: Field { theta, phi }, right: Field { theta, phi: -phi } };
                [mirrored, Mirrored::default()]
            }
            Self::Pair(pair, factors) => {
                let sideways = Complex64::cis(ks * sin_phi * pair.offset);
                pair.along(ks * cos_phi).map(|(rear, front)| {
                    let at = |sin_phi: f64, turn: Complex64| {
                        let wire = rear.wire + turn * front.wire;
                        let leads = rear.leads + turn * front.leads;
                        let (theta, phi) = factors.field(cos_phi, sin_phi, Along { wire, leads });
                        Field { theta, phi }
                    };
                    Mirrored { left: at(sin_phi, sideways), right: at(-sin_phi, sideways.conj()) }
                })
            }
        }
    }
}
