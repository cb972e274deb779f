//! Reads project, stock and catalogue from disk and runs the stages.

use std::fmt::Write as _;
use std::fs;
use std::path::{Path, PathBuf};

use sha2::{Digest, Sha256};

use super::failure::{Failure, Outcome};
use super::{CatalogueArgs, ProjectArgs};
use crate::catalogue::{self, Catalogue, CatalogueFile, Source};
use crate::design;
use crate::pricing;
use crate::problem::Problems;
use crate::project::{self, Assumption, Project};
use crate::reception::{ArrayReport, Weighting};
use crate::report::{self, OptionResult};
use crate::takeoff;

/// Everything worked out for a project.
pub(super) struct Work {
    /// The project.
    pub(super) project: Project,
    /// The catalogue it was priced with.
    pub(super) catalogue: Catalogue,
    /// One result an option.
    pub(super) results: Vec<OptionResult>,
    /// Warnings.
    pub(super) problems: Problems,
    /// Short hash of project, stock, catalogue and program.
    pub(super) hash: String,
}

impl Work {
    /// Whether a price is missing.
    pub(super) fn outcome(&self) -> Outcome {
        if self.results.iter().all(|result| result.bill.unpriced.is_empty()) {
            Outcome::Done
        } else {
            Outcome::Unpriced
        }
    }

    /// The pattern reports of each option's arrays, with the weights that the parts produce.
    pub(super) fn heard(&self) -> Vec<Vec<ArrayReport>> {
        let designs: Vec<&design::Design> = self.results.iter().map(|result| &result.design).collect();
        let options = report::pattern::reports(&self.project, &designs, Weighting::Built);
        options.into_iter().map(|(_, arrays)| arrays).collect()
    }

    /// What must be said beside any price.
    pub(super) fn notes(&self) -> Vec<String> {
        let built_in = |line: &pricing::BillLine| {
            let offer = line.offer.as_ref().and_then(|id| self.catalogue.offers.get(id));
            offer.is_some_and(|offer| offer.source == Source::BuiltIn)
        };
        let lines = self.results.iter().flat_map(|result| &result.bill.lines);
        if lines.filter(|line| built_in(line)).count() > 0 {
            vec!["prices of the built-in catalogue are invented round examples: put your own in a parts-catalog folder beside the project".to_owned()]
        } else {
            Vec::new()
        }
    }

    /// Adds the results of another project.
    pub(super) fn join(&mut self, other: Self) {
        self.results.extend(other.results);
        self.problems.extend(other.problems);
        self.hash = short_hash(&[self.hash.as_bytes(), other.hash.as_bytes()]);
    }
}

/// What `check` knows, whether or not the project can be built.
pub(super) struct Checked {
    /// The project, when it could be read.
    pub(super) project: Option<Project>,
    /// Everything noticed.
    pub(super) problems: Problems,
    /// Sentences for the answer.
    pub(super) remarks: Vec<String>,
    /// Short hash of the inputs.
    pub(super) hash: String,
}

/// What a project is read for.
#[derive(Clone, Copy, PartialEq, Eq)]
enum Purpose {
    /// To be judged: what could be better is worked out as well.
    Check,
    /// To be built.
    Build,
    /// To be heard only: combiners that nobody builds are no obstacle.
    Hear,
}

/// Reads and works out a project that is to be built; errors anywhere end it.
pub(super) fn work(arguments: &ProjectArgs) -> Result<Work, Failure> {
    let (checked, work) = read_and_work(arguments, Purpose::Build)?;
    work.ok_or(Failure::Problems(checked.problems))
}

/// Reads and works out a project of which only the pattern is asked.
pub(super) fn work_to_hear(arguments: &ProjectArgs) -> Result<Work, Failure> {
    let (checked, work) = read_and_work(arguments, Purpose::Hear)?;
    work.ok_or(Failure::Problems(checked.problems))
}

/// Reads a project and everything that can be checked of it.
pub(super) fn check(arguments: &ProjectArgs) -> Result<Checked, Failure> {
    let (mut checked, work) = read_and_work(arguments, Purpose::Check)?;
    if let Some(work) = work {
        checked.problems = work.problems;
        checked.project = Some(work.project);
    }
    Ok(checked)
}

