//! Packs the page into one HTML file: `cargo page`. With `--empty`, a page with nothing in it, to measure beside it.
//!
//! The app is compiled for WebAssembly, the glue is made in process by the library behind the wasm-bindgen tool, and
//! everything is inlined into the shell, which is the root `index.html`. No bundler and no installed tool is needed.
mod compile;
mod instruction;
mod names;
mod order;
mod packing;
mod parts;
mod shell;
mod streams;

use anyhow::{Context, Result, bail, ensure};
use compile::{What, Workspace};
use parts::Parts;
use shell::Load;
use std::fs;

/// The most that the file to mail may weigh.
const LIMIT_BYTES: usize = 600_000;

/// The sheet that the first sight needs; the others are packed with the program.
const FIRST_SHEET: &str = "web/style/paper.css";

fn main() -> Result<()> {
    let what = match std::env::args().skip(1).collect::<Vec<_>>().as_slice() {
        [] => What::Page,
        [only] if only == "--empty" => What::Empty,
        _ => bail!("run `cargo page`, or `cargo page --empty` for an empty page to measure beside it"),
    };
    let workspace = Workspace::find()?;
    let program = compile::program(&workspace, what)?;
    let read = |path: &str| {
        let path = workspace.root.join(path);
        fs::read_to_string(&path).with_context(|| format!("cannot read {}", path.display()))
    };
    let styles =
        shell::lean(&shell::with_imports(&read("web/page.css")?, |name| read(&format!("web/{name}")))?);
    let first_styles = shell::lean(&read(FIRST_SHEET)?);
    let late_styles = styles
        .strip_prefix(&first_styles)
        .with_context(|| format!("web/page.css does not begin with {FIRST_SHEET}"))?;
    let (glue, boot) = (shell::lean(&program.glue), shell::lean(&read("web/boot.js")?));
    let second_script = shell::second_script(&glue, &boot);
    let load = Load { styles: late_styles, script: &second_script, program: &program.wasm };
    let start = shell::lean(&read("web/start.js")?);
    let page = read("index.html")?;
    let first = shell::first_script(&load, &start)?;
    let html = packing::in_utf16(&shell::inline(&page, &first_styles, &first, &load)?);

    let dist = workspace.root.join("web/dist");
    fs::create_dir_all(&dist)?;
    if what == What::Empty {
        fs::write(dist.join("empty.html"), &html)?;
        println!(
            "web/dist/empty.html: {} bytes, of that the program {} packed",
            html.len(),
            packing::pack(b"", &program.wasm)?.len()
        );
        return Ok(());
    }
    fs::write(dist.join("page.js"), &first.whole)?;
    // What the unpacker must give again; a test compares.
    fs::write(dist.join("program.wasm"), &program.wasm)?;
    fs::write(dist.join("thimbleworth.html"), &html)?;

    let parts = Parts::of(&program.wasm)?;
    println!("part                           bytes");
    let row = |name: &str, bytes: usize| println!("{name:<26} {bytes:>9}");
    row("program", program.wasm.len());
    row("  of that code", parts.code);
    row("  of that data", parts.data);
    row("program, packed alone", packing::pack(b"", &program.wasm)?.len());
    row("glue", glue.len());
    row("the browser's side", boot.len());
    row("styles", styles.len());
    row("  of that at once", first_styles.len());
    row("start", start.len());
    row("shell", page.len());
    row("web/dist/page.js", first.whole.len());
    row("web/dist/thimbleworth.html", html.len());
    ensure!(
        html.len() <= LIMIT_BYTES,
        "web/dist/thimbleworth.html has {} bytes and may have {LIMIT_BYTES}: find the part above that grew",
        html.len()
    );
    Ok(())
}
