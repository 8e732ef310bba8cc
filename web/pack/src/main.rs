//! Packs the page into one HTML file: `cargo page`.
//!
//! The app is compiled for WebAssembly, the glue is made in process by the library behind the wasm-bindgen tool, and
//! everything is inlined into the shell, which is the root `index.html`. No bundler and no installed tool is needed.
mod compile;
mod parts;
mod shell;

use anyhow::{Context, Result, ensure};
use compile::Workspace;
use parts::Parts;
use std::fs;

/// The most that the file to mail may weigh.
const LIMIT_BYTES: usize = 600_000;

fn main() -> Result<()> {
    ensure!(std::env::args().len() == 1, "the packer takes no arguments: run `cargo page`");
    let workspace = Workspace::find()?;
    let program = compile::program(&workspace)?;
    let read = |path: &str| {
        let path = workspace.root.join(path);
        fs::read_to_string(&path).with_context(|| format!("cannot read {}", path.display()))
    };
    let styles = shell::with_imports(&read("web/page.css")?, |name| read(&format!("web/{name}")))?;
    let page = read("index.html")?;
    let packed = shell::gzip(&program.wasm)?;
    let script = shell::script(&packed, &program.glue, &read("web/boot.js")?)?;
    let html = shell::inline(&page, &styles, &script)?;

    let dist = workspace.root.join("web/dist");
    fs::create_dir_all(&dist)?;
    fs::write(dist.join("page.js"), &script)?;
    fs::write(dist.join("thimbleworth.html"), &html)?;

    let parts = Parts::of(&program.wasm)?;
    println!("part                           bytes    gzip");
    let row = |name: &str, bytes: usize, gzip: Option<usize>| {
        println!("{name:<26} {bytes:>9} {:>7}", gzip.map_or_else(String::new, |n| n.to_string()));
    };
    row("program", program.wasm.len(), Some(packed.len()));
    row("  of that code", parts.code, None);
    row("  of that data", parts.data, None);
    row("glue", program.glue.len(), Some(shell::gzip(program.glue.as_bytes())?.len()));
    row("styles", styles.len(), Some(shell::gzip(styles.as_bytes())?.len()));
    row("shell", page.len(), Some(shell::gzip(page.as_bytes())?.len()));
    row("web/dist/page.js", script.len(), None);
    row("web/dist/thimbleworth.html", html.len(), None);
    ensure!(
        html.len() <= LIMIT_BYTES,
        "web/dist/thimbleworth.html has {} bytes and may have {LIMIT_BYTES}: find the part above that grew",
        html.len()
    );
    Ok(())
}
