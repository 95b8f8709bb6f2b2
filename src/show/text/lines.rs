//! Lines of a terminal: wrapping, columns, emphasis.

use anstyle::{Effects, Style as Ansi};

/// Keeps the parts of a value on one line until it is wrapped.
pub(super) fn glued(text: &str) -> String {
    text.replace(' ', "\u{a0}")
}

/// Wraps text to a width in characters; a longer word stands alone. At least
/// one line.
pub(super) fn wrap(text: &str, width: usize) -> Vec<String> {
    let mut lines = Vec::new();
    let mut line = String::new();
    for word in text.split_ascii_whitespace() {
        let word = word.replace('\u{a0}', " ");
        let needed = line.chars().count() + 1 + word.chars().count();
        if !line.is_empty() && needed > width {
            lines.push(std::mem::take(&mut line));
        }
        if !line.is_empty() {
            line.push(' ');
        }
        line.push_str(&word);
    }
    if !line.is_empty() || lines.is_empty() {
        lines.push(line);
    }
    lines
}

/// Text without control characters, which a terminal might obey.
pub(super) fn clean(text: &str) -> String {
    text.chars()
        .map(|c| if c.is_control() { ' ' } else { c })
        .collect()
}

/// Emphasis that leaves plain text alone.
#[derive(Debug, Clone, Copy)]
pub(super) struct Pen {
    /// Whether escape codes may be written.
    pub colour: bool,
}

impl Pen {
    /// Strong text.
    pub fn strong(self, text: &str) -> String {
        self.with(text, Effects::BOLD)
    }

    /// Faint text.
    pub fn faint(self, text: &str) -> String {
        self.with(text, Effects::DIMMED)
    }

    fn with(self, text: &str, effects: Effects) -> String {
        if self.colour && !text.is_empty() {
            let style = Ansi::new().effects(effects);
            format!("{}{text}{}", style.render(), style.render_reset())
        } else {
            text.to_owned()
        }
    }
}

/// Text under construction.
pub(super) struct Page {
    /// Emphasis.
    pub pen: Pen,
    /// Width in characters.
    pub width: usize,
    text: String,
}

impl Page {
    /// An empty page.
    pub fn new(pen: Pen, width: usize) -> Self {
        Self {
            pen,
            width,
            text: String::new(),
        }
    }

    /// One line as it is, without spaces at its end.
    pub fn line(&mut self, line: &str) {
        self.text.push_str(line.trim_end());
        self.text.push('\n');
    }

    /// A blank line.
    pub fn gap(&mut self) {
        self.text.push('\n');
    }

    /// A heading.
    pub fn heading(&mut self, text: &str) {
        self.gap();
        let heading = self.pen.strong(text);
        self.line(&heading);
    }

    /// A paragraph.
    pub fn paragraph(&mut self, text: &str) {
        for line in wrap(&clean(text), self.width) {
            self.line(&line);
        }
    }

    /// A label and what belongs to it, wrapped beside the label, or below it
    /// where the page is narrow.
    pub fn entry(&mut self, label: &str, text: &str) {
        const LABEL: usize = 22;
        let narrow = self.width < 70;
        let indent = if narrow { 4 } else { LABEL + 2 };
        let lines = wrap(&clean(text), self.width.saturating_sub(indent).max(16));
        let label = clean(label);
        if !label.is_empty() && (narrow || label.chars().count() > LABEL) {
            self.line(&label);
        }
        for (number, line) in lines.iter().enumerate() {
            let beside = number == 0 && !narrow && label.chars().count() <= LABEL;
            let head = if beside { label.as_str() } else { "" };
            self.line(&format!("{head:<indent$}{line}"));
        }
    }

    /// The text.
    pub fn finish(self) -> String {
        self.text
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn verify_wrapping_keeps_the_width_and_all_words() {
        assert_eq!(wrap("one two three", 7), ["one two", "three"]);
        assert_eq!(wrap("", 7), [""]);
        let kept = format!("at {} now", glued("100 °C (212 °F)"));
        assert_eq!(wrap(&kept, 16), ["at", "100 °C (212 °F)", "now"]);
        assert_eq!(wrap("uninterrupted x", 5), ["uninterrupted", "x"]);
        assert_eq!(clean("a\u{1b}[31mb\n"), "a [31mb ");
    }
}