fn read_and_work(arguments: &ProjectArgs, purpose: Purpose) -> Result<(Checked, Option<Work>), Failure> {
    let files = ProjectFiles::read(&arguments.file)?;
    let stock = files.stock.as_ref().map(|(name, text)| (name.as_str(), text.as_str()));
    let (project, mut problems) = project::read(&files.name, &files.text, stock);
    let supply = Supply::read(&arguments.catalogue, &files.folder)?;
    problems.extend(supply.problems.in_folder(&supply.folder, &catalogue::FILES));
    let hash = files.hash(&supply.inputs);
    let mut checked =
        Checked { project: project.clone(), problems: problems.clone(), remarks: Vec::new(), hash };
    let Some(project) = project else { return Ok((checked, None)) };
    if checked.problems.has_errors() {
        return Ok((checked, None));
    }
    let mut project = match arguments.option.as_deref() {
        None => project,
        Some(option) => only(&project, option)?,
    };
    checked.project = Some(project.clone());
    let catalogue = supply.catalogue;
    project.assumptions.push(entry_bond());
    let settled = design::settle(&project, &catalogue);
    problems.extend(settled.problems);
    if purpose != Purpose::Hear {
        problems.extend(design::check_hybrids(&settled.designs));
    }
    if purpose == Purpose::Check {
        checked.remarks = remarks(&project, &settled.designs);
    }
    let mut results = Vec::new();
    for design in settled.designs {
        let takeoff = takeoff::take_off(&project, &catalogue, &design);
        let (bill, noticed) = pricing::price(&project, &catalogue, &takeoff);
        problems.extend(noticed);
        results.push(OptionResult { design, takeoff, bill });
    }
    problems.extend(ages(&project, &catalogue, &results));
    let problems = problems.deduplicated().in_folder(&supply.folder, &catalogue::FILES);
    checked.problems = problems.clone();
    if problems.has_errors() {
        return Ok((checked, None));
    }
    let hash = checked.hash.clone();
    Ok((checked, Some(Work { project, catalogue, results, problems, hash })))
}

/// The bonding wire at the station entry has no key: somebody has to measure it.
fn entry_bond() -> Assumption {
    Assumption {
        key: "(no key) bonding wire at the station entry".to_owned(),
        value: takeoff::station::ENTRY_BOND.to_string(),
        why: "from the entry to the building's electrodes, until it is measured on site".to_owned(),
    }
}

/// How old the prices are that the bills use.
fn ages(project: &Project, catalogue: &Catalogue, results: &[OptionResult]) -> Problems {
    let lines = results.iter().flat_map(|result| &result.bill.lines);
    let used: Vec<&String> = lines.filter_map(|line| line.offer.as_ref()).collect();
    let mut bought = catalogue.clone();
    bought.offers.retain(|id, _| used.contains(&id));
    let oldest = u64::try_from(project.prices.oldest_price_days).unwrap_or_default();
    catalogue::age(&bought, project.estimated, oldest)
}

/// What the search for the best delay and the noise budget found, an array a line or two.
fn remarks(project: &Project, designs: &[design::Design]) -> Vec<String> {
    let mut lines = Vec::new();
    for array in designs.iter().flat_map(|design| &design.arrays) {
        lines.extend(design::best_in_words(project, array));
        lines.push(format!("{}: {}", array.plan.name, array.amplifier_reason));
    }
    lines.dedup();
    lines
}

/// The project with one option only.
fn only(project: &Project, wanted: &str) -> Result<Project, Failure> {
    let options = project.options();
    if options.iter().any(|option| option == wanted) {
        return Ok(project.only(wanted));
    }
    let known: Vec<&str> = options.iter().map(String::as_str).filter(|option| !option.is_empty()).collect();
    let known = if known.is_empty() { "none".to_owned() } else { known.join(", ") };
    Err(Failure::Usage(format!("this project has no option `{wanted}`; it has: {known}")))
}

/// The project file and the stock beside it.
struct ProjectFiles {
    folder: PathBuf,
    name: String,
    text: String,
    stock: Option<(String, String)>,
}

impl ProjectFiles {
    fn read(file: &Path) -> Result<Self, Failure> {
        let path = if file.is_dir() { file.join("project.toml") } else { file.to_owned() };
        let text = read_text(&path)?;
        let folder = path.parent().map(Path::to_path_buf).unwrap_or_default();
        let stock_path = folder.join("on-hand.csv");
        let stock = if stock_path.is_file() {
            Some((stock_path.display().to_string(), read_text(&stock_path)?))
        } else {
            None
        };
        Ok(Self { folder, name: path.display().to_string(), text, stock })
    }

