//! The same program with similar functions side by side, so that what repeats lies near; and without what only tools read.
use crate::instruction::{Follows, Instruction, instructions};
use crate::parts::{bodies, leb128, sections};
use crate::streams::{alignment, declarations};
use anyhow::{Context, Result, bail, ensure};
use std::collections::{BTreeMap, BTreeSet};

/// So many codes in a row are compared.
const RUN: usize = 8;
/// Rows of codes that more functions share than this say nothing about any of them.
const COMMON: usize = 400;

/// Orders the functions of `module` and numbers them anew wherever they are named. Alignments become the natural ones: they are hints
/// and mean nothing.
pub(crate) fn ordered(module: &[u8]) -> Result<Vec<u8>> {
    let sections = sections(module)?;
    let find = |id| sections.iter().find(|s| s.id == id).map(|s| s.bytes);
    let Some(code) = find(10) else { return Ok(module.to_vec()) };
    let (imported, _) = leb128(find(2).unwrap_or(&[0])).context("the imports end early")?;
    let bodies = bodies(code)?;
    let mut functions = Vec::with_capacity(bodies.len());
    for body in &bodies {
        let (declared, rest) = declarations(body)?;
        functions.push((declared, instructions(rest)?));
    }
    let order = order(&functions);
    // numbers[old] = new
    let mut numbers: Vec<usize> = (0..imported + order.len()).collect();
    for (new, old) in order.iter().enumerate() {
        numbers[imported + old] = imported + new;
    }
    let mut out = module[..8].to_vec();
    for section in &sections {
        let bytes = match section.id {
            0 => continue,
            2 => {
                ensure!(only_functions(section.bytes)?, "the program imports more than functions");
                section.bytes.to_vec()
            }
            3 => types(section.bytes, &order)?,
            7 => exports(section.bytes, &numbers)?,
            8 => number(section.bytes, &numbers)?.0,
            9 => elements(section.bytes, &numbers)?,
            10 => code_section(&functions, &order, &numbers)?,
            _ => section.bytes.to_vec(),
        };
        out.push(section.id);
        write(&mut out, bytes.len());
        out.extend(bytes);
    }
    Ok(out)
}

