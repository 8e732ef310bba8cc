//! The shell and what is inlined into it: pure functions from text to text.
use crate::packing::{pack, signs, unpacker};
use anyhow::{Context, Result, ensure};
use base64::Engine;
use base64::engine::general_purpose::STANDARD as BASE64;
use sha2::{Digest, Sha256};

/// The element of the shell that loads the script from its folder.
const SCRIPT_START: &str = r#"<script src="web/dist/page.js""#;
const SCRIPT_END: &str = "</script>";
/// The element of the shell that loads the styles from their folder.
const STYLES: &str = r#"<link rel="stylesheet" href="web/page.css">"#;
/// The policy goes behind this element: it must stand before anything that it governs.
const CHARSET: &str = r#"<meta charset="utf-8">"#;

/// The list of sheets in two: the first, which the shell needs, and the others.
pub(crate) fn first_sheet(list: &str) -> Result<(&str, &str)> {
    let at = list.find("@import").and_then(|from| Some(from + list.get(from..)?.find('\n')? + 1));
    at.map(|at| list.split_at(at)).context("web/page.css imports nothing")
}

/// The styles with every sheet that they import in its place: in one file there is nothing to import from.
pub(crate) fn with_imports(styles: &str, read: impl Fn(&str) -> Result<String>) -> Result<String> {
    let mut out = String::new();
    for line in styles.split_inclusive('\n') {
        match line.trim().strip_prefix("@import \"").and_then(|rest| rest.strip_suffix("\";")) {
            Some(name) => out.push_str(&read(name)?),
            None => out.push_str(line),
        }
    }
    ensure!(
        !out.contains("@import"),
        "an @import stands on no line of its own, or in a sheet that is imported"
    );
    Ok(out)
}

/// A script or a style sheet without the lines that are comments and without indentation: the reader of the source has
/// the source.
pub(crate) fn lean(text: &str) -> String {
    let mut out = String::new();
    let mut comment = false;
    for line in text.lines().map(str::trim) {
        let opens = line.starts_with("/*");
        let skipped = comment || opens || line.is_empty() || line.starts_with("//");
        comment = (comment || opens) && !line.ends_with("*/");
        if !skipped {
            out.push_str(line);
            out.push('\n');
        }
    }
    out
}

/// The script that is packed with the program: the styles of what the program draws, what it borrows from the browser, and
/// its glue, hidden from the global scope.
pub(crate) fn packed_script(styles: &str, glue: &str, lend: &str) -> Result<String> {
    let styles = serde_json::to_string(styles)?;
    Ok(format!(
        "(function () {{\n\"use strict\";\n{lend}\nwear({styles});\n{glue}\nthimbleworth.program = wasm_bindgen;\n}})();\n"
    ))
}

/// The one script that stands in the page: program and script, packed, and the start.
pub(crate) fn script(program: &[u8], with: &str, boot: &str) -> Result<String> {
    let (packed, unpacker) = (pack(&[program, with.as_bytes()].concat())?, unpacker()?);
    let script = format!(
        "(function () {{\n\"use strict\";\nconst UNPACKER = [{}, \"{}\"];\nconst SIZES = [{}, {}];\n\
         const PAYLOAD = [{}, \"{}\"];\n{boot}}})();\n",
        unpacker.len(),
        signs(&unpacker),
        program.len(),
        with.len(),
        packed.len(),
        signs(&packed)
    );
    let text = boot.to_ascii_lowercase();
    for bad in ["</script", "<script", "<!--"] {
        ensure!(
            !text.contains(bad),
            "the start holds {bad:?}, which would end or confuse the script element"
        );
    }
    Ok(script)
}

/// What is put into the shell, and what is packed; the policy admits these and nothing else.
pub(crate) struct Inlined<'a> {
    /// The styles of the shell itself.
    pub(crate) styles: &'a str,
    pub(crate) script: &'a str,
    /// The styles and the script that come out of the packed program.
    pub(crate) packed_styles: &'a str,
    pub(crate) packed_script: &'a str,
}

/// The shell with styles, script and policy.
pub(crate) fn inline(shell: &str, parts: &Inlined<'_>) -> Result<String> {
    let Inlined { styles, script, .. } = *parts;
    ensure!(!styles.to_ascii_lowercase().contains("</style"), "the styles hold \"</style\"");
    for mark in [CHARSET, STYLES, SCRIPT_START] {
        ensure!(shell.matches(mark).count() == 1, "index.html must hold {mark} exactly once");
    }
    ensure!(shell.matches("<script").count() == 1, "index.html may hold one script only");
    ensure!(shell.matches("<style").count() == 0, "index.html may hold no styles of its own");
    let policy = format!(
        "default-src 'none'; script-src {} {} 'wasm-unsafe-eval'; style-src {} {}; img-src data: blob:; \
         base-uri 'none'; form-action 'none'",
        hash(script),
        hash(parts.packed_script),
        hash(styles),
        hash(parts.packed_styles)
    );
    let meta = format!("{CHARSET}\n<meta http-equiv=\"Content-Security-Policy\" content=\"{policy}\">");
    let page = shell.replace(CHARSET, &meta).replace(STYLES, &format!("<style>{styles}</style>"));
    let Some((before, rest)) = page.split_once(SCRIPT_START) else {
        anyhow::bail!("index.html lost its script");
    };
    let Some((_, after)) = rest.split_once(SCRIPT_END) else {
        anyhow::bail!("the script element of index.html has no end");
    };
    Ok(format!("{before}<script>{script}{SCRIPT_END}{after}"))
}

