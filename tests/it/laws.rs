//! Laws that hold for every project: random compositions, read from text as a user would write them.

use arraywright::catalogue::{self, Catalogue};
use arraywright::design::{self, Design};
use arraywright::plan::{LineRole, Node};
use arraywright::pricing;
use arraywright::project::{self, Project};
use arraywright::reception::{self, LineFigures};
use arraywright::takeoff::{self, PieceRole, Takeoff};
use arraywright::units::Length;
use proptest::prelude::*;
use rust_decimal::Decimal;

/// A composition with its numbers.
#[derive(Clone, Debug)]
#[expect(clippy::struct_excessive_bools, reason = "each is one switch of a random project")]
struct Composition {
    wires: bool,
    length_dm: i64,
    step_dm: i64,
    three: bool,
    endfire: bool,
    row: usize,
    spacing_m: i64,
    by_row: bool,
    merged: bool,
    home: bool,
    heading: i64,
    terrain: usize,
    hub: usize,
    burial_cm: i64,
}

fn compositions() -> impl Strategy<Value = Composition> {
    let shape = (any::<bool>(), 900_i64..3500, 80_i64..250, any::<bool>(), any::<bool>());
    let row = (prop::sample::select(vec![1_usize, 1, 2, 2, 3, 4, 6]), 40_i64..160);
    let feed = (any::<bool>(), any::<bool>(), any::<bool>(), 0_usize..3);
    (shape, row, feed, 0_i64..360, 0_usize..5, 0_i64..40).prop_map(
        |(
            (wires, length_dm, step_dm, three, endfire),
            (row, spacing_m),
            feed,
            heading,
            terrain,
            burial_cm,
        )| {
            let (by_row, merged, home, hub) = feed;
            Composition {
                wires,
                length_dm,
                step_dm,
                three,
                endfire,
                row,
                spacing_m,
                by_row,
                merged,
                home,
                heading,
                terrain,
                hub,
                burial_cm,
            }
        },
    )
}

fn text_of(c: &Composition) -> String {
    let metres = |dm: i64| format!("{}.{} m", dm / 10, dm % 10);
    let element = if c.wires {
        format!("element.wire = {{ length = \"{}\" }}", metres(c.length_dm))
    } else {
        "element.vertical = { height = \"6 m\" }".to_owned()
    };
    let endfire = match (c.endfire, c.wires) {
        (false, _) => String::new(),
        (true, true) => format!("echelon = {{ stagger = \"{}\" }}\n", metres(c.step_dm)),
        (true, false) => {
            format!(
                "endfire = {{ count = {}, spacing = \"{}\" }}\n",
                if c.three { 3 } else { 2 },
                metres(c.step_dm)
            )
        }
    };
    let row = if c.row > 1 {
        format!("broadside = {{ count = {}, spacing = \"{} m\" }}\n", c.row, c.spacing_m)
    } else {
        String::new()
    };
    let both = c.endfire && c.row > 1;
    let staged = c.endfire || c.row > 1;
    let mut feed = "amplifier = \"none\"\n".to_owned();
    let by_row = both && c.by_row;
    if by_row {
        feed.push_str("combining = \"by-row\"\n");
    }
    if c.merged && c.endfire && !by_row {
        feed.push_str("delay-style = \"merged\"\n");
    }
    if c.home && staged {
        feed.push_str("join = \"receiver\"\n");
    } else if staged && c.hub == 1 {
        feed.push_str("hub = \"best\"\n");
    } else if staged && c.hub == 2 {
        feed.push_str("hub = { forward = \"-12 m\", right = \"3 m\" }\n");
    }
    let terrain = ["open", "pasture", "light-wood", "dense-bush", "rock"][c.terrain];
    format!(
        "[project]\ntitle = \"Law\"\ncurrency = \"EUR\"\nestimated = 2026-06-01\nfrequency = \"1.83 MHz\"\n\
         [site]\nreceiver = {{ east = \"-90 m\", north = \"40 m\" }}\nterrain = \"{terrain}\"\n\
         [[array]]\nname = \"law\"\nheading = \"{} deg\"\n{element}\n{endfire}{row}[array.feed]\n{feed}\
         [practice]\nburial-depth = \"{} cm\"\n",
        c.heading, c.burial_cm
    )
}

fn built(text: &str) -> (Project, Catalogue, Design, Takeoff) {
    let (project, problems) = project::read("law.toml", text, None);
    let project = project.unwrap_or_else(|| {
        let words: Vec<String> = problems.sorted().iter().map(ToString::to_string).collect();
        panic!("{}\n{text}", words.join("\n"))
    });
    let catalogue = catalogue::built_in();
    let settled = design::settle(&project, &catalogue);
    let design = settled.designs.into_iter().next().unwrap_or_else(|| {
        let words: Vec<String> = settled.problems.sorted().iter().map(ToString::to_string).collect();
        panic!("{}\n{text}", words.join("\n"))
    });
    let takeoff = takeoff::take_off(&project, &catalogue, &design);
    (project, catalogue, design, takeoff)
}

