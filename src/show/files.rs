//! The one place that writes result files: every file appears whole or not at
//! all, and nothing of anybody else's is overwritten.

use std::fs;
use std::io;
use std::path::{Path, PathBuf};

/// Written into every plot, so that a stale one is known as ours.
pub const PLOT_MARK: &str = "<!-- doorglow plot -->";

/// The file by which a folder is known as one of ours, and how it begins.
const RECORD_FILE: &str = "record.json";
const RECORD_START: &[u8] = b"{\n\"program\": \"doorglow\",";

/// Why a folder was not written.
#[derive(Debug, thiserror::Error)]
pub enum FilesError {
    /// The folder is there and replacing was not asked for.
    #[error("{} exists already; --replace replaces the result files in it", .0.display())]
    Exists(PathBuf),
    /// The name is taken by something that is not a folder.
    #[error("{} is not a folder", .0.display())]
    NotAFolder(PathBuf),
    /// A file of that name is there and was not written by doorglow.
    #[error("{} was not written by doorglow, so it is left alone; choose another folder", .0.display())]
    Foreign(PathBuf),
    /// The system refused.
    #[error("{}: {source}", .path.display())]
    Io {
        /// The file or folder.
        path: PathBuf,
        /// What the system said.
        source: io::Error,
    },
}

/// Writes `files` (name and bytes) into the folder `dir`.
///
/// A new folder is filled beside its place and then renamed into it, so it
/// appears complete or not at all. With `replace`, an existing folder keeps
/// all files that are not ours, every file of ours is exchanged whole, and
/// plots of an earlier run that this one does not have are taken away.
///
/// # Errors
/// [`FilesError`], naming the file or folder.
pub fn write_folder(
    dir: &Path,
    files: &[(String, Vec<u8>)],
    replace: bool,
) -> Result<(), FilesError> {
    check_folder(dir, replace)?;
    if dir.is_dir() {
        refuse_foreign(dir, files)?;
        exchange(dir, files)?;
        remove_stale_plots(dir, files)
    } else {
        create(dir, files)
    }
}

/// Says before a run whether [`write_folder`] may use the folder.
///
/// # Errors
/// [`FilesError::Exists`] or [`FilesError::NotAFolder`].
pub fn check_folder(dir: &Path, replace: bool) -> Result<(), FilesError> {
    match fs::metadata(dir) {
        Ok(found) if !found.is_dir() => Err(FilesError::NotAFolder(dir.to_owned())),
        Ok(_) if !replace => Err(FilesError::Exists(dir.to_owned())),
        Ok(_) => Ok(()),
        Err(error) if error.kind() == io::ErrorKind::NotFound => Ok(()),
        Err(error) => Err(failed(dir)(error)),
    }
}

fn failed(path: &Path) -> impl Fn(io::Error) -> FilesError + '_ {
    move |source| FilesError::Io {
        path: path.to_owned(),
        source,
    }
}

fn create(dir: &Path, files: &[(String, Vec<u8>)]) -> Result<(), FilesError> {
    let parent = match dir.parent() {
        Some(parent) if !parent.as_os_str().is_empty() => parent,
        _ => Path::new("."),
    };
    fs::create_dir_all(parent).map_err(failed(parent))?;
    let filled = fill_beside(parent, dir, files)?;
    fs::rename(filled.folder(), dir).map_err(failed(dir))
}

fn exchange(dir: &Path, files: &[(String, Vec<u8>)]) -> Result<(), FilesError> {
    let filled = fill_beside(dir, dir, files)?;
    for (name, _) in files {
        let target = dir.join(name);
        fs::rename(filled.folder().join(name), &target).map_err(failed(&target))?;
    }
    Ok(())
}

/// A folder that goes away when dropped, with the filled one inside: the inner
/// one gets the user's ordinary permissions, the outer one is private.
struct Filled(tempfile::TempDir);

impl Filled {
    fn folder(&self) -> PathBuf {
        self.0.path().join("filled")
    }
}

fn fill_beside(
    place: &Path,
    dir: &Path,
    files: &[(String, Vec<u8>)],
) -> Result<Filled, FilesError> {
    let outer = tempfile::Builder::new()
        .prefix(".doorglow-")
        .tempdir_in(place)
        .map_err(failed(place))?;
    let filled = Filled(outer);
    let folder = filled.folder();
    fs::create_dir(&folder).map_err(failed(place))?;
    for (name, bytes) in files {
        // The message names the file the user will look for, not its stand-in.
        fs::write(folder.join(name), bytes).map_err(failed(&dir.join(name)))?;
    }
    Ok(filled)
}

/// Our names in a folder that is not ours belong to somebody else.
fn refuse_foreign(dir: &Path, files: &[(String, Vec<u8>)]) -> Result<(), FilesError> {
    if is_ours(dir) {
        return Ok(());
    }
    match files
        .iter()
        .map(|(name, _)| dir.join(name))
        .find(|path| path.exists() && !is_our_plot(path))
    {
        Some(path) => Err(FilesError::Foreign(path)),
        None => Ok(()),
    }
}

/// Hash of the scenario whose results a folder holds, when it is one of ours.
pub fn scenario_hash_in(dir: &Path) -> Option<String> {
    /// The hash stands near the top of the file.
    const HEAD: usize = 8192;
    let start = begins(&dir.join(RECORD_FILE), HEAD)?;
    let text = String::from_utf8_lossy(&start);
    let (_, rest) = text.split_once("\"scenario_hash\":")?;
    rest.split('"').nth(1).map(str::to_owned)
}

fn is_ours(dir: &Path) -> bool {
    begins(&dir.join(RECORD_FILE), RECORD_START.len()).is_some_and(|start| start == RECORD_START)
}

fn is_our_plot(path: &Path) -> bool {
    let is_picture = path.extension().is_some_and(|end| end == "svg");
    is_picture
        && begins(path, 1024)
            .is_some_and(|start| String::from_utf8_lossy(&start).contains(PLOT_MARK))
}

fn begins(path: &Path, length: usize) -> Option<Vec<u8>> {
    use io::Read;
    let mut start = Vec::new();
    let file = fs::File::open(path).ok()?;
    file.take(length as u64).read_to_end(&mut start).ok()?;
    Some(start)
}

fn remove_stale_plots(dir: &Path, files: &[(String, Vec<u8>)]) -> Result<(), FilesError> {
    for entry in fs::read_dir(dir).map_err(failed(dir))? {
        let path = entry.map_err(failed(dir))?.path();
        let is_new = files.iter().any(|(name, _)| dir.join(name) == path);
        if !is_new && path.is_file() && is_our_plot(&path) {
            fs::remove_file(&path).map_err(failed(&path))?;
        }
    }
    Ok(())
}

/// A name that is fit for a file or folder on every system: letters, digits,
/// `-` and `_` stay, anything else becomes `_`; at most 80 bytes.
pub fn file_word(name: &str) -> String {
    let mut word = String::new();
    for character in name.chars() {
        let fits = character.is_alphanumeric() || character == '-' || character == '_';
        let kept = if fits { character } else { '_' };
        if word.len() + kept.len_utf8() > 80 {
            break;
        }
        word.push(kept);
    }
    if word.is_empty() {
        word.push('_');
    }
    word
}
