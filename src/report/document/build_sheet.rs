//! The build sheet: numbered steps in order, each with what must be done before it, and the points where work stops.

mod field;
mod join;
mod prepare;
mod step;

use serde::Serialize;

use super::{Input, OptionInput};
use step::{Block, Step};

/// The build sheet of one option.
#[derive(Debug, Serialize)]
pub(super) struct View {
    blocks: Vec<BlockView>,
    crew: usize,
    steps: usize,
}

#[derive(Debug, Serialize)]
struct BlockView {
    title: &'static str,
    steps: Vec<StepView>,
    hold: Option<step::Hold>,
    /// Short enough to stand on one page with its hold point.
    is_short: bool,
}

#[derive(Debug, Serialize)]
struct StepView {
    number: usize,
    what: String,
    detail: String,
    after: String,
    people: String,
}

/// The view of one option's build sheet.
pub(super) fn view(input: &Input<'_>, option: &OptionInput<'_>) -> View {
    let scene = step::Scene { input, option };
    let mut blocks = prepare::blocks(&scene);
    blocks.extend(field::blocks(&scene));
    blocks.retain(|block| !block.steps.is_empty() || block.hold.is_some());
    let order: Vec<&'static str> =
        blocks.iter().flat_map(|block| &block.steps).map(|step| step.key).collect();
    let crew = input.project.labour.crew;
    let steps = order.len();
    let blocks = blocks.into_iter().map(|block| block_view(block, &order, &scene)).collect();
    View { blocks, crew, steps }
}

/// A block with a hold point and no more rows than this is not split over two pages.
const LONGEST_WHOLE: usize = 5;

fn block_view(block: Block, order: &[&'static str], scene: &step::Scene<'_>) -> BlockView {
    let number = |key: &str| order.iter().position(|known| *known == key).map(|at| at + 1);
    let readings = block.hold.as_ref().map_or(0, |hold| hold.readings.len());
    let is_short = readings > 0 && block.steps.len() + readings <= LONGEST_WHOLE;
    let steps = block.steps.into_iter().map(|step| step_view(step, &number, scene));
    BlockView { title: block.title, steps: steps.collect(), hold: block.hold, is_short }
}

fn step_view(step: Step, number: &impl Fn(&str) -> Option<usize>, scene: &step::Scene<'_>) -> StepView {
    // A step that this project does not have is nobody's prerequisite.
    let mut after: Vec<usize> = step.after.iter().filter_map(|key| number(key)).collect();
    after.sort_unstable();
    StepView {
        number: number(step.key).unwrap_or_default(),
        what: step.what,
        detail: step.detail,
        after: after.iter().map(ToString::to_string).collect::<Vec<_>>().join(", "),
        people: scene.people(step.task),
    }
}
