//! Projects rendered in memory: the demo projects, and one with hostile names.

use std::collections::BTreeMap;
use std::fs;
use std::path::{Path, PathBuf};

use arraywright::catalogue::{self, Catalogue};
use arraywright::design::{self, Design};
use arraywright::pricing::{self, Bill};
use arraywright::project::{self, Project};
use arraywright::report::document::{self, Input, OptionInput, TemplateError};
use arraywright::takeoff::{self, Takeoff};

/// A name that would break out of every format if it were not escaped.
pub(crate) const HOSTILE: &str =
    "</style><script>alert(1)</script> \"q\" 'a' | `b` \\ <b>#1</b> *x* _y_ [z](u)";

/// Everything worked out for one project file.
pub(crate) struct Sample {
    pub(crate) project: Project,
    pub(crate) catalogue: Catalogue,
    results: Vec<(Design, Takeoff, Bill)>,
}

impl Sample {
    /// Works out a project text with the built-in catalogue.
    pub(crate) fn new(name: &str, text: &str, stock: Option<(&str, &str)>) -> Self {
        Self::of(name, read(name, text, stock), catalogue::built_in())
    }

    /// Works out a project with a catalogue.
    fn of(name: &str, project: Project, catalogue: Catalogue) -> Self {
        let settled = design::settle(&project, &catalogue);
        assert!(!settled.problems.has_errors(), "{name}: {:#?}", settled.problems);
        let work = |design: Design| {
            let takeoff = takeoff::take_off(&project, &catalogue, &design);
            let (bill, _) = pricing::price(&project, &catalogue, &takeoff);
            (design, takeoff, bill)
        };
        let results = settled.designs.into_iter().map(work).collect();
        Self { project, catalogue, results }
    }

    /// A demo project by its folder's name.
    pub(crate) fn demo(folder: &str) -> Self {
        let path = demo_folder().join(folder);
        let text = fs::read_to_string(path.join("project.toml")).expect("a demo project");
        let stock = fs::read_to_string(path.join("on-hand.csv")).ok();
        Self::new(folder, &text, stock.as_deref().map(|stock| ("on-hand.csv", stock)))
    }

    /// Renders every sheet.
    pub(crate) fn render(&self) -> BTreeMap<String, String> {
        self.render_with(&BTreeMap::new()).expect("our own templates work")
    }

    /// Renders every sheet with some templates replaced.
    pub(crate) fn render_with(
        &self,
        overrides: &BTreeMap<String, String>,
    ) -> Result<BTreeMap<String, String>, TemplateError> {
        let options: Vec<OptionInput<'_>> = self
            .results
            .iter()
            .map(|(design, takeoff, bill)| OptionInput { design, takeoff, bill })
            .collect();
        let input = Input {
            project: &self.project,
            catalogue: &self.catalogue,
            options: &options,
            hash: "7f3a91c2",
            version: "0.0.0",
        };
        Ok(document::render(&input, overrides)?.into_iter().collect())
    }
}

fn read(name: &str, text: &str, stock: Option<(&str, &str)>) -> Project {
    let (project, problems) = project::read(name, text, stock);
    project.unwrap_or_else(|| panic!("{name}: {problems:#?}"))
}

/// The files of one format.
pub(crate) fn format<'a>(
    files: &'a BTreeMap<String, String>,
    extension: &'a str,
) -> impl Iterator<Item = (&'a String, &'a String)> {
    files.iter().filter(move |(name, _)| Path::new(name).extension().is_some_and(|own| own == extension))
}

/// Every demo project's folder name.
pub(crate) fn demos() -> Vec<String> {
    let entries = fs::read_dir(demo_folder()).expect("the demo projects");
    let mut names: Vec<String> = entries
        .map(|entry| entry.expect("an entry").path())
        .filter(|path| path.join("project.toml").is_file())
        .map(|path| path.file_name().expect("a name").to_string_lossy().into_owned())
        .collect();
    names.sort();
    assert!(!names.is_empty());
    names
}

fn demo_folder() -> PathBuf {
    Path::new(env!("CARGO_MANIFEST_DIR")).join("demo-projects")
}

/// Two arrays close together with a far receiver, keep-outs, crossings, a declination, buried cable, an amplifier whose
/// price is missing, and names that attack every format.
///
/// The reader refuses most of such names; the sheets must not depend on that.
pub(crate) fn hostile() -> Sample {
    let mut project = read("hostile.toml", HOSTILE_PROJECT, None);
    project.title =
        format!("{HOSTILE} and a title so long that it has to be cut in the running head of the page");
    HOSTILE.clone_into(&mut project.arrays[0].name);
    HOSTILE.clone_into(&mut project.keep_out[0].name);
    let mut catalogue = catalogue::built_in();
    for part in catalogue.parts.values_mut() {
        part.description = format!("{} {HOSTILE}", part.description);
    }
    for offer in catalogue.offers.values_mut().step_by(7) {
        offer.price = None;
    }
    Sample::of("hostile", project, catalogue)
}

const HOSTILE_PROJECT: &str = r#"
[project]
title     = "replaced"
currency  = "EUR"
estimated = 2026-06-01
frequency = "1.83 MHz"
[site]
latitude    = 56.41
longitude   = 22.37
declination = "7.2 deg"
terrain     = "light-wood"
receiver    = { east = "640 m", north = "-210 m" }
[[array]]
name      = "replaced"
heading   = "312 deg"
element.wire = { length = "168 m", height = "2.5 m" }
echelon   = { stagger = "60 ft", offset = "15 ft" }
[[array]]
name      = "verticals"
heading   = "40 deg"
centre    = { east = "60 m", north = "-40 m" }
element.vertical = { height = "6 m", active = true }
endfire   = { count = 2, spacing = "18.3 m" }
feed      = { delay-style = "merged" }
[[keep-out]]
name      = "replaced"
polygon   = [{ east = "-40 m", north = "150 m" }, { east = "90 m", north = "150 m" }, { east = "90 m", north = "110 m" }]
[[crossing]]
kind  = "gate"
width = "4 m"
at    = { east = "40 m", north = "20 m" }
[practice]
burial-depth = "0.2 m"
"#;
