//! The sections of a WebAssembly module, their sizes, and the bodies of its functions.
use anyhow::{Context, Result, ensure};

/// Bytes of code and of data; what is left of the module are types, names and tables.
#[derive(Debug, Default, PartialEq, Eq)]
pub(crate) struct Parts {
    pub(crate) code: usize,
    pub(crate) data: usize,
}

impl Parts {
    pub(crate) fn of(module: &[u8]) -> Result<Self> {
        let mut parts = Self::default();
        for section in sections(module)? {
            match section.id {
                10 => parts.code += section.bytes.len(),
                11 => parts.data += section.bytes.len(),
                _ => {}
            }
        }
        Ok(parts)
    }
}

/// A section of a module.
pub(crate) struct Section<'a> {
    pub(crate) id: u8,
    pub(crate) bytes: &'a [u8],
    /// With its head.
    pub(crate) whole: &'a [u8],
}

/// Reads the section headers. WebAssembly core specification, "Binary Format": a module is a magic number and a version of four
/// bytes each, then sections of an id (code 10, data 11), a size in LEB128 and as many bytes.
pub(crate) fn sections(module: &[u8]) -> Result<Vec<Section<'_>>> {
    ensure!(module.starts_with(b"\0asm"), "not a WebAssembly module");
    let mut list = Vec::new();
    let mut rest = module.get(8..).context("the module ends early")?;
    while let Some((&id, after)) = rest.split_first() {
        let (size, after) = leb128(after).context("the size of a section ends early")?;
        let (bytes, after) = after.split_at_checked(size).context("a section ends early")?;
        list.push(Section { id, bytes, whole: &rest[..rest.len() - after.len()] });
        rest = after;
    }
    Ok(list)
}

/// The bodies of the functions in a code section.
pub(crate) fn bodies(code: &[u8]) -> Result<Vec<&[u8]>> {
    let (count, mut rest) = leb128(code).context("the code ends early")?;
    let mut list = Vec::new();
    for _ in 0..count {
        let (size, after) = leb128(rest).context("the size of a body ends early")?;
        let (body, after) = after.split_at_checked(size).context("a body ends early")?;
        list.push(body);
        rest = after;
    }
    ensure!(rest.is_empty(), "the code has a rest");
    Ok(list)
}

/// An unsigned number in groups of seven bits, lowest first, and what follows it.
pub(crate) fn leb128(bytes: &[u8]) -> Option<(usize, &[u8])> {
    let mut value = 0;
    for (i, byte) in bytes.iter().enumerate().take(5) {
        value |= usize::from(byte & 0x7f) << (7 * i);
        if byte & 0x80 == 0 {
            return Some((value, &bytes[i + 1..]));
        }
    }
    None
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn sizes_of_more_than_one_byte_are_read() {
        // 624485 is the usual worked example of LEB128 (from memory): E5 8E 26 = 0x65 + 0x0e·2⁷ + 0x26·2¹⁴.
        assert_eq!(leb128(&[0xe5, 0x8e, 0x26, 7]), Some((624_485, &[7][..])));
        assert_eq!(leb128(&[0x80]), None);
    }

    #[test]
    fn code_and_data_are_told_apart() {
        let module = b"\0asm\x01\0\0\0\x0a\x02ab\x0b\x03cde\0\x01z";
        assert_eq!(Parts::of(module).expect("a module"), Parts { code: 2, data: 3 });
        assert!(Parts::of(b"\0asm\x01\0\0\0\x0a\x09ab").is_err());
        assert!(Parts::of(b"text").is_err());
    }
}
