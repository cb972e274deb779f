//! The work in the field, from clearing to the first signal.

use rust_decimal::Decimal;

use super::prepare::boxes_of;
use super::step::{Block, Hold, Reading, Scene, Step, labels, runs, step};
use crate::design::ArrayDesign;
use crate::plan::ElementKind;
use crate::project::{Termination, Terrain, VerticalKind};
use crate::reception::Ends;
use crate::report::document::show;
use crate::takeoff::PieceRole;
use crate::units::Length;

/// What a kilogram on a spring balance weighs.
const NEWTONS_A_KILOGRAM: f64 = 9.81;

/// The blocks after the stakes.
pub(super) fn blocks(scene: &Scene<'_>) -> Vec<Block> {
    vec![
        supports(scene),
        earth(scene),
        wires(scene),
        boxes(scene),
        cables(scene),
        close(scene),
        station(scene),
        first_signal(scene),
    ]
}

fn supports(scene: &Scene<'_>) -> Block {
    let mut steps = Vec::new();
    if scene.input.project.site.terrain != Terrain::Open {
        let what = "Clear a path 2 m wide along every wire and cable".to_owned();
        step(
            &mut steps,
            ("clear", "T05"),
            &["stake"],
            what,
            "no felling in the nesting season; saws: trained people only",
        );
    }
    let mut some = |key, role: &str, what: &str, after, detail: &str| {
        if let Some((count, places)) = scene.places(role) {
            step(&mut steps, key, after, format!("{what}: {count}, at {places}"), detail);
        }
    };
    let set: &[&str] = &["stake", "clear"];
    some(
        ("end-post", "T09"),
        "end-support",
        "Set end posts with backstay and anchor",
        set,
        "the stay pulls away from the wire",
    );
    some(("post", "T07"), "mid-support", "Set posts between the ends", set, "in line by eye from end to end");
    some(
        ("tree", "T10"),
        "tree-support",
        "Fit tree supports",
        set,
        "strap, slip tie, the wire runs free; no nail in a live tree",
    );
    some(("end-insulator", "T11"), "end-insulator", "Fit end insulators", &["end-post", "tree"], "");
    some(("insulator", "T11"), "mid-insulator", "Fit insulators between the ends", &["post", "tree"], "");
    some(
        ("mast", "T19"),
        "mast",
        "Raise verticals",
        set,
        "nobody under it; clear of any line by 1.5 times its height",
    );
    some(("guy", "T20"), "guy", "Guy the verticals", &["mast"], "one person a guy, one at the mast");
    some(
        ("hub-post", "T21"),
        "hub-box",
        "Mount the hub boxes",
        set,
        "lid up, sockets down, cables from below",
    );
    Block { title: "Clear and set supports", steps, hold: None }
}

fn earth(scene: &Scene<'_>) -> Block {
    let mut steps = Vec::new();
    if let Some((count, places)) = scene.places("ground-rod") {
        let what = format!("Drive {count} ground rods at {places}");
        step(
            &mut steps,
            ("rod", "T15"),
            &["permit", "stake"],
            what,
            "clamp and bonding wire on each set; caps on the tops",
        );
    }
    let radials = scene.pieces(PieceRole::Radial);
    if !radials.is_empty() {
        let total: Length = radials.iter().map(|piece| piece.cut).sum();
        let what = format!("Lay {} radials, {} m in all", radials.len(), show::metres(total));
        let detail = "outward or square to the wire, never under it; sets do not touch each other";
        step(&mut steps, ("radial", "T16"), &["rod"], what, detail);
    }
    let outdoors: Vec<&str> = scene.hubs().iter().map(|hub| hub.name.as_str()).collect();
    if !outdoors.is_empty() {
        let each = if outdoors.len() > 1 { "a surge rod for each of" } else { "the surge rod of" };
        let what = format!("Drive {each} {}", show::names(outdoors));
        let detail = "5 m or more from every antenna earth, never joined to it";
        step(&mut steps, ("surge", "T15"), &["permit", "stake"], what, detail);
    }
    let sets: Vec<String> = scene
        .points()
        .filter(|point| point.fixtures.iter().any(|f| matches!(f, crate::plan::Fixture::Earth(_))))
        .map(|point| point.name.clone())
        .collect();
    let readings = sets
        .into_iter()
        .map(|name| Reading::new(format!("earth of {name}, ohm"), "write down; soil wet or dry"))
        .collect::<Vec<_>>();
    let rule = "Read every earth set before anything is connected to it.";
    let hold = (!readings.is_empty()).then_some(Hold { rule, readings });
    Block { title: "Earth", steps, hold }
}

