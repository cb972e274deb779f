//! From project text to reports.

use std::collections::BTreeMap;
use std::fs;
use std::path::{Path, PathBuf};

use arraywright::arrays::{self, Context, HubAmplifier, LineCost, Names};
use arraywright::catalogue::{self, Catalogue};
use arraywright::design::{self, Design};
use arraywright::plan::{Allowances, ArrayPlan, Cables, LineLength, choose_cables, measure};
use arraywright::problem::Problems;
use arraywright::project::{self, Project};
use arraywright::reception::{self, ArrayReport, Ends, NoiseSite, Subject, Weighting};
use arraywright::report::pattern::{self, Delay, OptionReports, View};
use arraywright::units::{Decibel, Diameter, Length};
use rust_decimal::Decimal;
use serde_json::Value;

/// The demo projects, by folder name.
pub(crate) fn demos() -> Vec<(String, String)> {
    let folder = Path::new(env!("CARGO_MANIFEST_DIR")).join("demo-projects");
    let mut found: Vec<PathBuf> =
        fs::read_dir(folder).expect("demo projects").map(|entry| entry.expect("an entry").path()).collect();
    found.sort();
    let with_file = found.into_iter().filter(|path| path.join("project.toml").is_file());
    with_file
        .map(|path| {
            let name = path.file_name().expect("a name").to_string_lossy().into_owned();
            (name, fs::read_to_string(path.join("project.toml")).expect("a project"))
        })
        .collect()
}

/// A project that must read without errors.
pub(crate) fn read(text: &str) -> Project {
    let (project, problems) = project::read("project.toml", text, None);
    assert!(!problems.has_errors(), "{problems:?}\n{text}");
    project.expect("a project without errors")
}

/// A settled project with its reports.
pub(crate) struct Settled {
    pub(crate) project: Project,
    pub(crate) designs: Vec<Design>,
    pub(crate) options: Vec<OptionReports>,
    pub(crate) delays: BTreeMap<String, Delay>,
    pub(crate) weighting: Weighting,
}

impl Settled {
    pub(crate) fn new(text: &str, weighting: Weighting) -> Self {
        let project = read(text);
        let settled = design::settle(&project, &catalogue::built_in());
        assert!(!settled.problems.has_errors(), "{:?}", settled.problems);
        let designs: Vec<&Design> = settled.designs.iter().collect();
        let options = pattern::reports(&project, &designs, weighting);
        let delays = pattern::delays(&project, &designs);
        Self { options, delays, weighting, designs: settled.designs, project }
    }

    pub(crate) fn view(&self) -> View<'_> {
        View {
            project: &self.project,
            hash: "0123abcd",
            weighting: self.weighting,
            options: &self.options,
            delays: &self.delays,
        }
    }

    pub(crate) fn json(&self) -> Value {
        pattern::document_of("0123abcd", &self.project, &self.options)
    }
}

/// One array of a project, expanded without any choice of the design stage.
pub(crate) struct Expanded {
    pub(crate) plan: ArrayPlan,
    pub(crate) lengths: Vec<LineLength>,
    pub(crate) cables: Cables,
    noise: NoiseSite,
}

impl Expanded {
    pub(crate) fn new(project: &Project, catalogue: &Catalogue) -> Self {
        let spec = &project.arrays[0];
        let context = Context {
            design: project.frequency,
            receiver: project.site.receiver,
            max_bay: Length::from_mm(40_000),
            wire_diameter: Diameter::from_um(1_600),
            branch_cost: LineCost { leg: 1.0, onward: 1.0 },
            main_cost: LineCost { leg: 1.0, onward: 1.0 },
            amplifier: HubAmplifier::Absent,
            balance: None,
        };
        let plan = arrays::expand(spec, Decimal::ONE, &context, &mut Names::default());
        let cables = choose_cables(spec, catalogue, project.frequency, &mut Problems::default());
        let allowances = Allowances { practice: &project.practice, route_factor: Decimal::ONE };
        let lengths = measure(&plan.layout, &plan.feed, &allowances, |role| cables.of(role).velocity);
        let noise = NoiseSite {
            class: project.site.noise,
            receiver: Decibel::new(12.0),
            hub_amplifier: None,
            element_amplifier: None,
            passive_gain: None,
        };
        Self { plan, lengths, cables, noise }
    }

    pub(crate) fn report(&self, project: &Project, ends: Ends, weighting: Weighting) -> ArrayReport {
        let subject = Subject {
            plan: &self.plan,
            lengths: &self.lengths,
            cables: &self.cables,
            soil: reception::soil(project.site.ground),
            ends,
            weighting,
            noise: &self.noise,
        };
        reception::report(&subject, &project.frequencies())
    }
}

/// The only direction and frequency of an array's first option.
pub(crate) fn figures<'a>(json: &'a Value, array: &str) -> &'a Value {
    let arrays = json["options"]
        .as_array()
        .expect("options")
        .iter()
        .flat_map(|option| option["arrays"].as_array().expect("arrays"));
    let found = arrays.into_iter().find(|found| found["array"] == array).expect("the array");
    &found["directions"][0]["frequencies"][0]
}
