//! Reading plans and tables from files and from the standard input.

use crate::output::{Refusal, reason};
use std::fs::File;
use std::io::{self, Read};
use std::path::Path;
use thimbleworth::account::{Account, account_text};
use thimbleworth::plan::open_bytes;

/// No plan or table is larger: the program would rather say so than fill the memory.
const LARGEST_BYTES: u64 = 256 * 1024 * 1024;

/// Whether the path means the standard input.
fn is_standard_input(path: &Path) -> bool {
    path.as_os_str() == "-"
}

/// The bytes of a file, or of the standard input for `-`.
pub(crate) fn bytes(path: &Path) -> Result<Vec<u8>, Refusal> {
    let mut bytes = Vec::new();
    let mut read = |from: &mut dyn Read| from.take(LARGEST_BYTES + 1).read_to_end(&mut bytes);
    let done = if is_standard_input(path) {
        read(&mut io::stdin().lock())
    } else {
        File::open(path).and_then(|mut file| read(&mut file))
    };
    let name = if is_standard_input(path) { "the standard input".into() } else { path.display().to_string() };
    match done {
        Err(error) => Err(Refusal::because(format!("{name} cannot be read: {}", reason(&error)))),
        Ok(_) if bytes.len() as u64 > LARGEST_BYTES => {
            let most = LARGEST_BYTES / (1024 * 1024);
            Err(Refusal::because(format!("{name} is larger than {most} MiB; a smaller file would do")))
        }
        Ok(_) => Ok(bytes),
    }
}

/// The account of the plan in a file; what is wrong with the text stands among its problems.
pub(crate) fn account(path: &Path) -> Result<Account, Refusal> {
    let bytes = bytes(path)?;
    Ok(match std::str::from_utf8(&bytes) {
        Ok(text) => account_text(text),
        Err(_) => Account {
            plan: None,
            program: None,
            workloads: Vec::new(),
            problems: open_bytes(&bytes).problems,
        },
    })
}
