//! The instructions of a function body one by one, and how what follows each of them is read. WebAssembly core
//! specification, "Binary Format", "Instructions".
use crate::parts::leb128;
use anyhow::{Context, Result, ensure};

/// What follows an instruction. The table of `unpack.wat` holds these numbers; those from 3 to 9, 11 and 12 are also the streams
/// in which it goes (`streams.rs`).
#[derive(Clone, Copy, PartialEq, Eq, Debug)]
#[repr(u8)]
pub(crate) enum Follows {
    Nothing = 0,
    /// The type of a block, which an end closes.
    Block = 1,
    /// Nothing; closes a block or the body.
    End = 2,
    Local = 3,
    /// The alignment, which is a hint and always written as the natural one, and the offset.
    Load = 4,
    Store = 5,
    Call = 6,
    Branch = 7,
    /// The number of a global variable, a table, a memory or a function.
    Other = 8,
    /// A constant of 64 bits.
    Wide = 9,
    /// The bytes of a constant.
    Float = 10,
    /// Targets after their number less one.
    Targets = 11,
    /// A constant of 32 bits.
    Constant = 12,
    /// Two numbers of the sort of `Other`.
    TwoOthers = 13,
    /// A second code, then up to two numbers of the sort of `Other`.
    SecondCode = 14,
    /// A constant of four bytes, which as a rule is an address; only among codes that are taken apart, where it has a code of its own.
    Address = 15,
}

/// The code that stands for an address: none that the compiler makes.
pub(crate) const ADDRESS: u8 = 0x06;

/// How many groups of constants are told apart, by the instruction after them.
pub(crate) const CLASSES: u8 = 9;

/// The highest number of bytes by which loads and stores may be aligned, as a power of two, from code 0x28 on.
pub(crate) const ALIGNMENTS: [u8; 23] = [2, 3, 2, 3, 0, 0, 1, 1, 0, 0, 1, 1, 2, 2, 2, 3, 2, 3, 0, 1, 0, 1, 2];

impl Follows {
    /// None for an instruction that the compiler does not make today.
    pub(crate) const fn of(code: u8) -> Option<Self> {
        Some(match code {
            0x02..=0x04 => Self::Block,
            0x0b => Self::End,
            0x20..=0x22 => Self::Local,
            0x28..=0x35 => Self::Load,
            0x36..=0x3e => Self::Store,
            0x10 => Self::Call,
            0x0c | 0x0d => Self::Branch,
            0x23..=0x26 | 0x3f | 0x40 | 0xd0 | 0xd2 => Self::Other,
            0x42 => Self::Wide,
            0x43 | 0x44 => Self::Float,
            0x0e => Self::Targets,
            0x41 => Self::Constant,
            0x11 | 0x1c => Self::TwoOthers,
            0xfc => Self::SecondCode,
            0x00 | 0x01 | 0x05 | 0x0f | 0x1a | 0x1b | 0x45..=0xc4 | 0xd1 => Self::Nothing,
            _ => return None,
        })
    }
}

/// The group of a constant before this instruction: what it is for.
pub(crate) const fn class_before(code: u8) -> u8 {
    match code {
        0x6a => 1,
        0x71..=0x78 => 2,
        0x36..=0x3e => 3,
        0x10 => 4,
        0x46..=0x4f => 5,
        0x6b => 6,
        0x20..=0x22 => 7,
        0x41 => 8,
        _ => 0,
    }
}

/// An instruction, whose parts are slices of the body.
#[derive(Clone, Copy)]
pub(crate) struct Instruction<'a> {
    pub(crate) code: u8,
    pub(crate) follows: Follows,
    /// The type of a block, or the second code.
    pub(crate) beside: &'a [u8],
    /// The numbers that follow, without an alignment.
    pub(crate) numbers: &'a [u8],
}

/// The instructions of a body behind its declarations.
pub(crate) fn instructions(mut rest: &[u8]) -> Result<Vec<Instruction<'_>>> {
    let mut list = Vec::new();
    while let Some((&code, after)) = rest.split_first() {
        let follows = Follows::of(code)
            .with_context(|| format!("instruction {code:#04x} has no place in instruction.rs"))?;
        let (beside, after) = match follows {
            Follows::Block | Follows::SecondCode => {
                after.split_at_checked(1).context("an instruction ends early")?
            }
            Follows::Load | Follows::Store => (&[][..], numbers(after, 1)?.1),
            _ => (&[][..], after),
        };
        if follows == Follows::Block {
            // A type with parameters would be a number of more than a byte.
            ensure!(beside[0] & 0xc0 == 0x40, "a block of type {:#04x}", beside[0]);
        }
        let (numbers, after) = match follows {
            Follows::Nothing | Follows::Block | Follows::End => (&[][..], after),
            Follows::Float => {
                after.split_at_checked(if code == 0x43 { 4 } else { 8 }).context("a constant ends early")?
            }
            Follows::Targets => {
                let (count, _) = leb128(after).context("a table of targets ends early")?;
                ensure!(count < 0x80, "a table of {count} targets");
                numbers(after, count + 2)?
            }
            Follows::TwoOthers => numbers(after, 2)?,
            Follows::SecondCode => numbers(after, after_second_code(beside[0])?)?,
            _ => numbers(after, 1)?,
        };
        list.push(Instruction { code, follows, beside, numbers });
        rest = after;
    }
    Ok(list)
}

/// How many numbers follow a second code.
fn after_second_code(code: u8) -> Result<usize> {
    ensure!(code < 18, "second code {code} is not known here");
    Ok(match code {
        0..8 => 0,
        8 | 10 | 12 | 14 => 2,
        _ => 1,
    })
}

/// So many numbers in LEB128, and what follows them.
fn numbers(bytes: &[u8], count: usize) -> Result<(&[u8], &[u8])> {
    let mut left = count;
    let mut length = 0;
    while left > 0 {
        let byte = bytes.get(length).context("a number ends early")?;
        length += 1;
        left -= usize::from(byte & 0x80 == 0);
    }
    Ok(bytes.split_at(length))
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn each_instruction_is_read_with_what_follows_it() {
        // block; local.get 200; i32.load align=0 offset=300; i32.const -1; br_table 0 1; memory.copy; f64.const; end; end
        let body = b"\x02\x40\x20\xc8\x01\x28\x00\xac\x02\x41\x7f\x0e\x01\x00\x01\xfc\x0a\x00\x00\x4412345678\x0b\x0b";
        let list = instructions(body).expect("instructions");
        let read: Vec<_> = list.iter().map(|i| (i.code, i.beside, i.numbers)).collect();
        let none = &b""[..];
        assert_eq!(
            read,
            [
                (0x02, &b"\x40"[..], none),
                (0x20, none, &b"\xc8\x01"[..]),
                (0x28, none, b"\xac\x02"),
                (0x41, none, b"\x7f"),
                (0x0e, none, b"\x01\x00\x01"),
                (0xfc, b"\x0a", b"\0\0"),
                (0x44, none, b"12345678"),
                (0x0b, none, none),
                (0x0b, none, none),
            ]
        );
    }

    #[test]
    fn what_is_not_known_or_ends_early_is_refused() {
        for bad in
            [&b"\xfd\x00"[..], b"\x06\x40", b"\x20", b"\x41\x80", b"\x44123", b"\x02\x05\x0b", b"\xfc\x20"]
        {
            assert!(instructions(bad).is_err(), "{bad:?}");
        }
    }
}