fn is_finite_and_not_negative(takeoff: &Takeoff) {
    for item in &takeoff.items {
        assert!(item.quantity > Decimal::ZERO, "{item:?}");
        assert!(item.waste >= Decimal::ZERO && item.spare >= Decimal::ZERO, "{item:?}");
        assert!(!item.reason.steps.is_empty(), "{item:?}");
    }
    for piece in &takeoff.pieces {
        assert!(piece.finished > Length::ZERO && piece.cut >= piece.finished, "{piece:?}");
        assert!(piece.cut < Length::from_mm(10_000_000), "{piece:?}");
        assert!(piece.coiled.is_none_or(|coiled| coiled >= Length::ZERO), "{piece:?}");
        if let (Some(straight), Some(routed)) = (piece.straight, piece.routed) {
            assert!(routed >= straight, "{piece:?}");
        }
        assert!(!piece.reason.steps.is_empty(), "{piece:?}");
    }
}

/// The bill counts exactly the nodes and lines of the feed tree.
fn bill_is_the_tree(design: &Design, takeoff: &Takeoff) {
    let feed = &design.arrays[0].plan.feed;
    let nodes = feed.nodes();
    let count =
        |wanted: &dyn Fn(&Node) -> bool| Decimal::from(nodes.iter().filter(|node| wanted(node)).count());
    assert_eq!(takeoff.count("inverter"), count(&|n| matches!(n, Node::Inverter { .. })));
    assert_eq!(takeoff.count("pad"), count(&|n| matches!(n, Node::Pad { .. })));
    let hybrids = |ways: usize| count(&|n| matches!(n, Node::Combine { inputs, .. } if inputs.len() == ways));
    assert_eq!(takeoff.count("hybrid-2way"), hybrids(2));
    assert_eq!(takeoff.count("hybrid-3way"), hybrids(3));
    assert_eq!(takeoff.count("hub-box"), Decimal::from(feed.hubs.len()));
    for (role, piece) in [
        (LineRole::Branch, PieceRole::Branch),
        (LineRole::Run, PieceRole::Run),
        (LineRole::Delay, PieceRole::Delay),
        (LineRole::Main, PieceRole::Main),
    ] {
        let lines = feed.lines.iter().filter(|line| line.role == role).count();
        assert_eq!(takeoff.pieces_of(piece).count(), lines);
    }
    assert_eq!(takeoff.count("plug"), Decimal::from(2 * feed.lines.len()));
    let inputs: usize = feed.legs.len();
    let joined = takeoff.count("hybrid-2way") + Decimal::TWO * takeoff.count("hybrid-3way");
    assert_eq!(joined, Decimal::from(inputs - 1), "hybrids of a combining tree");
}

/// plugs = sockets + 2 × barrels, the sockets being those of elements, hubs and the station entry.
fn plugs_have_sockets(design: &Design, takeoff: &Takeoff) {
    let feed = &design.arrays[0].plan.feed;
    let looped =
        feed.lines.iter().filter(|line| line.connection == arraywright::plan::Connection::Looped).count();
    let hub: usize = feed.hubs.iter().map(|hub| hub.inputs + hub.outputs).sum::<usize>() + 2 * looped;
    let entry = usize::from(matches!(&feed.root, Node::Line { .. }));
    let sockets = Decimal::from(feed.legs.len() + hub + entry);
    assert_eq!(takeoff.count("plug"), sockets + Decimal::TWO * takeoff.count("barrel"));
}

fn equal_groups_are_equal(design: &Design) {
    let array = &design.arrays[0];
    for (line, length) in array.plan.feed.lines.iter().zip(&array.lengths) {
        for (other, other_length) in array.plan.feed.lines.iter().zip(&array.lengths) {
            let same = line.role == other.role && line.match_group == other.match_group;
            if same && !line.match_group.is_empty() && line.delay == other.delay {
                assert_eq!(length.finished, other_length.finished);
            }
        }
    }
}

/// Without loss the parts on the list produce the weights as designed: same tree, other reading. Pads of 3 dB stand for half the
/// amplitude, and cables are cut to the millimetre.
fn parts_make_the_designed_weights(project: &Project, design: &Design) {
    let array = &design.arrays[0];
    let frequency = project.frequency;
    let lossless: Vec<LineFigures> =
        reception::line_figures(&array.plan.feed, &array.lengths, &array.cables, frequency)
            .into_iter()
            .map(|line| LineFigures { loss_db: None, ..line })
            .collect();
    let built = reception::built(&array.plan.feed, &lossless, &array.plan.feed.switch.states[0], frequency);
    let designed = reception::designed(&array.plan, frequency);
    for (own, wanted) in built.iter().zip(&designed) {
        let relative = (own / built[0]) / (wanted / designed[0]);
        assert!((relative.norm() - 1.0).abs() < 0.003, "amplitude {relative}");
        assert!(relative.arg().to_degrees().abs() < 0.05, "phase {relative}");
    }
}

