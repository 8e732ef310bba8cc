//! The program as text: taken apart (`streams.rs`), packed with LZMA, which leaves a quarter less than gzip, and written in
//! characters that come through as they are in a script. What unpacks it again is a small module, `unpack.wat`, and `web/start.js`.
use crate::instruction::ALIGNMENTS;
use crate::parts::sections;
use crate::streams::{LAST, STREAMS, apart, table};
use anyhow::Result;
use lzma_rust2::{EncodeMode, LzmaOptions, LzmaWriter, MfType};
use std::io::Write;

/// The most that is looked back for a repetition: more than any program has.
const REACH_BYTES: u32 = 4 << 20;

/// A raw LZMA stream, the same bytes for the same bytes. `unpack.wat` knows its settings (lc=2, lp=0, pb=0).
fn pack_stream(bytes: &[u8]) -> Result<Vec<u8>> {
    let mut options = LzmaOptions::with_preset(9);
    (options.lc, options.lp, options.pb) = (2, 0, 0);
    (options.dict_size, options.nice_len, options.depth_limit) = (REACH_BYTES, 273, 512);
    (options.mf, options.mode) = (MfType::Bt4, EncodeMode::Normal);
    let mut writer = LzmaWriter::new_no_header(Vec::new(), &options, false)?;
    writer.write_all(bytes)?;
    Ok(writer.finish()?)
}

/// `front` and behind it `module`, packed: numbers of four bytes, namely how many functions there are, how long they are, and the lengths
/// of each stream packed and unpacked; then the streams.
pub(crate) fn pack(front: &[u8], module: &[u8]) -> Result<Vec<u8>> {
    let apart = apart(front, module)?;
    let mut out = Vec::new();
    let mut put = |number: usize| {
        out.extend(u32::try_from(number)?.to_le_bytes());
        anyhow::Ok(())
    };
    put(apart.functions)?;
    put(apart.code_bytes)?;
    let mut packed = Vec::new();
    for stream in &apart.streams {
        let before = packed.len();
        packed.extend(pack_stream(stream)?);
        put(packed.len() - before)?;
        put(stream.len())?;
    }
    out.extend(packed);
    Ok(out)
}

/// The module that unpacks what [`pack`] made.
pub(crate) fn unpacker() -> Result<Vec<u8>> {
    let table: String = table().iter().map(|entry| format!("\\{entry:02x}")).collect();
    let alignments = ALIGNMENTS.iter().rev().fold(0_u64, |all, one| all << 2 | u64::from(*one));
    let wat = include_str!("unpack.wat")
        .replace("BIT\n", include_str!("bit.wat"))
        .replace("ALIGNMENTS", &alignments.to_string())
        .replace("TABLE", &table)
        .replace("HEAD", &(8 + 8 * STREAMS).to_string())
        .replace("ADDRESSES", &(LAST - 1).to_string())
        .replace("LAST", &LAST.to_string());
    let module = wat::parse_str(wat)?;
    // Without the names of its functions.
    let kept = sections(&module)?.into_iter().filter(|section| section.id != 0);
    Ok(module[..8].iter().chain(kept.flat_map(|section| section.whole)).copied().collect())
}

/// The first sign, and how many there are: all of one unit in UTF-16, none that means anything in a script or a page, none
/// that turns the direction of writing, none that stands for half a character.
const FIRST: u32 = 0x2100;
const SIGNS: u32 = 46_341;

/// The bytes as characters: 31 bits in two signs, lowest bits first, the higher part in the first sign (46 341² > 2³¹). In UTF-16
/// that is 32 bytes for 31; UTF-8 has no better than eight for seven.
pub(crate) fn signs(bytes: &[u8]) -> String {
    let mut out = String::with_capacity(bytes.len() * 2);
    let mut put = |value: u64| {
        let value = (value & 0x7fff_ffff) as u32;
        out.extend(char::from_u32(FIRST + value / SIGNS));
        out.extend(char::from_u32(FIRST + value % SIGNS));
    };
    let (mut held, mut bits) = (0_u64, 0);
    for &byte in bytes {
        held |= u64::from(byte) << bits;
        bits += 8;
        if bits >= 31 {
            put(held);
            held >>= 31;
            bits -= 31;
        }
    }
    if bits > 0 {
        put(held);
    }
    out
}

/// A page in UTF-16 with the mark of its order in front, by which every browser knows it, whatever a server says.
pub(crate) fn in_utf16(page: &str) -> Vec<u8> {
    std::iter::once(0xfeff).chain(page.encode_utf16()).flat_map(u16::to_le_bytes).collect()
}

#[cfg(test)]
mod tests {
    use super::*;

    /// The reading of `web/start.js`, line by line.
    fn unsigned(text: &str, size: usize) -> Vec<u8> {
        let (mut out, mut held, mut bits) = (Vec::new(), 0_u32, 0);
        let signs: Vec<u32> = text.chars().map(|sign| u32::from(sign) - FIRST).collect();
        let half = |held: u32| (held as u16).to_le_bytes();
        for pair in signs.chunks(2) {
            let value = pair[0] * SIGNS + pair[1];
            held |= (value & 0xffff) << bits;
            out.extend(half(held));
            held = held >> 16 | (value >> 16) << bits;
            bits += 15;
            if bits > 15 {
                out.extend(half(held));
                held >>= 16;
                bits -= 16;
            }
        }
        out.extend(half(held));
        out.truncate(size);
        out
    }

    #[test]
    fn every_byte_comes_back_from_its_signs() {
        for length in [0, 1, 2, 3, 4, 5, 30, 31, 32, 1000, 70_000] {
            let bytes: Vec<u8> = (0..length).map(|n: usize| (n * n / 7 % 256) as u8).collect();
            let text = signs(&bytes);
            assert!(text.chars().all(|c| (0x2100..0xd800).contains(&u32::from(c))), "{text}");
            assert!(text.encode_utf16().count() * 31 <= length * 16 + 62, "{length} bytes");
            assert_eq!(unsigned(&text, length), bytes);
        }
        assert_eq!(unsigned(&signs(&[0xff; 62]), 62), [0xff; 62]);
    }

    #[test]
    fn the_page_begins_with_the_mark_of_its_order() {
        assert_eq!(in_utf16("<\u{2100}"), [0xff, 0xfe, b'<', 0, 0, 0x21]);
    }

    #[test]
    fn packing_gives_the_same_bytes_again_and_the_other_side_is_a_small_module() {
        let text = b"the same, the same, the same and a little more of the same".repeat(40);
        let packed = pack(&text, b"\0asm\x01\0\0\0").expect("packed");
        assert_eq!(packed, pack(&text, b"\0asm\x01\0\0\0").expect("packed"));
        assert!(packed.len() < text.len() / 5);
        let module = unpacker().expect("a module");
        assert!(module.starts_with(b"\0asm") && module.len() < 3000);
    }
}
