//! From the sources to the program and its glue, the same bytes from any folder.
use crate::names::shortened;
use crate::order::ordered;
use anyhow::{Context, Result, bail, ensure};
use std::env;
use std::fs;
use std::path::{Path, PathBuf};
use std::process::Command;
use wasm_bindgen_cli_support::Bindgen;

const TARGET: &str = "wasm32-unknown-unknown";
const PROFILE: &str = "page";

/// What is packed.
#[derive(Clone, Copy, PartialEq, Eq)]
pub(crate) enum What {
    /// The page.
    Page,
    /// An empty page, to measure beside it.
    Empty,
}

impl What {
    /// How cargo is told what to build, and the name of the file that it makes.
    const fn target(self) -> (&'static [&'static str], &'static str) {
        match self {
            Self::Page => (&["--lib"], "thimbleworth_web.wasm"),
            Self::Empty => (&["--example", "empty_page"], "examples/empty_page.wasm"),
        }
    }
}

/// Where things are on this machine. Found at run time: a packer built in one checkout may be run in another.
pub(crate) struct Workspace {
    pub(crate) root: PathBuf,
    target: PathBuf,
    cargo: PathBuf,
    cargo_home: PathBuf,
    sysroot: PathBuf,
}

/// What the page runs.
pub(crate) struct Program {
    pub(crate) wasm: Vec<u8>,
    pub(crate) glue: String,
}

/// What a command prints, without the line end.
fn output(command: &mut Command) -> Result<String> {
    let output = command.output().with_context(|| format!("cannot run {command:?}"))?;
    ensure!(output.status.success(), "{command:?} failed: {}", String::from_utf8_lossy(&output.stderr));
    Ok(String::from_utf8(output.stdout)?.trim_end().to_owned())
}

impl Workspace {
    pub(crate) fn find() -> Result<Self> {
        let cargo = PathBuf::from(env::var_os("CARGO").unwrap_or_else(|| "cargo".into()));
        let metadata = output(Command::new(&cargo).args(["metadata", "--no-deps", "--format-version", "1"]))?;
        let metadata: serde_json::Value = serde_json::from_str(&metadata)?;
        let folder = |key: &str| match metadata.get(key).and_then(serde_json::Value::as_str) {
            Some(path) => Ok(PathBuf::from(path)),
            None => bail!("cargo metadata gives no {key}"),
        };
        let cargo_home = match env::var_os("CARGO_HOME") {
            Some(path) => PathBuf::from(path),
            None => env::home_dir().context("no home folder and no CARGO_HOME")?.join(".cargo"),
        };
        let root = folder("workspace_root")?;
        let sysroot = output(Command::new("rustc").args(["--print", "sysroot"]).current_dir(&root))?;
        // A target folder of its own: the outer cargo may still hold the lock of the usual one.
        let target = folder("target_directory")?.join("page");
        Ok(Self { root, target, cargo, cargo_home, sysroot: sysroot.into() })
    }

    /// What the compiler is told to write instead of the paths of this machine; of several that match, the last wins.
    fn remaps(&self) -> Result<Vec<(PathBuf, &'static str)>> {
        let mut remaps = vec![
            (self.cargo_home.clone(), "/cargo"),
            (self.root.clone(), "/thimbleworth"),
            (self.target.clone(), "/target"),
            (self.sysroot.clone(), "/rust"),
        ];
        // The folder of a registry's sources is named after its host.
        let sources = self.cargo_home.join("registry/src");
        if sources.is_dir() {
            for registry in fs::read_dir(&sources)? {
                remaps.push((registry?.path(), "/crates"));
            }
        }
        Ok(remaps)
    }
}

/// Compiles the app, adding the WebAssembly target to the toolchain if it is missing, and makes the glue.
pub(crate) fn program(workspace: &Workspace, what: What) -> Result<Program> {
    let (built, file) = what.target();
    if !workspace.sysroot.join("lib/rustlib").join(TARGET).is_dir() {
        let status =
            Command::new("rustup").args(["target", "add", TARGET]).current_dir(&workspace.root).status();
        ensure!(
            status.is_ok_and(|status| status.success()),
            "the Rust target {TARGET} is missing and could not be added: run `rustup target add {TARGET}`"
        );
    }
    // Fetched first, so that the folder of the registry exists when its path is remapped.
    run(Command::new(&workspace.cargo).args(["fetch", "--locked", "--quiet"]), workspace)?;
    let remaps = workspace.remaps()?;
    let flags: Vec<String> =
        remaps.iter().map(|(from, to)| format!("--remap-path-prefix={}={to}", from.display())).collect();
    run(
        Command::new(&workspace.cargo)
            .args(["build", "--locked", "--package", "thimbleworth-web"])
            .args(built)
            .args(["--profile", PROFILE, "--target", TARGET, "--target-dir"])
            .arg(&workspace.target)
            .env_remove("RUSTFLAGS")
            // Separated by 0x1f, so that a blank in a path does no harm.
            .env("CARGO_ENCODED_RUSTFLAGS", flags.join("\u{1f}")),
        workspace,
    )?;
    let program = glue(&workspace.target.join(TARGET).join(PROFILE).join(file))?;
    for (path, _) in &remaps {
        ensure!(
            !holds(&program.wasm, path) && !holds(program.glue.as_bytes(), path),
            "the program holds the path {} of this machine",
            path.display()
        );
    }
    Ok(program)
}

fn run(command: &mut Command, workspace: &Workspace) -> Result<()> {
    let status = command.current_dir(&workspace.root).status();
    let status = status.with_context(|| format!("cannot run {command:?}"))?;
    ensure!(status.success(), "{command:?} failed");
    Ok(())
}

fn glue(compiled: &Path) -> Result<Program> {
    let mut output = Bindgen::new()
        .input_path(compiled)
        .no_modules(true)?
        .typescript(false)
        .omit_default_module_path(true)
        .remove_name_section(true)
        .remove_producers_section(true)
        .generate_output()?;
    ensure!(
        output.snippets().values().all(Vec::is_empty)
            && output.local_modules().is_empty()
            && output.npm_dependencies().is_empty(),
        "a dependency brings scripts of its own, which the packer does not inline"
    );
    let wasm = ordered(&output.wasm_mut().emit_wasm())?;
    let (wasm, glue) = shortened(&wasm, output.js())?;
    Ok(Program { wasm, glue })
}

/// Whether `bytes` hold `path` as text. The root folder is no telling path.
fn holds(bytes: &[u8], path: &Path) -> bool {
    let path = path.as_os_str().as_encoded_bytes();
    path.len() > 1 && bytes.windows(path.len()).any(|window| window == path)
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_path_inside_the_program_is_found() {
        let path = Path::new("/somewhere/thimbleworth");
        assert!(holds(b"panicked at /somewhere/thimbleworth/core/src/lib.rs", path));
        assert!(!holds(b"panicked at /thimbleworth/core/src/lib.rs", path));
        assert!(!holds(b"", path));
    }

    #[test]
    fn the_workspace_is_found_and_its_registry_gets_a_neutral_name() {
        let workspace = Workspace::find().expect("a workspace");
        assert!(workspace.root.join("web/pack/Cargo.toml").is_file());
        let remaps = workspace.remaps().expect("folders that can be read");
        assert!(remaps.iter().any(|(_, to)| *to == "/crates"), "tests run after the sources were fetched");
    }
}
