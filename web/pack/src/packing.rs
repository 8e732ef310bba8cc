//! The program as text: packed with LZMA, which leaves a quarter less than gzip, and written in characters that come
//! through as they are in a script in UTF-8. What unpacks it again is a small module, `unpack.wat`, and `web/boot.js`.
use anyhow::Result;
use lzma_rust2::{EncodeMode, LzmaOptions, LzmaWriter, MfType};
use std::io::Write;

/// The most that is looked back for a repetition: more than any program has.
const REACH_BYTES: u32 = 4 << 20;

/// A raw LZMA stream, the same bytes for the same bytes. `unpack.wat` knows its settings (lc=3, lp=0, pb=0).
pub(crate) fn pack(bytes: &[u8]) -> Result<Vec<u8>> {
    let mut options = LzmaOptions::with_preset(9);
    (options.lc, options.lp, options.pb) = (3, 0, 0);
    (options.dict_size, options.nice_len, options.depth_limit) = (REACH_BYTES, 273, 512);
    (options.mf, options.mode) = (MfType::Bt4, EncodeMode::Normal);
    let mut writer = LzmaWriter::new_no_header(Vec::new(), &options, false)?;
    writer.write_all(bytes)?;
    Ok(writer.finish()?)
}

/// The module that unpacks what [`pack`] made.
pub(crate) fn unpacker() -> Result<Vec<u8>> {
    Ok(wat::parse_str(include_str!("unpack.wat").replace("BIT\n", include_str!("bit.wat")))?)
}

/// The characters that mean something in a text in quotes in a script in a page, or do not come through as they are.
const APART: [u8; 6] = [0, b'\n', b'\r', b'"', b'<', b'\\'];

/// The bytes as characters: seven bits each, lowest first. One of [`APART`] takes the next seven bits with it into a
/// character of two bytes, 160 + 128 × its place + these. So eight bytes become just over nine, whatever they are.
pub(crate) fn signs(bytes: &[u8]) -> String {
    let mut sevens = Vec::with_capacity(bytes.len() * 8 / 7 + 1);
    let (mut held, mut bits) = (0_u32, 0);
    for &byte in bytes {
        held |= u32::from(byte) << bits;
        bits += 8;
        while bits >= 7 {
            sevens.push((held & 0x7f) as u8);
            held >>= 7;
            bits -= 7;
        }
    }
    if bits > 0 {
        sevens.push((held & 0x7f) as u8);
    }
    let mut out = String::with_capacity(sevens.len());
    let mut rest = sevens.into_iter();
    while let Some(seven) = rest.next() {
        match APART.iter().position(|apart| *apart == seven) {
            Some(place) => {
                let next = u32::from(rest.next().unwrap_or(0));
                let place = u32::try_from(place).unwrap_or(0);
                out.extend(char::from_u32(160 + 128 * place + next));
            }
            None => out.push(char::from(seven)),
        }
    }
    out
}

#[cfg(test)]
mod tests {
    use super::*;

    /// The reading of `web/boot.js`, line by line.
    fn unsigned(text: &str, size: usize) -> Vec<u8> {
        let (mut out, mut held, mut bits) = (Vec::new(), 0_u32, 0);
        for sign in text.chars().map(u32::from) {
            if sign < 128 {
                held |= sign << bits;
                bits += 7;
            } else {
                held |= (u32::from(APART[((sign - 160) >> 7) as usize]) | ((sign - 160) & 127) << 7) << bits;
                bits += 14;
            }
            while bits >= 8 && out.len() < size {
                out.push((held & 0xff) as u8);
                held >>= 8;
                bits -= 8;
            }
        }
        out
    }

    #[test]
    fn every_byte_comes_back_from_its_signs() {
        for length in [0, 1, 2, 6, 7, 8, 13, 1000, 70_000] {
            let bytes: Vec<u8> = (0..length).map(|n: usize| (n * n / 7 % 256) as u8).collect();
            let text = signs(&bytes);
            assert!(text.bytes().all(|b| !APART.contains(&b)), "{text}");
            assert!(text.len() <= length * 8 / 7 + 2, "{length} bytes became {}", text.len());
            assert_eq!(unsigned(&text, length), bytes);
        }
        // Whatever stands together: every seven bits before and after every other.
        let all: Vec<u8> = (0..=255).flat_map(|a| (0..=255).flat_map(move |b| [a, b])).collect();
        assert_eq!(unsigned(&signs(&all), all.len()), all);
    }

    #[test]
    fn packing_gives_the_same_bytes_again_and_the_other_side_is_a_small_module() {
        let text = b"the same, the same, the same and a little more of the same".repeat(40);
        let packed = pack(&text).expect("packed");
        assert_eq!(packed, pack(&text).expect("packed"));
        assert!(packed.len() < text.len() / 10);
        let module = unpacker().expect("a module");
        assert!(module.starts_with(b"\0asm") && module.len() < 2000);
    }
}
