//! Plans of older versions. A migration works on the tree before it has a meaning, so only the newest typed plan
//! exists. Each gets a file of its own, with a fixture of before and after; version 1 is the first, so the table is
//! empty.

use super::tree::Node;

/// What takes a plan from one version to the next.
pub(super) struct Migration {
    /// The version it reads; it leaves the one after.
    pub(super) from: u64,
    /// The change, and a sentence (without a full stop) for each thing that it changed.
    pub(super) apply: fn(Node) -> (Node, Vec<String>),
}

pub(super) static MIGRATIONS: &[Migration] = &[];

/// The tree as version `newest`, with a sentence for each thing changed on the way; nothing when no chain of
/// migrations leads from `version` to `newest`.
pub(super) fn bring_up(
    mut tree: Node,
    version: u64,
    newest: u64,
    table: &[Migration],
) -> Option<(Node, Vec<String>)> {
    let mut notes = Vec::new();
    let mut now = version;
    while now < newest {
        let migration = table.iter().find(|migration| migration.from == now)?;
        let (changed, said) = (migration.apply)(tree);
        tree = changed;
        notes.extend(said);
        now += 1;
    }
    (now == newest).then_some((tree, notes))
}

#[cfg(test)]
mod tests {
    use super::super::tree;
    use super::*;

    fn rename(tree: Node, from: &str, to: &str) -> (Node, Vec<String>) {
        let Node::Map(mut entries) = tree else { return (tree, Vec::new()) };
        let mut notes = Vec::new();
        for (key, _) in entries.iter_mut().filter(|(key, _)| key == from) {
            *key = to.into();
            notes.push(format!("`{from}` is now called `{to}`"));
        }
        (Node::Map(entries), notes)
    }

    static TABLE: [Migration; 2] = [
        Migration { from: 1, apply: |tree| rename(tree, "heading", "title") },
        Migration { from: 2, apply: |tree| rename(tree, "title", "question") },
    ];

    #[test]
    fn migrations_run_one_after_the_other_and_say_what_they_did() {
        let old = tree::read(r#"{ "heading": "x", "site": {} }"#).unwrap();
        let (new, notes) = bring_up(old, 1, 3, &TABLE).unwrap();
        assert_eq!(new, tree::read(r#"{ "question": "x", "site": {} }"#).unwrap());
        assert_eq!(notes, ["`heading` is now called `title`", "`title` is now called `question`"]);
    }

    #[test]
    fn a_gap_or_a_newer_version_has_no_way() {
        let tree = || tree::read("{}").unwrap();
        assert!(bring_up(tree(), 0, 3, &TABLE).is_none());
        assert!(bring_up(tree(), 4, 3, &TABLE).is_none());
        assert_eq!(bring_up(tree(), 3, 3, &TABLE), Some((tree(), Vec::new())));
    }

    #[test]
    fn every_version_before_the_newest_has_its_migration() {
        let newest = super::super::PLAN_VERSION;
        assert!((1..newest).eq(MIGRATIONS.iter().map(|migration| migration.from)));
    }
}
