//! Whether corners make an area.

use super::code;
use super::model::SitePoint;
use super::value::Value;

/// The corners as they are, if they make an area whose sides do not cross.
pub(super) fn check(value: &Value<'_>, corners: Vec<SitePoint>) -> Option<Vec<SitePoint>> {
    if corners.len() < 3 || twice_area(&corners) == 0 {
        return value.refuse(
            code::POLYGON_CORNERS,
            format!("{} corners do not enclose an area", corners.len()),
            "give three or more corners { east, north }, not all in one line",
        );
    }
    if crosses_itself(&corners) {
        return value.refuse(
            code::POLYGON_CROSSES_ITSELF,
            "two sides of the polygon cross",
            "list the corners in the order in which one would walk around",
        );
    }
    Some(corners)
}

fn twice_area(corners: &[SitePoint]) -> i128 {
    sides(corners)
        .map(|(a, b)| wide(a.east.mm()) * wide(b.north.mm()) - wide(b.east.mm()) * wide(a.north.mm()))
        .sum()
}

fn sides(corners: &[SitePoint]) -> impl Iterator<Item = (SitePoint, SitePoint)> + '_ {
    corners.iter().copied().zip(corners.iter().copied().cycle().skip(1))
}

fn wide(mm: i64) -> i128 {
    i128::from(mm)
}

/// Twice the signed area of a triangle: positive when `c` lies to the left of `a` to `b`.
fn turn(a: SitePoint, b: SitePoint, c: SitePoint) -> i128 {
    (wide(b.east.mm()) - wide(a.east.mm())) * (wide(c.north.mm()) - wide(a.north.mm()))
        - (wide(b.north.mm()) - wide(a.north.mm())) * (wide(c.east.mm()) - wide(a.east.mm()))
}

fn crosses_itself(corners: &[SitePoint]) -> bool {
    let sides: Vec<_> = sides(corners).collect();
    sides.iter().enumerate().any(|(n, (a, b))| {
        sides[n + 1..].iter().any(|(c, d)| {
            let (c_side, d_side) = (turn(*a, *b, *c).signum(), turn(*a, *b, *d).signum());
            let (a_side, b_side) = (turn(*c, *d, *a).signum(), turn(*c, *d, *b).signum());
            c_side * d_side < 0 && a_side * b_side < 0
        })
    })
}