/// Beginning with the first function, the one most like the last that is not there yet, where the one before the last counts half as much
/// and so on; where there is none, the first that is left.
fn order(functions: &[(&[u8], Vec<Instruction<'_>>)]) -> Vec<usize> {
    let codes: Vec<Vec<u8>> =
        functions.iter().map(|(_, list)| list.iter().map(|i| i.code).collect()).collect();
    let runs: Vec<BTreeSet<&[u8]>> = codes.iter().map(|codes| codes.windows(RUN).collect()).collect();
    let mut sharing: BTreeMap<&[u8], Vec<usize>> = BTreeMap::new();
    for (f, runs) in runs.iter().enumerate() {
        for run in runs {
            sharing.entry(run).or_default().push(f);
        }
    }
    sharing.retain(|_, functions| (2..=COMMON).contains(&functions.len()));
    let mut left = vec![true; functions.len()];
    let mut order = Vec::with_capacity(functions.len());
    // How much of what a function has was met lately, for those that have any of it.
    let mut alike = vec![0_u64; functions.len()];
    let mut met: Vec<usize> = Vec::new();
    let mut first = 0;
    while first < functions.len() {
        let per_run = |f: usize, last: usize| alike[f] * 1024 / runs[f].len().max(runs[last].len()) as u64;
        let best = order
            .last()
            .and_then(|&last| met.iter().copied().max_by_key(|&f| (per_run(f, last), std::cmp::Reverse(f))));
        let f = best.unwrap_or(first);
        left[f] = false;
        order.push(f);
        while first < functions.len() && !left[first] {
            first += 1;
        }
        met.retain(|&other| {
            alike[other] /= 2;
            left[other] && alike[other] > 0
        });
        for others in runs[f].iter().filter_map(|run| sharing.get(run)) {
            // The rarer a run, the more it says.
            let weight = u64::from(1024 / (others.len() as u32 + 1).ilog2());
            for &other in others.iter().filter(|other| left[**other]) {
                if alike[other] == 0 {
                    met.push(other);
                }
                alike[other] += weight;
            }
        }
    }
    order
}

fn code_section(
    functions: &[(&[u8], Vec<Instruction<'_>>)],
    order: &[usize],
    numbers: &[usize],
) -> Result<Vec<u8>> {
    let mut out = Vec::new();
    write(&mut out, order.len());
    for &f in order {
        let (declared, list) = &functions[f];
        let mut body = declared.to_vec();
        for instruction in list {
            body.push(instruction.code);
            body.extend_from_slice(instruction.beside);
            if matches!(instruction.follows, Follows::Load | Follows::Store) {
                body.push(alignment(instruction.code));
            }
            if matches!(instruction.code, 0x10 | 0xd2) {
                body.extend(number(instruction.numbers, numbers)?.0);
            } else {
                body.extend_from_slice(instruction.numbers);
            }
        }
        write(&mut out, body.len());
        out.extend(body);
    }
    Ok(out)
}

/// The new number of a function, and what follows it.
fn number<'a>(bytes: &'a [u8], numbers: &[usize]) -> Result<(Vec<u8>, &'a [u8])> {
    let (old, rest) = leb128(bytes).context("the number of a function ends early")?;
    let mut out = Vec::new();
    write(&mut out, *numbers.get(old).with_context(|| format!("there is no function {old}"))?);
    Ok((out, rest))
}

/// A vector: its length, then each entry by `entry`, which gives what it writes and what follows.
pub(crate) fn vector<'a>(
    bytes: &'a [u8],
    out: &mut Vec<u8>,
    mut entry: impl FnMut(&'a [u8], &mut Vec<u8>) -> Result<&'a [u8]>,
) -> Result<&'a [u8]> {
    let (count, mut rest) = leb128(bytes).context("a section ends early")?;
    write(out, count);
    for _ in 0..count {
        rest = entry(rest, out)?;
    }
    Ok(rest)
}

/// Whether nothing but functions is imported, so that their numbers begin with all imports.
fn only_functions(bytes: &[u8]) -> Result<bool> {
    let mut only = true;
    let rest = vector(bytes, &mut Vec::new(), |mut rest, _| {
        for _ in 0..2 {
            let (length, after) = leb128(rest).context("an import ends early")?;
            rest = after.get(length..).context("an import ends early")?;
        }
        only &= rest.first() == Some(&0);
        Ok(leb128(rest.get(1..).context("an import ends early")?).context("an import ends early")?.1)
    })?;
    Ok(only && rest.is_empty())
}

fn types(bytes: &[u8], order: &[usize]) -> Result<Vec<u8>> {
    let mut types = Vec::new();
    let rest = vector(bytes, &mut Vec::new(), |rest, _| {
        let (kind, rest) = leb128(rest).context("the types of functions end early")?;
        types.push(kind);
        Ok(rest)
    })?;
    ensure!(rest.is_empty() && types.len() == order.len(), "types and bodies of functions differ in number");
    let mut out = Vec::new();
    write(&mut out, types.len());
    for &f in order {
        write(&mut out, types[f]);
    }
    Ok(out)
}

fn exports(bytes: &[u8], numbers: &[usize]) -> Result<Vec<u8>> {
    let mut out = Vec::new();
    let rest = vector(bytes, &mut out, |rest, out| {
        let (length, name) = leb128(rest).context("an export ends early")?;
        let (&kind, after) =
            name.get(length..).and_then(<[u8]>::split_first).context("an export ends early")?;
        out.extend_from_slice(&rest[..rest.len() - after.len()]);
        if kind == 0 {
            let (new, after) = number(after, numbers)?;
            out.extend(new);
            return Ok(after);
        }
        let (what, after) = leb128(after).context("an export ends early")?;
        write(out, what);
        Ok(after)
    })?;
    ensure!(rest.is_empty(), "the exports have a rest");
    Ok(out)
}

/// Elements of the first table alone, from a constant place on: what the compiler makes.
fn elements(bytes: &[u8], numbers: &[usize]) -> Result<Vec<u8>> {
    let mut out = Vec::new();
    let rest = vector(bytes, &mut out, |rest, out| {
        let Some((&[0, 0x41], place)) = rest.split_first_chunk::<2>() else {
            bail!("the elements of a table are of another kind")
        };
        let (_, after) = leb128(place).context("elements end early")?;
        ensure!(after.first() == Some(&0x0b), "the place of elements is no constant");
        out.extend_from_slice(&rest[..=rest.len() - after.len()]);
        vector(&after[1..], out, |rest, out| {
            let (new, rest) = number(rest, numbers)?;
            out.extend(new);
            Ok(rest)
        })
    })?;
    ensure!(rest.is_empty(), "the elements have a rest");
    Ok(out)
}

/// A number in LEB128.
pub(crate) fn write(out: &mut Vec<u8>, mut value: usize) {
    while value >= 0x80 {
        out.push((value & 0x7f) as u8 | 0x80);
        value >>= 7;
    }
    out.push(value as u8);
}

#[cfg(test)]
mod tests {
    use super::*;

    /// The first function is like the third, and names the second.
    const PROGRAM: &str = r#"(module
        (import "" "told" (func $told (param i32)))
        (table 3 funcref)
        (elem (i32.const 1) $b $c)
        (func $a (export "a") (param i32) (result i32)
          (nop) (nop) (nop) (nop) (call $told (i32.const 7)) (i32.add (i32.mul (i32.load offset=300 align=1 (local.get 0)) (i32.const 3)) (call $b)))
        (func $b (result i32) (i32.const 300))
        (func $c (export "c") (param i32) (result i32)
          (nop) (nop) (nop) (nop) (call $told (i32.const 8)) (i32.add (i32.mul (i32.load offset=300 align=1 (local.get 0)) (i32.const 5)) (i32.const 4)))
        (memory 1))"#;

    fn of(module: &[u8], id: u8) -> Vec<u8> {
        let sections = sections(module).expect("sections");
        sections.iter().find(|s| s.id == id).expect("the section").bytes.to_vec()
    }

    #[test]
    fn similar_functions_stand_side_by_side_and_keep_their_names() {
        let module = wat::parse_str(PROGRAM).expect("a module");
        let new = ordered(&module).expect("in order");
        let (code, new_code) = (of(&module, 10), of(&new, 10));
        let (before, after) = (bodies(&code).expect("bodies"), bodies(&new_code).expect("bodies"));
        // a, c, b: the loads aligned by nature, the call of b by its new number.
        let natural = |body: &[u8], callee: u8| {
            let mut body = body.to_vec();
            let load = body.windows(2).position(|two| two == [0x28, 0]).expect("a load");
            body[load + 1] = 2;
            let call = body.len() - 4;
            if body[call..][..2] == [0x10, 2] {
                body[call + 1] = callee;
            }
            body
        };
        assert_eq!(after, [natural(before[0], 3), natural(before[2], 3), before[1].to_vec()]);
        // Imports come first: a is 1, c 2 and b 3.
        assert_eq!(of(&new, 9), [1, 0, 0x41, 1, 0x0b, 2, 3, 2]);
        assert_eq!(of(&new, 7), b"\x02\x01a\x00\x01\x01c\x00\x02");
        let kinds = of(&module, 3);
        assert_eq!(of(&new, 3), [3, kinds[1], kinds[3], kinds[2]]);
        assert_eq!(new, ordered(&module).expect("in order"), "the same again");
    }

    #[test]
    fn what_is_not_understood_is_refused() {
        let memory = wat::parse_str(r#"(module (import "" "m" (memory 1)) (func))"#).expect("a module");
        assert!(ordered(&memory).is_err());
        let passive = wat::parse_str("(module (func $a) (elem func $a))").expect("a module");
        assert!(ordered(&passive).is_err());
    }
}
