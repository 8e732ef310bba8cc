//! The site's own records: what is read from hostile files, what the sums stand on, and how they are reconciled with the
//! plan's postings.

#![allow(clippy::unwrap_used, reason = "a test that cannot read its own files has failed")]

mod balance;
mod generated;
mod hostile;
mod reconciled;
mod sums;

use thimbleworth::account::{Account, account_text};
use thimbleworth::example::EXAMPLES;
use thimbleworth::log::{Names, Reader, Reading, Remark, Unread};

fn harbour() -> Account {
    let account = account_text(EXAMPLES[0].text);
    assert!(!account.broken());
    account
}

fn names(account: &Account) -> Names {
    Names::of(account.plan.as_ref().unwrap(), account.program.as_ref().unwrap())
}

/// Reads a text in pieces of a size.
fn in_pieces(name: &str, text: &[u8], piece: usize) -> (Result<Reading, Unread>, Names, Vec<Remark>) {
    let mut reader = Reader::new(name, names(&harbour()), &[]);
    let mut remarks = Vec::new();
    for piece in text.chunks(piece) {
        reader.feed(piece);
        remarks.extend(reader.take_remarks());
    }
    let (reading, names, rest) = reader.finish();
    remarks.extend(rest);
    (reading, names, remarks)
}

fn read(name: &str, text: &[u8]) -> (Reading, Names, Vec<Remark>) {
    let (reading, names, remarks) = in_pieces(name, text, text.len().max(1));
    (reading.unwrap(), names, remarks)
}

fn refused(remarks: &[Remark]) -> Vec<(u64, &str)> {
    remarks
        .iter()
        .filter(|r| r.refused())
        .map(|r| match r.what {
            thimbleworth::log::Verdict::Refused(why) => (r.line, why.words()[0]),
            thimbleworth::log::Verdict::Changed(_) => (r.line, ""),
        })
        .collect()
}
