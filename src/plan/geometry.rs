//! Points on the ground, in the frame of an array and in the frame of the site.

use crate::project::{ArrayPoint, SitePoint};
use crate::units::{Bearing, Length};

/// A place in the frame of an array, metres: forward along the heading, right 90° clockwise from it.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub struct Position {
    forward_m: f64,
    right_m: f64,
}

impl Position {
    /// A place in metres.
    pub const fn from_metres(forward_m: f64, right_m: f64) -> Self {
        Self { forward_m, right_m }
    }

    /// A place from whole millimetres.
    pub fn new(forward: Length, right: Length) -> Self {
        Self { forward_m: forward.metres(), right_m: right.metres() }
    }

    /// Metres along the heading.
    pub const fn forward_m(self) -> f64 {
        self.forward_m
    }

    /// Metres to the right of the heading.
    pub const fn right_m(self) -> f64 {
        self.right_m
    }

    /// The sum of two offsets.
    #[must_use]
    pub fn plus(self, other: Self) -> Self {
        Self { forward_m: self.forward_m + other.forward_m, right_m: self.right_m + other.right_m }
    }

    /// The plan distance to `other` in metres, not rounded.
    pub fn distance_m(self, other: Self) -> f64 {
        let (du, dv) = (self.forward_m - other.forward_m, self.right_m - other.right_m);
        (du * du + dv * dv).sqrt()
    }

    /// The mean of some places; the origin when there are none.
    #[expect(clippy::cast_precision_loss, reason = "a handful of places")]
    pub fn mean(places: &[Self]) -> Self {
        if places.is_empty() {
            return Self::default();
        }
        let n = places.len() as f64;
        let sum = places.iter().fold(Self::default(), |sum, place| sum.plus(*place));
        Self { forward_m: sum.forward_m / n, right_m: sum.right_m / n }
    }
}

impl From<ArrayPoint> for Position {
    fn from(point: ArrayPoint) -> Self {
        Self::new(point.forward, point.right)
    }
}

/// A place in the frame of the site, metres east and north of the datum.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub struct SitePosition {
    east_m: f64,
    north_m: f64,
}

impl SitePosition {
    /// Metres east of the datum.
    pub const fn east_m(self) -> f64 {
        self.east_m
    }

    /// Metres north of the datum.
    pub const fn north_m(self) -> f64 {
        self.north_m
    }

    /// The plan distance to `other` in metres, not rounded.
    pub fn distance_m(self, other: Self) -> f64 {
        let (de, dn) = (self.east_m - other.east_m, self.north_m - other.north_m);
        (de * de + dn * dn).sqrt()
    }

    /// The bearing toward `other`.
    pub fn bearing_to(self, other: Self) -> Bearing {
        let (de, dn) = (other.east_m - self.east_m, other.north_m - self.north_m);
        Bearing::from_degrees(libm::atan2(de, dn).to_degrees())
    }
}

impl From<SitePoint> for SitePosition {
    fn from(point: SitePoint) -> Self {
        Self { east_m: point.east.metres(), north_m: point.north.metres() }
    }
}

/// How the frame of an array lies in the frame of the site.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Frame {
    origin: SitePosition,
    sin: f64,
    cos: f64,
}

impl Frame {
    /// The frame with its origin at `centre`, forward along `heading`.
    pub fn new(centre: SitePoint, heading: Bearing) -> Self {
        let (sin, cos) = exact_sin_cos(heading.degrees());
        Self { origin: centre.into(), sin, cos }
    }

    /// From the array's frame into the site's: east = u·sin B + v·cos B, north = u·cos B − v·sin B.
    pub fn to_site(self, place: Position) -> SitePosition {
        let (u, v) = (place.forward_m, place.right_m);
        SitePosition {
            east_m: self.origin.east_m + u * self.sin + v * self.cos,
            north_m: self.origin.north_m + u * self.cos - v * self.sin,
        }
    }

    /// From the site's frame into the array's.
    pub fn to_array(self, place: SitePosition) -> Position {
        let (e, n) = (place.east_m - self.origin.east_m, place.north_m - self.origin.north_m);
        Position { forward_m: e * self.sin + n * self.cos, right_m: e * self.cos - n * self.sin }
    }
}

/// Sine and cosine of degrees, exact at quarter turns so that a heading of 90° gives whole millimetres.
fn exact_sin_cos(degrees: f64) -> (f64, f64) {
    let quarter = degrees / 90.0;
    if (quarter - quarter.round()).abs() < 1e-12 {
        return [(0.0, 1.0), (1.0, 0.0), (0.0, -1.0), (-1.0, 0.0)][quarter_index(quarter)];
    }
    let (sin, cos) = libm::sincos(degrees.to_radians());
    (sin, cos)
}

#[expect(clippy::cast_possible_truncation, clippy::cast_sign_loss, reason = "reduced into 0 to 3 first")]
fn quarter_index(quarter: f64) -> usize {
    quarter.round().rem_euclid(4.0) as usize
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_heading_of_east_turns_forward_into_east_and_right_into_south() {
        let datum = SitePoint { east: Length::ZERO, north: Length::ZERO };
        let frame = Frame::new(datum, Bearing::from_degrees(90.0));
        let place = frame.to_site(Position::from_metres(10.0, 3.0));
        assert!((place.east_m() - 10.0).abs() < 1e-12 && (place.north_m() + 3.0).abs() < 1e-12);
        assert!((frame.to_array(place).right_m() - 3.0).abs() < 1e-12);
    }
}