proptest! {
    #![proptest_config(ProptestConfig { cases: 96, failure_persistence: None, rng_seed: proptest::test_runner::RngSeed::Fixed(1), ..ProptestConfig::default() })]

    #[test]
    fn every_project_can_be_taken_off_and_priced(c in compositions()) {
        let (project, catalogue, design, takeoff) = built(&text_of(&c));
        is_finite_and_not_negative(&takeoff);
        bill_is_the_tree(&design, &takeoff);
        plugs_have_sockets(&design, &takeoff);
        equal_groups_are_equal(&design);
        parts_make_the_designed_weights(&project, &design);
        let (bill, problems) = pricing::price(&project, &catalogue, &takeoff);
        prop_assert!(!problems.has_errors());
        for line in &bill.lines {
            prop_assert!(line.bought >= Decimal::ZERO && line.left >= Decimal::ZERO, "{line:?}");
        }
    }

    /// A longer wire never needs less of anything.
    #[test]
    fn a_longer_wire_never_needs_less(c in compositions(), more_dm in 1_i64..400) {
        let short = Composition { wires: true, hub: 0, ..c };
        let long = Composition { length_dm: short.length_dm + more_dm, ..short.clone() };
        let (_, _, _, less) = built(&text_of(&short));
        let (_, _, _, more) = built(&text_of(&long));
        for item in &less.items {
            prop_assert!(more.count(&item.role) >= less.count(&item.role), "{}", item.role);
        }
        for role in PieceRole::ALL {
            let cut = |takeoff: &Takeoff| takeoff.pieces_of(role).map(|piece| piece.cut).sum::<Length>();
            prop_assert!(cut(&more) >= cut(&less), "{role}");
        }
    }

    /// The same project in feet and in metres gives the same millimetres (1 ft = 0.3048 m exactly).
    #[test]
    fn feet_and_metres_agree(c in compositions(), feet in 30_i64..80) {
        let base = text_of(&Composition { endfire: false, row: 2, spacing_m: 999, ..c });
        let in_feet = base.replace("\"999 m\"", &format!("\"{feet} ft\""));
        let exact = Decimal::from(feet) * Decimal::new(3048, 4);
        let in_metres = base.replace("\"999 m\"", &format!("\"{exact} m\""));
        let cuts = |text: &str| {
            let (_, _, _, takeoff) = built(text);
            takeoff.pieces.iter().map(|piece| (piece.label.clone(), piece.cut)).collect::<Vec<_>>()
        };
        prop_assert_eq!(cuts(&in_feet), cuts(&in_metres));
    }

    /// A mirrored echelon needs the same of everything.
    #[test]
    fn a_mirrored_array_has_equal_counts(step_dm in 100_i64..250, offset_dm in 20_i64..200, row in 1_usize..4) {
        let text = |offset_dm: i64| {
            let row = if row > 1 { format!("broadside = {{ count = {row}, spacing = \"90 m\" }}\n") } else { String::new() };
            format!(
                "[project]\ntitle = \"Mirror\"\ncurrency = \"EUR\"\nestimated = 2026-06-01\nfrequency = \"1.83 MHz\"\n\
                 [site]\nreceiver = {{ east = \"0 m\", north = \"-140 m\" }}\n\
                 [[array]]\nname = \"m\"\nheading = \"0 deg\"\nelement.wire = {{ length = \"170 m\" }}\n\
                 echelon = {{ stagger = \"{}.{} m\", offset = \"{}{}.{} m\" }}\n{row}",
                step_dm / 10, step_dm % 10,
                if offset_dm < 0 { "-" } else { "" }, offset_dm.abs() / 10, offset_dm.abs() % 10
            )
        };
        let (_, _, _, right) = built(&text(offset_dm));
        let (_, _, _, left) = built(&text(-offset_dm));
        let counts = |takeoff: &Takeoff| {
            takeoff.items.iter().map(|item| (item.role.clone(), item.quantity)).collect::<Vec<_>>()
        };
        prop_assert_eq!(counts(&right), counts(&left));
        let mut cuts: Vec<Vec<Length>> = [&right, &left]
            .iter()
            .map(|takeoff| takeoff.pieces.iter().map(|piece| piece.cut).collect())
            .collect();
        for list in &mut cuts {
            list.sort();
        }
        prop_assert_eq!(&cuts[0], &cuts[1]);
    }
}
