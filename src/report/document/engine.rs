//! The templates, compiled in, and the two ways to render them.

use std::collections::BTreeMap;
use std::error::Error;
use std::fmt;

use tera::{Context, Tera};

use super::escape;

macro_rules! templates {
    ($($name:literal),+ $(,)?) => {
        &[$(($name, include_str!(concat!("../../../templates/", $name)))),+]
    };
}

/// Our templates by file name.
const TEMPLATES: &[(&str, &str)] = templates![
    "base.html",
    "base.md",
    "sheet.css",
    "index.html",
    "index.md",
    "options.html",
    "options.md",
    "purchase.html",
    "purchase.md",
    "cuts.html",
    "cuts.md",
    "build.html",
    "build.md",
    "stakes.html",
    "stakes.md",
    "plan.html",
    "plan.md",
    "safety.html",
    "safety.md",
    "estimate.html",
    "estimate.md",
    "labels.html",
    "labels.md",
    "pattern.html",
    "pattern.md",
];

/// The names of the templates that can be overridden.
pub fn template_names() -> Vec<&'static str> {
    TEMPLATES.iter().map(|(name, _)| *name).collect()
}

/// A template that cannot be used.
#[derive(Clone, Debug, PartialEq, Eq)]
pub enum TemplateError {
    /// An override with a name that none of our templates has.
    Unknown {
        /// The name given.
        name: String,
        /// The nearest of ours, if one is near.
        nearest: Option<&'static str>,
    },
    /// A template that does not compile or does not render.
    Broken {
        /// The document that was wanted, or nothing when the templates do not even compile.
        name: String,
        /// What the template engine says.
        message: String,
    },
}

impl fmt::Display for TemplateError {
    fn fmt(&self, out: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            Self::Unknown { name, nearest } => {
                write!(out, "no document uses a template `{name}`")?;
                match nearest {
                    Some(near) => write!(out, "; did you mean `{near}`?"),
                    None => write!(out, "; ours are {}", template_names().join(", ")),
                }
            }
            Self::Broken { name, message } if name.is_empty() => write!(out, "templates: {message}"),
            Self::Broken { name, message } => write!(out, "{name}: {message}"),
        }
    }
}

impl Error for TemplateError {}

/// The templates, ready to render HTML and Markdown, each escaping what it prints.
pub(super) struct Engine {
    html: Tera,
    markdown: Tera,
}

impl Engine {
    /// Compiles our templates with `overrides` in place of those of the same name.
    pub(super) fn new(overrides: &BTreeMap<String, String>) -> Result<Self, TemplateError> {
        if let Some(name) = overrides.keys().find(|name| !TEMPLATES.iter().any(|(own, _)| own == name)) {
            let nearest = crate::problem::nearest(name, TEMPLATES.iter().map(|(own, _)| *own));
            return Err(TemplateError::Unknown { name: name.clone(), nearest });
        }
        let mut html = Tera::new();
        html.register_filter("css", escape::css);
        let mut markdown = Tera::new();
        markdown.autoescape_on([".md"]);
        markdown.set_escape_fn(escape::markdown);
        for (tera, is_ours) in [(&mut html, is_web as fn(&str) -> bool), (&mut markdown, is_markdown)] {
            let texts = TEMPLATES.iter().filter(|(name, _)| is_ours(name)).map(|(name, ours)| {
                let text = overrides.get(*name).map_or(*ours, String::as_str);
                (name.to_string(), text.to_owned())
            });
            tera.add_raw_templates(texts).map_err(|error| broken("", &error))?;
        }
        Ok(Self { html, markdown })
    }

    /// Renders one document by its file name.
    pub(super) fn render(&self, name: &str, context: &Context) -> Result<String, TemplateError> {
        let tera = if is_markdown(name) { &self.markdown } else { &self.html };
        tera.render(name, context).map_err(|error| broken(name, &error))
    }
}

fn is_markdown(name: &str) -> bool {
    name.rsplit('.').next() == Some("md")
}

fn is_web(name: &str) -> bool {
    !is_markdown(name)
}

/// The whole chain of causes: the engine puts the useful part at the end.
fn broken(name: &str, error: &tera::Error) -> TemplateError {
    let mut message = error.to_string();
    let mut cause = error.source();
    while let Some(inner) = cause {
        message.push_str(": ");
        message.push_str(&inner.to_string());
        cause = inner.source();
    }
    TemplateError::Broken { name: name.to_owned(), message }
}
