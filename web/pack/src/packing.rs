//! The program as text: packed with LZMA, which leaves a quarter less than gzip, and written in signs that stand for
//! themselves in a script. What unpacks it again is a small module of its own, `unpack.wat`, and `web/boot.js`.
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
    Ok(wat::parse_str(include_str!("unpack.wat"))?)
}

/// The bytes in 91 signs: their number, a colon, then two signs for every thirteen bits, lowest first.
///
/// The signs are those from '#' on; '!' stands for '<' and '~' for the backslash, which mean something in a script.
pub(crate) fn signs(bytes: &[u8]) -> String {
    let mut out = format!("{}:", bytes.len());
    let (mut held, mut bits) = (0_u32, 0);
    let mut put = |thirteen: u32| {
        for digit in [thirteen % 91, thirteen / 91] {
            out.push(match b'#' + u8::try_from(digit).unwrap_or(0) {
                b'<' => '!',
                b'\\' => '~',
                sign => char::from(sign),
            });
        }
    };
    for &byte in bytes {
        held |= u32::from(byte) << bits;
        bits += 8;
        if bits >= 13 {
            put(held & 0x1fff);
            held >>= 13;
            bits -= 13;
        }
    }
    if bits > 0 {
        put(held);
    }
    out
}

#[cfg(test)]
mod tests {
    use super::*;

    /// The reading of `web/boot.js`, line by line.
    fn unsigned(text: &str) -> Vec<u8> {
        let (count, signs) = text.split_once(':').expect("a colon");
        let count: usize = count.parse().expect("a number");
        let value = |sign: u8| {
            u32::from(
                if sign == b'!' {
                    b'<'
                } else if sign == b'~' {
                    b'\\'
                } else {
                    sign
                } - b'#',
            )
        };
        let (mut out, mut held, mut bits) = (Vec::new(), 0_u32, 0);
        for pair in signs.as_bytes().chunks(2) {
            held |= (value(pair[0]) + value(pair[1]) * 91) << bits;
            bits += 13;
            while bits >= 8 && out.len() < count {
                out.push((held & 0xff) as u8);
                held >>= 8;
                bits -= 8;
            }
        }
        out
    }

    #[test]
    fn every_byte_comes_back_from_its_signs() {
        for length in [0, 1, 2, 12, 13, 14, 1000] {
            let bytes: Vec<u8> = (0..length).map(|n: usize| (n * 167 % 256) as u8).collect();
            let text = signs(&bytes);
            assert!(text.bytes().all(|b| (0x21..0x7f).contains(&b) && !b"\"<\\".contains(&b)), "{text}");
            assert_eq!(unsigned(&text), bytes);
        }
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
