//! The shell and what is inlined into it: pure functions from text to text.
use crate::packing::{pack, signs, unpacker};
use anyhow::{Result, ensure};
use base64::Engine;
use base64::engine::general_purpose::STANDARD as BASE64;
use sha2::{Digest, Sha256};

/// The element of the shell that loads the script from its folder.
const SCRIPT_START: &str = r#"<script src="web/dist/page.js""#;
const SCRIPT_END: &str = "</script>";
/// The element of the shell that loads the styles from their folder.
const STYLES: &str = r#"<link rel="stylesheet" href="web/page.css">"#;
/// Where the first script finds the load in the file to mail.
const LOAD: &str = "document.getElementById(\"load\").textContent";
/// The policy goes behind this element: it must stand before anything that it governs.
const CHARSET: &str = r#"<meta charset="utf-8">"#;

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

/// What is packed, in the order in which it is unpacked.
pub(crate) struct Load<'a> {
    /// The styles that are not needed for the first sight.
    pub(crate) styles: &'a str,
    /// The glue and what the program asks of the browser.
    pub(crate) script: &'a str,
    pub(crate) program: &'a [u8],
}

/// The glue and the other side of the program in one, hidden from the global scope.
pub(crate) fn second_script(glue: &str, boot: &str) -> String {
    format!("(function () {{\n\"use strict\";\n{glue}\n{boot}}})();\n")
}

/// The first script of the page, which unpacks the load.
pub(crate) struct First {
    /// With the load in it, for a page that loads it from its folder.
    pub(crate) whole: String,
    /// As it stands in a page that has the load in an element of its own, which a browser neither translates nor hashes.
    pub(crate) beside: String,
    /// That element's text.
    pub(crate) load: String,
}

/// The packed load and what unpacks it.
pub(crate) fn first_script(load: &Load<'_>, start: &str) -> Result<First> {
    let front = [load.styles.as_bytes(), load.script.as_bytes()].concat();
    let (packed, unpacker) = (pack(&front, load.program)?, unpacker()?);
    let lowered = start.to_ascii_lowercase();
    for bad in ["</script", "<script", "<!--"] {
        ensure!(
            !lowered.contains(bad),
            "the start holds {bad:?}, which would end or confuse the script element"
        );
    }
    let script = |text: &str| {
        format!(
            "(function () {{\n\"use strict\";\nconst UNPACKER = [{}, \"{}\"];\nconst SIZES = [{}, {}, {}];\n\
             const LOAD = [{}, {text}];\n{start}}})();\n",
            unpacker.len(),
            signs(&unpacker),
            load.styles.len(),
            load.script.len(),
            load.program.len(),
            packed.len(),
        )
    };
    let load = signs(&packed);
    Ok(First { whole: script(&format!("\"{load}\"")), beside: script(LOAD), load })
}

/// The shell with the styles of the first sight, the script and a policy that admits these, what the script unpacks and
/// nothing else.
pub(crate) fn inline(shell: &str, styles: &str, first: &First, load: &Load<'_>) -> Result<String> {
    let script = &first.beside;
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
        hash(load.script),
        hash(styles),
        hash(load.styles)
    );
    // The file says by its first bytes how it is written; a second word on it could only be wrong.
    let meta = format!("<meta http-equiv=\"Content-Security-Policy\" content=\"{policy}\">");
    let page = shell.replace(CHARSET, &meta).replace(STYLES, &format!("<style>{styles}</style>"));
    let Some((before, rest)) = page.split_once(SCRIPT_START) else {
        anyhow::bail!("index.html lost its script");
    };
    let Some((_, after)) = rest.split_once(SCRIPT_END) else {
        anyhow::bail!("the script element of index.html has no end");
    };
    let packed = &first.load;
    Ok(format!(
        "{before}<script type=\"text/plain\" id=\"load\">{packed}{SCRIPT_END}<script>{script}{SCRIPT_END}{after}"
    ))
}

/// A hash source of Content Security Policy Level 3: the base64 of the SHA-256 of the element's text.
fn hash(text: &str) -> String {
    format!("'sha256-{}'", BASE64.encode(Sha256::digest(text.as_bytes())))
}

#[cfg(test)]
mod tests {
    use super::*;

    const SHELL: &str = include_str!("../../../index.html");
    const NOTHING: Load<'static> = Load { styles: "", script: "", program: b"\0asm\x01\0\0\0" };

    fn first(script: &str) -> First {
        First { whole: String::new(), beside: script.to_owned(), load: "\u{2100}\u{2101}".to_owned() }
    }

    #[test]
    fn the_load_stands_in_the_script_or_beside_it() {
        let first = first_script(&NOTHING, "run();").expect("a script");
        assert!(first.whole.contains(&format!("\"{}\"];\nrun();", first.load)));
        assert_eq!(first.whole.replace(&format!("\"{}\"", first.load), LOAD), first.beside);
    }

    #[test]
    fn the_root_shell_takes_styles_script_and_policy() {
        let page = inline(SHELL, "p{color:red}", &first("run();"), &NOTHING).expect("a page");
        assert!(page.contains("<style>p{color:red}</style>"));
        assert!(page.contains("id=\"load\">\u{2100}\u{2101}</script><script>run();</script>\n</body>"));
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
        let load = Load { styles: "b{}", script: "let second;", program: b"" };
        let page = inline(SHELL, "a{}", &first("alert('Hello, world.');"), &load).expect("a page");
        let scripts = "script-src 'sha256-qznLcsROx4GACP2dm0UCKCzCG+HiZ1guq6ZZDob/Tng='";
        assert!(page.contains(&format!("{scripts} {} 'wasm-unsafe-eval';", hash("let second;"))));
        assert!(page.contains(&format!("style-src {} {};", hash("a{}"), hash("b{}"))));
    }

    #[test]
    fn text_that_would_end_its_element_is_refused() {
        for bad in ["a = '</SCRIPT>';", "a = '<script>';", "a = '<!-- ';"] {
            assert!(first_script(&NOTHING, bad).is_err(), "{bad} in the start");
        }
        assert!(first_script(&NOTHING, "let a = 1 < 2;").is_ok());
        assert!(inline(SHELL, "</Style>", &first(""), &NOTHING).is_err());
    }

    #[test]
    fn a_shell_that_changed_its_marks_is_refused() {
        for shell in [
            SHELL.replace(STYLES, ""),
            SHELL.replace("</body>", "<script>more()</script></body>"),
            SHELL.replace("web/dist/page.js", "page.js"),
        ] {
            assert!(inline(&shell, "", &first(""), &NOTHING).is_err());
        }
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
    fn a_sheet_that_is_imported_stands_in_its_place() {
        let read = |name: &str| Ok(format!("/* {name} */\n"));
        assert_eq!(
            with_imports("a {}\n@import \"b.css\";\nc {}\n", read).expect("styles"),
            "a {}\n/* b.css */\nc {}\n"
        );
        assert!(with_imports("a {} @import \"b.css\";", read).is_err());
    }
}
