//! What is wrong with a scenario, as data, and how it is shown.

use std::fmt;
use std::ops::Range;

use miette::{GraphicalReportHandler, GraphicalTheme, LabeledSpan, MietteDiagnostic, NamedSource};

/// How much a fault matters.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Severity {
    /// The scenario cannot be run.
    Error,
    /// It can be run, but something looks odd.
    Warning,
}

/// One thing that is wrong, and what would be right.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Fault {
    /// Kind of fault in a word or two, one of [`code`].
    pub code: &'static str,
    /// How much it matters.
    pub severity: Severity,
    /// What is wrong.
    pub message: String,
    /// Where, in bytes of the file; `None` when it is not in the file.
    pub span: Option<Range<usize>>,
    /// Short words beside the caret.
    pub label: String,
    /// What would be right.
    pub help: Option<String>,
}

/// Kinds of faults.
pub mod code {
    /// Not TOML.
    pub const SYNTAX: &str = "syntax";
    /// A key or table that no scenario has.
    pub const UNKNOWN_KEY: &str = "unknown key";
    /// A key that must be there.
    pub const MISSING_KEY: &str = "missing key";
    /// Text where a list is wanted, and the like.
    pub const WRONG_KIND: &str = "wrong kind of value";
    /// A unit that is missing, unknown or of something else.
    pub const UNIT: &str = "unit";
    /// A value outside its range.
    pub const OUT_OF_RANGE: &str = "out of range";
    /// A name that nothing has.
    pub const UNKNOWN_NAME: &str = "unknown name";
    /// Two things with one name.
    pub const SAME_NAME: &str = "two things with one name";
    /// A thing that does not fit into its room, or a mixture that cannot be.
    pub const DOES_NOT_FIT: &str = "does not fit";
    /// An action that cannot be carried out.
    pub const ACTION: &str = "action";
    /// Keys that exclude each other.
    pub const CONTRADICTION: &str = "contradiction";
    /// More than the program takes.
    pub const TOO_MUCH: &str = "too much";
    /// Something that can be run but looks odd.
    pub const CAUTION: &str = "caution";
}

impl Fault {
    /// An error at a place in the file.
    pub fn error(code: &'static str, span: Range<usize>, message: impl Into<String>) -> Self {
        Self {
            code,
            severity: Severity::Error,
            message: message.into(),
            span: Some(span),
            label: "here".to_owned(),
            help: None,
        }
    }

    /// A warning at a place in the file.
    pub fn caution(span: Range<usize>, message: impl Into<String>) -> Self {
        Self {
            severity: Severity::Warning,
            ..Self::error(code::CAUTION, span, message)
        }
    }

    /// An error that no place in the file shows.
    pub fn elsewhere(code: &'static str, message: impl Into<String>) -> Self {
        Self {
            span: None,
            ..Self::error(code, 0..0, message)
        }
    }

    /// Words beside the caret.
    #[must_use]
    pub fn label(mut self, label: impl Into<String>) -> Self {
        self.label = label.into();
        self
    }

    /// What would be right.
    #[must_use]
    pub fn help(mut self, help: impl Into<String>) -> Self {
        self.help = Some(help.into());
        self
    }
}

/// All faults of one file.
#[derive(Debug, Clone)]
pub struct Report {
    /// Faults, in the order of the file.
    pub faults: Vec<Fault>,
    file_name: String,
    text: String,
}

impl Report {
    /// Faults of a file, sorted by place, each one once.
    pub fn new(file_name: &str, text: &str, mut faults: Vec<Fault>) -> Self {
        faults.sort_by_key(|fault| fault.span.as_ref().map_or(0, |span| span.start));
        let mut kept: Vec<Fault> = Vec::with_capacity(faults.len());
        for fault in faults {
            if !kept.contains(&fault) {
                kept.push(fault);
            }
        }
        Self {
            faults: kept,
            file_name: file_name.to_owned(),
            text: text.to_owned(),
        }
    }

    /// Name of the file.
    pub fn file_name(&self) -> &str {
        &self.file_name
    }

    /// Text of the file, empty when it could not be read as text.
    pub fn text(&self) -> &str {
        &self.text
    }

    /// Faults that keep the scenario from running.
    pub fn errors(&self) -> impl Iterator<Item = &Fault> {
        self.faults
            .iter()
            .filter(|fault| fault.severity == Severity::Error)
    }

    /// Every fault with file, line, caret and what would be right, wrapped to
    /// a width in characters; empty when there is none.
    pub fn render(&self, colour: bool, width: usize) -> String {
        let mut out = String::new();
        for fault in &self.faults {
            self.render_one(&mut out, fault, colour, width.max(40));
        }
        if !self.faults.is_empty() {
            out.push_str(&self.count());
            out.push('\n');
        }
        out
    }

    fn render_one(&self, out: &mut String, fault: &Fault, colour: bool, width: usize) {
        let theme = if colour {
            GraphicalTheme::unicode()
        } else {
            GraphicalTheme::unicode_nocolor()
        };
        let handler = GraphicalReportHandler::new_themed(theme)
            .with_width(width)
            .with_links(false);
        let mut diagnostic = MietteDiagnostic::new(&fault.message)
            .with_code(fault.code)
            .with_severity(match fault.severity {
                Severity::Error => miette::Severity::Error,
                Severity::Warning => miette::Severity::Warning,
            });
        if let Some(help) = &fault.help {
            diagnostic = diagnostic.with_help(help);
        }
        if let Some(span) = &fault.span {
            let (start, length) = self.within(span);
            diagnostic =
                diagnostic.with_label(LabeledSpan::new(Some(fault.label.clone()), start, length));
        }
        let located = miette::Report::new(diagnostic)
            .with_source_code(NamedSource::new(&self.file_name, self.text.clone()));
        let mut text = String::new();
        if handler.render_report(&mut text, located.as_ref()).is_err() {
            text = format!("{}: {}: {}\n", self.file_name, fault.code, fault.message);
        }
        for line in text.lines() {
            out.push_str(line.trim_end());
            out.push('\n');
        }
        out.push('\n');
    }

    /// Start and length of a span, kept inside the text.
    fn within(&self, span: &Range<usize>) -> (usize, usize) {
        let floor = |mut at: usize| {
            at = at.min(self.text.len());
            while !self.text.is_char_boundary(at) {
                at -= 1;
            }
            at
        };
        let start = floor(span.start);
        (start, floor(span.end).saturating_sub(start))
    }

    fn count(&self) -> String {
        let errors = self.errors().count();
        let cautions = self.faults.len() - errors;
        let plural =
            |count: usize, one: &str| format!("{count} {one}{}", if count == 1 { "" } else { "s" });
        match (errors, cautions) {
            (0, cautions) => plural(cautions, "caution"),
            (errors, 0) => plural(errors, "fault"),
            (errors, cautions) => {
                format!(
                    "{}, {}",
                    plural(errors, "fault"),
                    plural(cautions, "caution")
                )
            }
        }
    }
}

impl fmt::Display for Report {
    fn fmt(&self, formatter: &mut fmt::Formatter<'_>) -> fmt::Result {
        formatter.write_str(&self.render(false, 80))
    }
}

impl std::error::Error for Report {}
