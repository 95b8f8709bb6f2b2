//! The report of the invented run, word for word, at three widths.

mod support;

use doorglow::exposure::observe;
use doorglow::reading::{moments, summary};
use doorglow::show::text::{Style, report};

fn written(width: usize, colour: bool, details: bool) -> String {
    let (plan, mut record) = support::starved_and_back();
    observe(&mut record, &plan);
    let moments = moments(&record, &plan);
    let summary = summary(&record, &plan);
    let style = Style {
        colour,
        width,
        details,
    };
    report(&record, &plan, &moments, &summary, &style)
}

#[test]
fn regress_report_at_60() {
    insta::assert_snapshot!(written(60, false, false));
}

#[test]
fn regress_report_at_80() {
    insta::assert_snapshot!(written(80, false, false));
}

#[test]
fn regress_report_at_120_with_details() {
    insta::assert_snapshot!(written(120, false, true));
}

#[test]
fn verify_lines_keep_the_width() {
    for width in [60, 80, 120] {
        for line in written(width, false, true).lines() {
            assert!(line.chars().count() <= width, "{width}: {line}");
        }
    }
}

#[test]
fn verify_emphasis_adds_nothing_but_escape_codes() {
    let plain = written(80, false, true);
    let coloured = written(80, true, true);
    assert!(!plain.contains('\u{1b}') && coloured.contains('\u{1b}'));
    let stripped: String = anstream::adapter::strip_str(&coloured).to_string();
    assert_eq!(stripped, plain);
}

#[test]
fn verify_words_that_would_mislead_are_not_used() {
    let text = written(80, false, true).to_lowercase();
    for word in ["safe", "best", "approved", " vent "] {
        assert!(!text.contains(word), "{word}");
    }
}