    /// Of contents only: the same files give the same hash wherever they lie.
    fn hash(&self, catalogue: &[Vec<u8>]) -> String {
        let stock = self.stock.as_ref().map_or("", |(_, text)| text);
        let mut inputs: Vec<&[u8]> =
            vec![env!("CARGO_PKG_VERSION").as_bytes(), self.text.as_bytes(), stock.as_bytes()];
        inputs.extend(catalogue.iter().map(Vec::as_slice));
        short_hash(&inputs)
    }
}

fn read_text(path: &Path) -> Result<String, Failure> {
    let bytes = fs::read(path).map_err(|error| Failure::file(path, "read", &error))?;
    match String::from_utf8(bytes) {
        Ok(text) => Ok(text.strip_prefix('\u{feff}').map_or_else(|| text.clone(), str::to_owned)),
        Err(error) => {
            let at = error.utf8_error().valid_up_to();
            Err(Failure::File(format!(
                "cannot read {}: byte {at} is not UTF-8; save it as UTF-8",
                path.display()
            )))
        }
    }
}

/// The first eight hexadecimal digits of a SHA-256 over the inputs and their lengths.
fn short_hash(inputs: &[&[u8]]) -> String {
    let mut hasher = Sha256::new();
    for input in inputs {
        hasher.update((input.len() as u64).to_be_bytes());
        hasher.update(input);
    }
    hasher.finalize().iter().take(4).fold(String::new(), |mut hex, byte| {
        let _ = write!(hex, "{byte:02x}");
        hex
    })
}

/// A catalogue as the command line asks for it.
pub(super) struct Supply {
    /// The catalogue.
    pub(super) catalogue: Catalogue,
    /// What is wrong with the user's own files.
    pub(super) problems: Problems,
    /// Silent repairs, in words.
    pub(super) repairs: String,
    /// The user's files read, by name.
    pub(super) read: Vec<String>,
    /// The folder they lie in; empty for the built-in catalogue.
    pub(super) folder: String,
    inputs: Vec<Vec<u8>>,
}

impl Supply {
    /// The built-in catalogue, laid over by `--catalog` or by a `parts-catalog` folder beside the project, or replaced
    /// by `--catalog-only`.
    pub(super) fn read(arguments: &CatalogueArgs, beside: &Path) -> Result<Self, Failure> {
        let own = beside.join("parts-catalog");
        let folder = match (&arguments.catalog_only, &arguments.catalog) {
            (Some(folder), _) | (None, Some(folder)) => Some(folder.clone()),
            (None, None) => own.is_dir().then_some(own),
        };
        let Some(folder) = folder else {
            let catalogue = catalogue::built_in();
            return Ok(Self {
                catalogue,
                problems: Problems::default(),
                repairs: String::new(),
                read: Vec::new(),
                folder: String::new(),
                inputs: Vec::new(),
            });
        };
        let files = catalogue_files(&folder)?;
        let read = files.iter().map(|file| file.name.clone()).collect();
        let base =
            if arguments.catalog_only.is_some() { Catalogue::default() } else { catalogue::built_in() };
        let loaded = catalogue::load(base, &files, Source::User);
        let inputs = files.into_iter().map(|file| file.bytes).collect();
        Ok(Self {
            catalogue: loaded.catalogue,
            problems: loaded.problems,
            repairs: loaded.fixes.to_string(),
            read,
            folder: folder.display().to_string(),
            inputs,
        })
    }
}

fn catalogue_files(folder: &Path) -> Result<Vec<CatalogueFile>, Failure> {
    let mut files = Vec::new();
    for name in catalogue::FILES {
        let path = folder.join(name);
        match fs::read(&path) {
            Ok(bytes) => files.push(CatalogueFile { name: name.to_owned(), bytes }),
            Err(error) if error.kind() == std::io::ErrorKind::NotFound => {}
            Err(error) => return Err(Failure::file(&path, "read", &error)),
        }
    }
    if files.is_empty() {
        let wanted = catalogue::FILES.join(", ");
        return Err(Failure::File(format!("{} holds none of {wanted}", folder.display())));
    }
    Ok(files)
}

/// The name of a project for people: its file name without ending, or its folder's name.
pub(super) fn stem(file: &Path) -> String {
    let named =
        if file.file_name().is_some_and(|name| name == "project.toml") { file.parent() } else { Some(file) };
    let stem = named.and_then(Path::file_stem).map(|stem| stem.to_string_lossy().into_owned());
    stem.unwrap_or_else(|| "project".to_owned())
}
