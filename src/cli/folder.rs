//! Where results go.

use super::failure::Failure;
use super::pipeline::SCENARIO_FILE;
use crate::show::files::{FilesError, check_folder, file_word};
use std::path::{Path, PathBuf};

/// What is done with the result files.
#[derive(Debug, PartialEq, Eq)]
pub enum Destination {
    /// They are written here.
    Folder(PathBuf),
    /// The folder nobody asked for by name is taken: they are not written.
    Taken(PathBuf),
}

/// Decides before the run where results go.
///
/// # Errors
/// A folder asked for by name that is there without `replace`, one that cannot
/// be used, or one whose results would overwrite the scenario itself.
pub fn destination(
    file: &Path,
    tactic: Option<&str>,
    out: Option<&Path>,
    replace: bool,
) -> Result<Destination, Failure> {
    let folder = out.map_or_else(|| default_folder(file, tactic), Path::to_owned);
    if is_same_file(file, &folder.join(SCENARIO_FILE)) {
        return Err(Failure::Arguments(format!(
            "the results in {} would overwrite the scenario {}; choose another folder with --out",
            folder.display(),
            file.display()
        )));
    }
    match check_folder(&folder, replace) {
        Ok(()) => Ok(Destination::Folder(folder)),
        Err(FilesError::Exists(folder)) if out.is_none() => Ok(Destination::Taken(folder)),
        Err(error) => Err(error.into()),
    }
}

/// Named after the scenario and the tactic, beside the scenario.
fn default_folder(file: &Path, tactic: Option<&str>) -> PathBuf {
    let mut name = file.file_stem().unwrap_or_default().to_os_string();
    if let Some(tactic) = tactic {
        name.push("-");
        name.push(file_word(tactic));
    }
    if file.file_name() == Some(&name) {
        name.push("-results");
    }
    file.with_file_name(name)
}

fn is_same_file(one: &Path, other: &Path) -> bool {
    match (one.canonicalize(), other.canonicalize()) {
        (Ok(one), Ok(other)) => one == other,
        _ => false,
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn cli_default_folder_is_beside_the_scenario() {
        let named = |file: &str, tactic| default_folder(Path::new(file), tactic);
        assert_eq!(
            named("scenarios/larch-row-3.toml", None),
            Path::new("scenarios/larch-row-3")
        );
        assert_eq!(
            named("scenarios/larch-row-3.toml", Some("hold/it")),
            Path::new("scenarios/larch-row-3-hold_it")
        );
        assert_eq!(named("house", None), Path::new("house-results"));
    }
}
