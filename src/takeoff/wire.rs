//! Antenna wires.

use rust_decimal::Decimal;

use super::model::{Piece, PieceRole, Reason};
use super::tally::{Tally, Want};
use super::{ArrayDesign, Scene};
use crate::plan::{Layout, Span};
use crate::project::Supports;
use crate::units::Length;

/// Runs longer than this get a spring, shock cord or weight at one end (common practice, no source).
const TENSIONER_ABOVE: Length = Length::from_mm(100_000);

/// Every span is one piece of wire, without joints.
pub(super) fn take_off(tally: &mut Tally<'_>, scene: &Scene<'_>, array: &ArrayDesign) {
    let layout = &array.plan.layout;
    for span in &layout.spans {
        tally.push(piece(tally, scene, layout, span));
        if span.length > TENSIONER_ABOVE {
            let why = format!("one end of a wire longer than {TENSIONER_ABOVE}");
            tally.add("tensioner", &Want::any(), &layout.point(span.to).name, 1, &why);
        }
    }
}

/// L = up( S·(1 + slack) + both drops + 2 × tail, wire-round-up ).
fn piece(tally: &Tally<'_>, scene: &Scene<'_>, layout: &Layout, span: &Span) -> Piece {
    let practice = &scene.project.practice;
    let slack_ratio = slack_of(scene, span.supports);
    let slack = span.length.times_up(slack_ratio);
    let finished = span.length + slack + span.height * 2 + practice.wire_tail * 2;
    let cut = finished.up_to(practice.wire_round_up);
    let steps = vec![
        format!("{} span + {slack} slack (span × {})", span.length, slack_ratio.normalize()),
        format!("+ 2 × {} drop + 2 × {} tail = {finished}", span.height, practice.wire_tail),
        format!("up to {} = {cut} to cut", practice.wire_round_up),
    ];
    Piece {
        label: layout.elements[span.element.0].name.clone(),
        role: PieceRole::AntennaWire,
        part: tally.choose("wire", &Want::any()),
        from: layout.point(span.from).name.clone(),
        to: layout.point(span.to).name.clone(),
        straight: Some(span.length),
        routed: Some(span.length),
        finished,
        cut,
        coiled: None,
        match_group: String::new(),
        conductors: None,
        electrical: None,
        serves: String::new(),
        line: None,
        reason: Reason::steps(steps),
    }
}

/// 1 % on posts, 2 % more in trees, where the wire must run free (common practice, no source).
fn slack_of(scene: &Scene<'_>, supports: Supports) -> Decimal {
    let given = scene.project.practice.wire_slack.unwrap_or(Decimal::new(1, 2));
    match supports {
        Supports::Posts => given,
        Supports::Trees => given + Decimal::new(2, 2),
    }
}
