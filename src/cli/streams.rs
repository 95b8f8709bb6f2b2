//! Standard output carries results, standard error everything else.

use super::failure::Failure;
use anstream::ColorChoice;
use std::io::{self, IsTerminal, Write};

/// Width for a stream that is not a terminal.
const PLAIN_WIDTH: usize = 80;

/// Narrowest and widest text that is still easy to read.
const NARROWEST: usize = 50;
const WIDEST: usize = 120;

/// Writes results. A reader that has gone away (`| head`) is fine.
///
/// # Errors
/// When standard output refuses for any other reason.
pub fn write(text: &str) -> Result<(), Failure> {
    let mut out = anstream::stdout().lock();
    match out.write_all(text.as_bytes()).and_then(|()| out.flush()) {
        Err(error) if error.kind() != io::ErrorKind::BrokenPipe => Err(Failure::Output(error)),
        _ => Ok(()),
    }
}

/// Says something on the side; nobody has to be listening.
pub fn say(text: &str) {
    let mut out = anstream::stderr().lock();
    let _ = writeln!(out, "{}", text.trim_end());
}

/// True when results may be coloured.
pub fn is_output_coloured() -> bool {
    anstream::AutoStream::choice(&io::stdout()) != ColorChoice::Never
}

/// True when what is said on the side may be coloured.
pub fn is_side_coloured() -> bool {
    anstream::AutoStream::choice(&io::stderr()) != ColorChoice::Never
}

/// True when somebody watches standard error.
pub fn is_side_watched() -> bool {
    io::stderr().is_terminal()
}

/// Characters in a line of results.
pub fn output_width() -> usize {
    width(terminal_size::terminal_size_of(io::stdout()))
}

/// Characters in a line on the side.
pub fn side_width() -> usize {
    width(terminal_size::terminal_size_of(io::stderr()))
}

/// `COLUMNS` goes before what the terminal says, as with other programs.
fn width(size: Option<(terminal_size::Width, terminal_size::Height)>) -> usize {
    let stated = std::env::var("COLUMNS").ok();
    stated
        .and_then(|columns| columns.trim().parse().ok())
        .or_else(|| size.map(|(width, _)| usize::from(width.0)))
        .filter(|width| *width > 0)
        .unwrap_or(PLAIN_WIDTH)
        .clamp(NARROWEST, WIDEST)
}