fn wires(scene: &Scene<'_>) -> Block {
    let mut steps = Vec::new();
    let wires = scene.pieces(PieceRole::AntennaWire);
    if !wires.is_empty() {
        let words = wires.iter().map(|wire| {
            format!("{} from {} to {}, {} m", wire.label, wire.from, wire.to, show::metres(wire.cut))
        });
        let what = format!("Run out and hang {}", words.collect::<Vec<_>>().join("; "));
        let after = &["end-insulator", "insulator"];
        step(&mut steps, ("hang", "T12"), after, what, "nobody under the wire; ground it before touching");
        let practice = &scene.input.project.practice;
        let what = format!("Tension and tie off {}", labels(&wires));
        let detail = format!(
            "pull to {}, about {:.0} kg on a spring balance; sag in a bay no more than {}",
            practice.wire_tension,
            practice.wire_tension.newtons() / NEWTONS_A_KILOGRAM,
            practice.max_sag
        );
        step(&mut steps, ("tension", "T13"), &["hang"], what, detail);
    }
    Block { title: "Wires", steps, hold: None }
}

fn boxes(scene: &Scene<'_>) -> Block {
    let mut steps = Vec::new();
    if let Some((count, places)) = scene.places("feed-box") {
        let what = format!("Mount {}: {places}", boxes_of(count, "feed"));
        let detail = "coax shield is not joined to the antenna earth";
        step(&mut steps, ("feed", "T17"), &["feed-bench", "end-post", "mast", "rod"], what, detail);
    }
    if let Some((count, places)) = scene.places("termination-box") {
        let what = format!("Mount {}: {places}", boxes_of(count, "termination"));
        step(
            &mut steps,
            ("termination", "T18"),
            &["termination-bench", "end-post", "rod"],
            what,
            "the termination is in front, where the beam arrow points",
        );
    }
    if scene.count("hub-box") > Decimal::ZERO {
        let what = "Wire the hub boxes by their labels".to_owned();
        step(
            &mut steps,
            ("hub", "T22"),
            &["hub-join", "hub-post", "surge"],
            what,
            "bond a metal box to its surge rod",
        );
    }
    Block { title: "Boxes", steps, hold: None }
}

fn cables(scene: &Scene<'_>) -> Block {
    let mut steps = Vec::new();
    let laid = scene.laid();
    if laid.is_empty() {
        return Block { title: "Cables", steps, hold: None };
    }
    let set: &[&str] = &["clear", "hub-post", "plug-bench"];
    match scene.burial() {
        Some(depth) => {
            let what = format!("Dig the trenches, {depth} deep, and lay {}", runs(&laid));
            step(
                &mut steps,
                ("lay", "T24"),
                set,
                what,
                "leave them open: nothing is buried before it is tested",
            );
        }
        None => step(
            &mut steps,
            ("lay", "T23"),
            set,
            format!("Lay {}", runs(&laid)),
            "a loop at both ends; what is over is coiled at the hub",
        ),
    }
    let control = scene.pieces(PieceRole::Control);
    if !control.is_empty() {
        step(&mut steps, ("control", "T27"), &["lay"], format!("Lay {}", runs(&control)), "beside the coax");
    }
    step(
        &mut steps,
        ("plug", "T28"),
        &["lay"],
        format!("Fit the second plug of {}", labels(&laid)),
        "check the label first",
    );
    let delays = scene.pieces(PieceRole::Delay);
    if !delays.is_empty() {
        let words: Vec<String> = delays
            .iter()
            .map(|piece| format!("{} at {}, leg: {}", piece.label, piece.from, show::or_dash(&piece.serves)))
            .collect();
        let what = format!("Connect the delay lines: {}", words.join("; "));
        step(
            &mut steps,
            ("delay", "T22"),
            &["trim", "hub"],
            what,
            "in the wrong leg the array listens backwards",
        );
    }
    let rule = "Test before sealing. Nothing is buried or taped before every line below is filled in.";
    Block { title: "Cables", steps, hold: Some(Hold { rule, readings: element_readings(scene) }) }
}

/// What is read at every element and every laid cable.
fn element_readings(scene: &Scene<'_>) -> Vec<Reading> {
    let mut readings = Vec::new();
    let arrays = scene.option.design.arrays.iter();
    for (array, element) in
        arrays.flat_map(|array| array.plan.layout.elements.iter().map(move |e| (array, e)))
    {
        let name = &element.name;
        match &element.kind {
            ElementKind::Wire(wire) => {
                readings.push(Reading::new(
                    format!("{name}: wire lifted from the feed box, wire to earth, ohm"),
                    loop_resistance(array, wire.termination),
                ));
                readings
                    .push(Reading::new(format!("{name}: across the socket of the feed box, ohm"), "under 1"));
            }
            ElementKind::Vertical(foot) => {
                let (what, good) = match foot.kind {
                    VerticalKind::Active => ("supply at the amplifier, V", "as on the bench; polarity right"),
                    VerticalKind::Passive => {
                        ("resonance at the base, MHz; resistance, ohm", "as on the bench")
                    }
                };
                readings.push(Reading::new(format!("{name}: {what}"), good));
            }
        }
    }
    for piece in scene.laid() {
        let what = format!("{}: far end open; far end shorted, ohm", piece.label);
        let good = if piece.match_group.is_empty() {
            "open: none; shorted: write down".to_owned()
        } else {
            format!("open: none; shorted: as all of group {}", piece.match_group)
        };
        readings.push(Reading::new(what, good));
    }
    readings
}

