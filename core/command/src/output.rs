//! Where results and problems go.

use std::fs::{self, File, OpenOptions};
use std::io::{self, ErrorKind, Write};
use std::path::{Path, PathBuf};
use thimbleworth::plan::Problem;
use thimbleworth::report::{problem_line, visible};

/// Why the program stops with exit status 2.
pub(crate) enum Refusal {
    /// A sentence that is still to be said.
    Because(String),
    /// Everything has been said on the standard error.
    Said,
    /// The standard output was closed by whoever read it; no failure.
    Closed,
}

impl Refusal {
    pub(crate) fn because(why: impl Into<String>) -> Self {
        Self::Because(why.into())
    }
}

/// A line on the standard error.
pub(crate) fn complain(line: &str) {
    // Nothing can be done where even the standard error is closed.
    let _ = writeln!(io::stderr().lock(), "{}", visible(line));
}

/// Every problem, one a line.
pub(crate) fn complain_of(problems: &[Problem]) {
    let mut text = String::new();
    for problem in problems {
        text.push_str(&problem_line(problem));
        text.push('\n');
    }
    let _ = io::stderr().lock().write_all(text.as_bytes());
}

/// The result on the standard output.
pub(crate) fn print(text: &str) -> Result<(), Refusal> {
    let mut out = io::stdout().lock();
    out.write_all(text.as_bytes()).and_then(|()| out.flush()).map_err(|error| match error.kind() {
        ErrorKind::BrokenPipe => Refusal::Closed,
        _ => Refusal::because(format!("the standard output cannot be written: {error}")),
    })
}

/// The result into a file, or on to the standard output where there is none.
pub(crate) fn deliver(text: &str, to: Option<&Path>, read_from: &Path) -> Result<(), Refusal> {
    if to.is_none() { print(text) } else { deliver_bytes(text.as_bytes(), to, read_from) }
}

/// As [`deliver`], for what is no text; it goes into a file.
pub(crate) fn deliver_bytes(bytes: &[u8], to: Option<&Path>, read_from: &Path) -> Result<(), Refusal> {
    let Some(path) = to else { return Ok(()) };
    let same = |a: &Path, b: &Path| matches!((a.canonicalize(), b.canonicalize()), (Ok(a), Ok(b)) if a == b);
    if same(path, read_from) {
        return Err(Refusal::because(format!(
            "the output {} is the file that is read; name another one",
            path.display()
        )));
    }
    write(bytes, path).map_err(|error| {
        Refusal::because(format!("{} cannot be written: {}", path.display(), reason(&error)))
    })
}

/// Writes a file as a whole: into a new one beside it, which then takes its place, so that nobody ever finds half of it.
fn write(bytes: &[u8], path: &Path) -> io::Result<()> {
    let path = path.canonicalize().unwrap_or_else(|_| path.to_path_buf());
    match fs::metadata(&path) {
        Ok(found) if found.is_dir() => return Err(ErrorKind::IsADirectory.into()),
        // A device or a pipe has no other side that could take its place.
        Ok(found) if !found.is_file() => {
            return OpenOptions::new().write(true).open(&path)?.write_all(bytes);
        }
        Ok(found) if found.permissions().readonly() => return Err(ErrorKind::PermissionDenied.into()),
        Ok(_) | Err(_) => {}
    }
    let (beside, mut file) = beside(&path)?;
    let written = file
        .write_all(bytes)
        .and_then(|()| file.sync_all())
        .and_then(|()| {
            fs::metadata(&path).map_or(Ok(()), |old| fs::set_permissions(&beside, old.permissions()))
        })
        .and_then(|()| fs::rename(&beside, &path));
    if written.is_err() {
        // The first error is the one to tell of.
        let _ = fs::remove_file(&beside);
    }
    written
}

/// A new file in the folder of `path`.
fn beside(path: &Path) -> io::Result<(PathBuf, File)> {
    let name = path.file_name().ok_or(ErrorKind::InvalidInput)?.to_string_lossy().into_owned();
    // A long name with something added could be too long for a file name.
    let name: String = name.chars().take(40).collect();
    let mut attempt = 0_u32;
    loop {
        let beside = path.with_file_name(format!(".{name}.{}-{attempt}.part", std::process::id()));
        match OpenOptions::new().write(true).create_new(true).open(&beside) {
            Ok(file) => return Ok((beside, file)),
            Err(error) if error.kind() == ErrorKind::AlreadyExists && attempt < 100 => attempt += 1,
            Err(error) => return Err(error),
        }
    }
}

/// What went wrong with a file, in words.
pub(crate) fn reason(error: &io::Error) -> String {
    match error.kind() {
        ErrorKind::NotFound => "there is no such file or folder".to_owned(),
        ErrorKind::IsADirectory => "it is a folder".to_owned(),
        ErrorKind::PermissionDenied => "permission is denied".to_owned(),
        _ => error.to_string(),
    }
}