/// A hash source of Content Security Policy Level 3: the base64 of the SHA-256 of the element's text.
fn hash(text: &str) -> String {
    format!("'sha256-{}'", BASE64.encode(Sha256::digest(text.as_bytes())))
}

#[cfg(test)]
mod tests {
    use super::*;

    const SHELL: &str = include_str!("../../../index.html");

    fn inlined(shell: &str, styles: &str, script: &str) -> Result<String> {
        inline(shell, &Inlined { styles, script, packed_styles: "", packed_script: "glue();" })
    }

    #[test]
    fn the_root_shell_takes_styles_script_and_policy() {
        let page = inlined(SHELL, "p{color:red}", "run();").expect("a page");
        assert!(page.contains("<style>p{color:red}</style>"));
        assert!(page.contains("<script>run();</script>\n</body>"));
        assert!(!page.contains("src=\"web/") && !page.contains("href=\"web/") && !page.contains("onerror"));
        let policy = page.find("Content-Security-Policy").expect("a policy");
        assert!(
            policy < page.find("<style>").expect("styles"),
            "the policy must stand before what it governs"
        );
    }

    #[test]
    fn the_policy_names_the_hash_of_exactly_what_is_inlined() {
        // The example of Content Security Policy Level 3, section on hash usage: the hash of `alert('Hello, world.');`.
        assert_eq!(hash("alert('Hello, world.');"), "'sha256-qznLcsROx4GACP2dm0UCKCzCG+HiZ1guq6ZZDob/Tng='");
        let page = inlined(SHELL, "", "alert('Hello, world.');").expect("a page");
        assert!(
            page.contains(
                "script-src 'sha256-qznLcsROx4GACP2dm0UCKCzCG+HiZ1guq6ZZDob/Tng=' 'sha256-keBnXVhOaGUGIEp2PYdksxtoNPr9wBG2YBI1E5vQrRg=' 'wasm-unsafe-eval'"
            )
        );
    }

    #[test]
    fn text_that_would_end_its_element_is_refused() {
        for bad in ["a = '</SCRIPT>';", "a = '<script>';", "a = '<!-- ';"] {
            assert!(script(b"", "", bad).is_err(), "{bad} in the start");
        }
        assert!(script(b"", "let a = 1 < 2;", "").is_ok());
        assert!(inlined(SHELL, "</Style>", "").is_err());
    }

    #[test]
    fn a_shell_that_changed_its_marks_is_refused() {
        assert!(inlined(&SHELL.replace(STYLES, ""), "", "").is_err());
        assert!(inlined(&SHELL.replace("</body>", "<script>more()</script></body>"), "", "").is_err());
        assert!(inlined(&SHELL.replace("web/dist/page.js", "page.js"), "", "").is_err());
    }

    #[test]
    fn what_is_for_the_reader_of_the_source_is_left_out() {
        assert_eq!(
            lean("// a\n\n  let b = 1; // c\n/* d\n   e */\n  /** f */\nlet g = \"/*\";\n"),
            "let b = 1; // c\nlet g = \"/*\";\n"
        );
    }

    #[test]
    fn every_sheet_of_the_page_is_joined_once() {
        let folder = std::path::Path::new(concat!(env!("CARGO_MANIFEST_DIR"), "/../style"));
        let list = include_str!("../../page.css");
        let mut sheets = 0;
        for entry in std::fs::read_dir(folder).expect("the folder of sheets") {
            let name = entry.expect("a sheet").file_name().into_string().expect("a name");
            assert_eq!(list.matches(&format!("@import \"style/{name}\";")).count(), 1, "{name}");
            sheets += 1;
        }
        assert_eq!(list.matches("@import").count(), sheets);
    }

    #[test]
    fn the_shell_takes_the_first_sheet_alone() {
        let (first, rest) =
            first_sheet("/* a */\n\n@import \"a.css\";\n@import \"b.css\";\n").expect("two parts");
        assert!(first.ends_with("@import \"a.css\";\n"));
        assert_eq!(rest, "@import \"b.css\";\n");
        assert!(first_sheet("a {}").is_err());
        let (first, _) = first_sheet(include_str!("../../page.css")).expect("two parts");
        assert!(first.contains("paper.css"), "the shell's own looks");
    }

    #[test]
    fn a_sheet_that_is_imported_stands_in_its_place() {
        let read = |name: &str| Ok(format!("/* {name} */\n"));
        assert_eq!(
            with_imports("a {}\n@import \"b.css\";\nc {}\n", read).expect("styles"),
            "a {}\n/* b.css */\nc {}\n"
        );
        assert!(with_imports("a {} @import \"b.css\";", read).is_err());
    }
}
