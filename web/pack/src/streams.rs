//! A program taken apart into streams, each of one sort of bytes, which leave a tenth less when they are packed than the program in
//! one piece; `unpack.wat` joins them again.
use crate::instruction::{ADDRESS, ALIGNMENTS, CLASSES, Follows, class_before, instructions};
use crate::parts::{bodies, leb128, sections};
use anyhow::{Context, Result, ensure};

/// How many streams there are, and the numbers of those that no instruction names: what comes before the bodies of functions, the codes
/// of instructions, the declarations of locals, addresses behind the constants of each class, and what comes behind the bodies.
pub(crate) const STREAMS: usize = LAST + 1;
const CODES: usize = 1;
const DECLARATIONS: usize = 2;
const ADDRESSES: usize = Follows::Constant as usize + CLASSES as usize;
pub(crate) const LAST: usize = ADDRESSES + 1;

/// The most bytes of a body: the unpacker keeps so much of every stream in stock, less what it joins between two looks.
const LONGEST_BODY: usize = 131_072 - 16_384;

/// What is packed.
#[derive(Default)]
pub(crate) struct Apart {
    pub(crate) functions: usize,
    /// Of all bodies with their sizes in front.
    pub(crate) code_bytes: usize,
    pub(crate) streams: [Vec<u8>; STREAMS],
}

/// How each instruction is read, as a table for the unpacker: what follows it, and the class of a constant before it in the upper four
/// bits.
pub(crate) fn table() -> [u8; 256] {
    let mut table = [0; 256];
    for (code, entry) in (0..=255).zip(&mut table) {
        *entry = Follows::of(code).map_or(0, |f| f as u8) | class_before(code) << 4;
    }
    table[usize::from(ADDRESS)] = Follows::Address as u8 | class_before(0x41) << 4;
    table
}

/// Takes `module` apart. Before it, in the same stream, stands `front`.
pub(crate) fn apart(front: &[u8], module: &[u8]) -> Result<Apart> {
    let mut apart = Apart::default();
    apart.streams[0].extend_from_slice(front);
    apart.streams[0].extend_from_slice(module.get(..8).context("not a WebAssembly module")?);
    let mut part = 0;
    for section in sections(module)? {
        if section.id != 10 {
            apart.streams[part].extend_from_slice(section.whole);
            continue;
        }
        let (count, rest) = leb128(section.bytes).context("the code ends early")?;
        let head = section.whole.len() - rest.len();
        apart.streams[0].extend_from_slice(&section.whole[..head]);
        (apart.functions, apart.code_bytes, part) = (count, rest.len(), LAST);
        for body in bodies(section.bytes)? {
            ensure!(
                body.len() <= LONGEST_BODY,
                "a function has {} bytes, and the unpacker takes {LONGEST_BODY}: divide it",
                body.len()
            );
            put(&mut apart.streams, body)?;
        }
    }
    Ok(apart)
}

fn put(streams: &mut [Vec<u8>; STREAMS], body: &[u8]) -> Result<()> {
    let (declarations, rest) = declarations(body)?;
    streams[DECLARATIONS].extend_from_slice(declarations);
    let list = instructions(rest)?;
    for (i, instruction) in list.iter().enumerate() {
        let address = instruction.follows == Follows::Constant && instruction.numbers.len() == 4;
        streams[CODES].push(if address { ADDRESS } else { instruction.code });
        streams[CODES].extend_from_slice(instruction.beside);
        let stream = match instruction.follows {
            Follows::Nothing | Follows::Block | Follows::End => continue,
            _ if address => ADDRESSES,
            Follows::Constant => {
                let next = list.get(i + 1).context("a body ends with a constant")?;
                Follows::Constant as usize + usize::from(class_before(next.code))
            }
            Follows::TwoOthers | Follows::SecondCode => Follows::Other as usize,
            follows => follows as usize,
        };
        streams[stream].extend_from_slice(instruction.numbers);
    }
    Ok(())
}

/// The declarations of a body, and its instructions.
pub(crate) fn declarations(body: &[u8]) -> Result<(&[u8], &[u8])> {
    let (count, mut rest) = leb128(body).context("a body ends early")?;
    ensure!(count < 64, "{count} groups of locals");
    for _ in 0..count {
        let (_, after) = leb128(rest).context("declarations end early")?;
        rest = after.get(1..).context("declarations end early")?;
    }
    Ok(body.split_at(body.len() - rest.len()))
}

/// The natural alignment of a load or store.
pub(crate) fn alignment(code: u8) -> u8 {
    ALIGNMENTS[usize::from(code - 0x28)]
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn each_sort_of_bytes_has_its_stream() {
        let module = wat::parse_str(
            "(module (memory 1) (data (i32.const 0) \"z\") (func (param i32) (local f64)
               (block (i32.store offset=9 (local.get 0) (i32.add (i32.const 5) (i32.load offset=300 (i32.const 6)))))
               (local.set 1 (f64.const 1)) (drop (i32.const 70)) (drop (i32.const 1048576))))",
        )
        .expect("a module");
        let apart = apart(b"front", &module).expect("apart");
        assert_eq!(apart.functions, 1);
        let of = |follows: Follows| &apart.streams[follows as usize][..];
        assert!(apart.streams[0].starts_with(b"front\0asm"));
        assert_eq!(apart.streams[CODES], b"\x02\x40\x20\x41\x41\x28\x6a\x36\x0b\x44\x21\x41\x1a\x06\x1a\x0b");
        assert_eq!(apart.streams[ADDRESSES], b"\x80\x80\xc0\0");
        assert_eq!(apart.streams[DECLARATIONS], b"\x01\x01\x7c");
        assert_eq!(of(Follows::Local), [0, 1]);
        assert_eq!(of(Follows::Load), [0xac, 2]);
        assert_eq!(of(Follows::Store), [9]);
        assert_eq!(of(Follows::Float), 1_f64.to_le_bytes());
        let constants = |class: usize| &apart.streams[Follows::Constant as usize + class][..];
        assert_eq!(constants(8), [5], "before another constant");
        assert_eq!(constants(0), [6, 0xc6, 0], "before a load and a drop");
        assert!(apart.streams[LAST].starts_with(b"\x0b"));
        // A size in front, 16 codes and types, 3 declarations, 21 bytes of numbers and constants, and two alignments.
        assert_eq!(apart.code_bytes, 1 + 16 + 3 + 21 + 2);
    }

    #[test]
    fn the_table_tells_what_follows_and_what_a_constant_is_for() {
        let table = table();
        assert_eq!((table[0x20], table[0x6a], table[0x36], table[0x06]), (0x73, 0x10, 0x35, 0x8f));
    }
}
