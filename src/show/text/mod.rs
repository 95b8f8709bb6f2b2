//! The report of a run for the terminal: title, cautions, timeline, summary.
//! Words carry the meaning; emphasis is only that.

mod details;
mod lines;
mod summary;
mod timeline;
pub mod values;

use crate::plan::Plan;
use crate::reading::{Moment, Summary, spoken};
use crate::record::Record;

/// What stands over every report.
pub const CAUTIONS: &str = "For planning and teaching only, never for decisions at a live incident. \
    Local procedures, standards for live-fire training and licensed practice come first.";

/// Narrowest page, characters; a narrower terminal breaks the lines itself.
const NARROWEST: usize = 40;

/// How the report is written.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct Style {
    /// Whether escape codes may be written.
    pub colour: bool,
    /// Width of the page in characters.
    pub width: usize,
    /// Whether ledger, counters, flags and sub-models are listed.
    pub details: bool,
}

/// The report of a run.
pub fn report(
    record: &Record,
    plan: &Plan,
    moments: &[Moment],
    summary: &Summary,
    style: &Style,
) -> String {
    let pen = lines::Pen {
        colour: style.colour,
    };
    let mut page = lines::Page::new(pen, style.width.max(NARROWEST));
    for line in lines::wrap(&lines::clean(&plan.title), page.width) {
        let line = pen.strong(&line);
        page.line(&line);
    }
    if let Some(tactic) = &plan.tactic {
        page.paragraph(&format!("Tactic: {}", spoken(tactic)));
    }
    page.gap();
    page.paragraph(CAUTIONS);
    timeline::write(&mut page, moments, style.details);
    self::summary::write(&mut page, summary);
    if style.details {
        details::write(&mut page, record, plan);
    } else if summary.flags > 0 {
        page.gap();
        page.paragraph(&format!(
            "The run raised {} about where to doubt the model: --details lists {}.",
            if summary.flags == 1 {
                "one flag".to_owned()
            } else {
                format!("{} flags", summary.flags)
            },
            if summary.flags == 1 { "it" } else { "them" },
        ));
    }
    page.finish()
}
