//! The land on the plan: areas to keep out of, roads, paths, ditches and gates.

use super::board::Board;
use super::place::{Point as Paper, Rect};
use super::svg::{Type, num};
use crate::project::Project;

/// Hatched areas to keep out of, and crosses where something is crossed.
pub(super) fn draw_land(board: &mut Board, project: &Project) {
    if !project.keep_out.is_empty() {
        let (clip, area) = (board.svg.id("edge"), board.area);
        board.svg.raw(&format!(
            r#"<clipPath id="{clip}"><rect x="{}" y="{}" width="{}" height="{}"/></clipPath>"#,
            num(area.left),
            num(area.top),
            num(area.right - area.left),
            num(area.bottom - area.top)
        ));
    }
    for keep_out in &project.keep_out {
        let corners: Vec<String> = keep_out
            .polygon
            .iter()
            .map(|corner| {
                let at = board.ground.paper((*corner).into());
                format!("{},{}", num(at.0), num(at.1))
            })
            .collect();
        let (fill, clip) = (board.svg.id("cross"), board.svg.id("edge"));
        board.svg.raw(&format!(
            r##"<polygon clip-path="url(#{clip})" points="{}" fill="url(#{fill})" stroke="#000" stroke-width=".7" stroke-dasharray="6 1.2 1.2 1.2"/>"##,
            corners.join(" ")
        ));
    }
    for crossing in &project.crossings {
        let at = board.ground.paper(crossing.at.into());
        if board.area.holds(Rect::about(at, 2.0, 2.0)) {
            let (x, y) = (num(at.0 - 2.0), num(at.1 - 2.0));
            board.svg.stroke(&format!("M{x} {y}l4 4m0 -4l-4 4"), 0.5, "");
            board.taken.rect(Rect::about(at, 2.0, 2.0));
        }
    }
}

/// Their names, when everything else has found its place.
pub(super) fn draw_names_of_land(board: &mut Board, project: &Project) {
    for keep_out in &project.keep_out {
        let corners: Vec<Paper> =
            keep_out.polygon.iter().map(|corner| board.ground.paper((*corner).into())).collect();
        let count = f64::from(u32::try_from(corners.len()).unwrap_or(1).max(1));
        let sum = corners.iter().fold((0.0, 0.0), |sum, c| (sum.0 + c.0, sum.1 + c.1));
        let at = (
            (sum.0 / count).clamp(board.area.left + 5.0, board.area.right - 5.0),
            (sum.1 / count).clamp(board.area.top + 5.0, board.area.bottom - 5.0),
        );
        board.label(at, 0.0, Type::bold(3.2), &[&format!("KEEP OUT: {}", keep_out.name)]);
    }
    for crossing in &project.crossings {
        let at = board.ground.paper(crossing.at.into());
        if board.area.holds(Rect::about(at, 2.0, 2.0)) {
            let words = format!("{}, {} wide", crossing.kind, crossing.width);
            board.label(at, 3.0, Type::plain(3.2), &[&words]);
        }
    }
}