/// What a meter reads round a wire: its resistor and the earths at both ends, which were read before.
fn loop_resistance(array: &ArrayDesign, termination: Termination) -> String {
    let built = match array.ends {
        Ends::AsBuilt { earth, resistor } => match termination {
            Termination::Computed => Some((resistor, earth)),
            Termination::Resistor(given) => Some((given, earth)),
            Termination::Matched | Termination::Reflection(_) => None,
        },
        Ends::Matched => None,
    };
    match built {
        Some((resistor, earth)) => {
            let sum = resistor.ohms() + 2.0 * earth.ohms();
            format!("{resistor} and both earths as read above, ± 20 %; {sum:.0} if these are as computed")
        }
        None => "the termination resistor and both earths as read above, ± 20 %".to_owned(),
    }
}

fn close(scene: &Scene<'_>) -> Block {
    let mut steps: Vec<Step> = Vec::new();
    step(
        &mut steps,
        ("test", "T41"),
        &["feed", "termination", "plug", "tension"],
        "Go through the readings above with the leader".to_owned(),
        "outside the range: stop and look for the cause",
    );
    let laid = scene.laid();
    if !laid.is_empty() {
        let (mains, inner): (Vec<_>, Vec<_>) =
            laid.into_iter().partition(|piece| piece.role == PieceRole::Main);
        let at = |pieces: &[_], end: &str| (!pieces.is_empty()).then(|| format!("{} {end}", labels(pieces)));
        let words = [at(&inner, "at both ends"), at(&mains, "at the field end only")];
        let words: Vec<String> = words.into_iter().flatten().collect();
        let what = format!("Connect {}, by the labels", words.join(", "));
        step(
            &mut steps,
            ("join", "T22"),
            &["test", "hub"],
            what,
            "clean and dry; hand-tight, then snug with a spanner",
        );
    }
    step(
        &mut steps,
        ("seal", "T30"),
        &["test", "join"],
        "Seal every joint outdoors".to_owned(),
        "stretch tape, cover tape, tie; drain holes stay open",
    );
    if let Some(depth) = scene.burial() {
        step(
            &mut steps,
            ("bury", "T49"),
            &["test"],
            format!("Bury the cables {depth} deep and close the trenches"),
            "marker above the cable",
        );
    }
    Block { title: "Seal and close", steps, hold: None }
}

fn station(scene: &Scene<'_>) -> Block {
    let mut steps = Vec::new();
    let mains = scene.pieces(PieceRole::Main);
    let what = "Mount the entry panel: arresters, surge rod, bond to the building's electrodes".to_owned();
    let detail = "a licensed person where the law says so; local code first";
    step(&mut steps, ("entry", "T40"), &["permit"], what, detail);
    let readings = vec![
        Reading::new("entry bonded to the building's electrodes", "yes; name of who did it"),
        Reading::new("every coax arrester and control arrester fitted", "yes"),
        Reading::new("transmitters on the site locked off", "yes; name of who holds the key"),
    ];
    let rule = "No line is connected to the station side before the entry is bonded.";
    let hold = (!mains.is_empty()).then_some(Hold { rule, readings });
    Block { title: "Station entry", steps, hold }
}

fn first_signal(scene: &Scene<'_>) -> Block {
    let mut steps = Vec::new();
    let mains = scene.pieces(PieceRole::Main);
    let what = format!("Connect {} to the entry panel", labels(&mains));
    step(&mut steps, ("connect", "T40"), &["entry", "join"], what, "");
    let bearings: Vec<String> = scene
        .option
        .design
        .arrays
        .iter()
        .flat_map(|array| {
            array.plan.feed.switch.states.iter().map(|state| format!("{}°", show::degrees(state.bearing)))
        })
        .collect();
    let what = format!("Listen in every direction: {} true", bearings.join(", "));
    let detail = "a known signal from ahead is louder than the same from behind; if not, the delay is in the wrong leg or a winding is reversed";
    step(&mut steps, ("listen", "T42"), &["connect"], what, detail);
    step(
        &mut steps,
        ("record", "T43"),
        &["listen"],
        "Write down what was built and what it took".to_owned(),
        "true positions, lengths, readings, hours",
    );
    Block { title: "First signal", steps, hold: None }
}
