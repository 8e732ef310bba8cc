//! Short names for what program and glue lend each other: the tool's own hold a number of sixteen digits, which nothing can pack.
use crate::order::{vector, write};
use crate::parts::{leb128, sections};
use anyhow::{Context, Result, ensure};
use std::collections::BTreeMap;

/// The module and the glue with every imported function, and every export whose name the tool made up, named by a letter and its place.
pub(crate) fn shortened(module: &[u8], glue: &str) -> Result<(Vec<u8>, String)> {
    let mut names = BTreeMap::new();
    let mut out = module.get(..8).context("not a WebAssembly module")?.to_vec();
    for section in sections(module)? {
        let (words, letter) = match section.id {
            2 => (2, 'i'),
            7 => (1, 'e'),
            _ => {
                out.extend_from_slice(section.whole);
                continue;
            }
        };
        let mut bytes = Vec::new();
        let rest = vector(section.bytes, &mut bytes, |mut rest, bytes| {
            for word in 0..words {
                let (name, after) = text(rest)?;
                // Of an import the second word is its name, the first that of the script that lends it.
                let own = word + 1 == words && (letter == 'i' || name.starts_with("wasm_bindgen__"));
                let short = if own { format!("{letter}{}", names.len()) } else { name.to_owned() };
                write(bytes, short.len());
                bytes.extend_from_slice(short.as_bytes());
                if own {
                    names.insert(name.to_owned(), short);
                }
                rest = after;
            }
            let (_, after) =
                leb128(rest.get(1..).context("an entry ends early")?).context("an entry ends early")?;
            bytes.extend_from_slice(&rest[..rest.len() - after.len()]);
            Ok(after)
        })?;
        ensure!(rest.is_empty(), "imports or exports have a rest");
        out.push(section.id);
        write(&mut out, bytes.len());
        out.extend(bytes);
    }
    Ok((out, renamed(glue, &names)?))
}

/// A text in front of its length, and what follows it.
fn text(bytes: &[u8]) -> Result<(&str, &[u8])> {
    let (length, rest) = leb128(bytes).context("a name ends early")?;
    let (name, rest) = rest.split_at_checked(length).context("a name ends early")?;
    Ok((std::str::from_utf8(name)?, rest))
}

/// Every word of the script that is one of `names`, by its new name.
fn renamed(script: &str, names: &BTreeMap<String, String>) -> Result<String> {
    let part = |c: char| c.is_ascii_alphanumeric() || c == '_' || c == '$';
    let mut out = String::with_capacity(script.len());
    let mut met = 0;
    let mut rest = script;
    while let Some(start) = rest.find(part) {
        let (before, after) = rest.split_at(start);
        let (word, after) = after.split_at(after.find(|c| !part(c)).unwrap_or(after.len()));
        out.push_str(before);
        out.push_str(names.get(word).map_or(word, |short| {
            met += 1;
            short
        }));
        rest = after;
    }
    out.push_str(rest);
    ensure!(met >= names.len(), "the script has {met} of {} names", names.len());
    Ok(out)
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn both_sides_get_the_same_short_names() {
        let module = wat::parse_str(
            r#"(module (import "./x.js" "__wbg_log_0123456789abcdef" (func $log (param i32)))
                (func (export "wasm_bindgen__invoke__h01") (call $log (i32.const 1))) (func (export "start_page")))"#,
        )
        .expect("a module");
        let glue = "\"./x.js\": { __wbg_log_0123456789abcdef: function (a) { log(a); } }; wasm.wasm_bindgen__invoke__h01(); wasm.start_page();";
        let (short, script) = shortened(&module, glue).expect("short names");
        assert_eq!(script, "\"./x.js\": { i0: function (a) { log(a); } }; wasm.e1(); wasm.start_page();");
        let list = sections(&short).expect("sections");
        let of = |id| list.iter().find(|s| s.id == id).expect("a section").bytes;
        assert_eq!(of(2), b"\x01\x06./x.js\x02i0\x00\x00");
        assert_eq!(of(7), b"\x02\x02e1\x00\x01\x0astart_page\x00\x02");
        assert!(shortened(&module, "wasm.start_page();").is_err(), "a glue that lacks a name");
    }
}
