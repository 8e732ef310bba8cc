use super::*;
use crate::document::blank;
use thimbleworth::plan::Plan;

fn document() -> Document {
    let mut plan = blank();
    let route = &mut plan.workloads[0].routes[0];
    route.steps.push(new_step("soxhlet").expect("a technique"));
    route.steps.push(new_step("rinse").expect("a technique"));
    route.steps[0].fields = vec![
        (
            "solvent".into(),
            Field::Rows(vec![("oil".into(), "50 %".into()), ("acetone".into(), "50 %".into())]),
        ),
        ("lost_to".into(), Field::Text("solvents".into())),
        ("charge".into(), Field::Text("solvents".into())),
    ];
    route.ends = vec![("marc".into(), "solids".into()), ("liquor".into(), "solvents".into())];
    plan.workloads[0].feed = vec![("oil".into(), "1 g".into())];
    plan.materials.push(thimbleworth::plan::OwnMaterial { name: "oil".into(), fields: Vec::new() });
    let row = |name: &str, amount: &str| Field::Rows(vec![(name.into(), amount.into())]);
    plan.site.money =
        vec![("prices".into(), row("oil", "4 USD/L")), ("disposal".into(), row("solvents", "2 USD/kg"))];
    plan.site.climate = vec![("incinerated".into(), row("solvents", "100 %"))];
    Document::new(plan, 0)
}

fn done(change: Change) -> Document {
    let shown = format!("{change:?}");
    let mut after = document();
    assert!(Edit::list(change).apply(&mut after), "{shown}");
    assert_parallel(&after);
    after
}

/// The ids stand beside the plan's lists, and none is given twice.
fn assert_parallel(document: &Document) {
    let Document { plan, ids } = document;
    assert_eq!(plan.site.streams.len(), ids.streams.len());
    assert_eq!(plan.materials.len(), ids.materials.len());
    assert_eq!(plan.workloads.len(), ids.workloads.len());
    let mut all: Vec<u32> = ids.streams.iter().chain(&ids.materials).copied().collect();
    for (workload, beside) in plan.workloads.iter().zip(&ids.workloads) {
        assert_eq!(workload.routes.len(), beside.routes.len());
        all.push(beside.id);
        for (route, beside) in workload.routes.iter().zip(&beside.routes) {
            assert_eq!(route.steps.len(), beside.steps.len());
            all.push(beside.id);
            all.extend(&beside.steps);
        }
    }
    let given = all.len();
    all.sort_unstable();
    all.dedup();
    assert_eq!(all.len(), given);
}

const ITEMS: [Item; 5] =
    [Item::Stream(0), Item::Material(0), Item::Workload(0), Item::Route(0, 0), Item::Step(0, 0, 0)];

#[test]
fn every_list_can_be_added_to_copied_and_taken_from() {
    for item in ITEMS {
        let before = list::count(&document(), item);
        let added = done(Change::Add(item, "dry".into()));
        assert_eq!(list::count(&added, item), before + 1);
        let copied = done(Change::Duplicate(item));
        assert_eq!(list::count(&copied, item), before + 1);
        let gone = done(Change::Remove(item));
        assert_eq!(list::count(&gone, item), before - 1);
        let names: Vec<&str> = (0..=before).filter_map(|i| name_of(&copied.plan, item.at(i))).collect();
        if !matches!(item, Item::Step(..)) {
            let mut unique = names.clone();
            unique.sort_unstable();
            unique.dedup();
            assert_eq!(unique.len(), names.len(), "a copy has a name of its own: {names:?}");
        }
    }
}

#[test]
fn moving_carries_the_id_along_and_stops_at_the_ends() {
    let before = document();
    let after = done(Change::Move(Item::Step(0, 0, 1), true));
    assert_eq!(after.plan.workloads[0].routes[0].steps[0].technique, "rinse");
    assert_eq!(after.ids.workloads[0].routes[0].steps[0], before.ids.workloads[0].routes[0].steps[1]);
    for (item, up) in [(Item::Step(0, 0, 0), true), (Item::Step(0, 0, 1), false), (Item::Route(0, 0), false)]
    {
        let mut same = document();
        assert!(!Edit::list(Change::Move(item, up)).apply(&mut same));
        assert_eq!(same, before);
    }
}

#[test]
fn references_follow_a_stream_that_is_renamed() {
    let mut after = document();
    assert!(Edit::rename(Item::Stream(0), "drum").apply(&mut after));
    let route = &after.plan.workloads[0].routes[0];
    assert_eq!(route.ends[1].1, "drum");
    assert_eq!(route.ends[0].1, "solids");
    assert_eq!(route.steps[0].fields[1].1, Field::Text("drum".into()));
    assert_eq!(route.steps[0].fields[2].1, Field::Text("solvents".into()), "an amount is no reference");
    let site = &after.plan.site;
    assert_eq!(site.money[1].1, Field::Rows(vec![("drum".into(), "2 USD/kg".into())]));
    assert_eq!(site.climate[0].1, Field::Rows(vec![("drum".into(), "100 %".into())]));
}

#[test]
fn references_follow_a_material_and_a_route_that_are_renamed() {
    let mut after = document();
    Edit::rename(Item::Material(0), "hop oil").apply(&mut after);
    assert_eq!(after.plan.workloads[0].feed[0].0, "hop oil");
    assert_eq!(
        after.plan.workloads[0].routes[0].steps[0].fields[0].1,
        Field::Rows(vec![("hop oil".into(), "50 %".into()), ("acetone".into(), "50 %".into())])
    );
    assert_eq!(after.plan.site.money[0].1, Field::Rows(vec![("hop oil".into(), "4 USD/L".into())]));
    Edit::rename(Item::Route(0, 0), "Soxhlet").apply(&mut after);
    assert_eq!(after.plan.workloads[0].present, "Soxhlet");
}

#[test]
fn a_name_is_refused_when_it_is_empty_or_taken() {
    let plan: Plan = document().plan;
    assert_eq!(refusal(&plan, Item::Stream(0), " ").as_deref(), Some("Enter a name for the stream."));
    assert_eq!(
        refusal(&plan, Item::Stream(0), "solids").as_deref(),
        Some("Another stream is called “solids”. Enter a name of its own.")
    );
    assert_eq!(refusal(&plan, Item::Stream(0), "solvents"), None, "its own name");
}

#[test]
fn the_present_route_is_handed_on_when_it_goes() {
    let mut after = document();
    Edit::list(Change::Duplicate(Item::Route(0, 0))).apply(&mut after);
    Edit::list(Change::Remove(Item::Route(0, 0))).apply(&mut after);
    assert_eq!(after.plan.workloads[0].present, "Present route 2");
    Edit::list(Change::Remove(Item::Route(0, 0))).apply(&mut after);
    assert_eq!(after.plan.workloads[0].present, "");
    Edit::list(Change::Add(Item::Route(0, 0), String::new())).apply(&mut after);
    assert_eq!(after.plan.workloads[0].present, "Route");
}

#[test]
fn actions_are_named_in_words() {
    let named = |change| Edit::list(change).name;
    assert_eq!(named(Change::Add(Item::Step(0, 0, 0), "dry".into())), "add step");
    assert_eq!(named(Change::Move(Item::Route(0, 0), true)), "move route up");
    assert_eq!(Edit::set("x", "Solvent in the flask", None).name, "change solvent in the flask");
    assert_eq!(Edit::set("x", "CO2 left in the marc", None).name, "change CO2 left in the marc");
    assert_eq!(Edit::rename(Item::Stream(0), "x").name, "rename stream");
    for (under, label, name) in [
        ("money", "An hour of labour", "change an hour of labour"),
        ("climate", "Share that is burnt", "change share that is burnt"),
    ] {
        let fields = thimbleworth::program::SITE_FIELDS.iter().find(|g| g.0 == under).unwrap().2;
        let p = fields.iter().find(|p| p.label == label).unwrap();
        assert_eq!(Edit::set("x", p.label, None).name, name);
    }
}

#[test]
fn focus_goes_to_what_was_added_and_to_the_neighbour_of_what_is_gone() {
    let focus = |change: Change| {
        let mut after = document();
        let edit = Edit::list(change);
        edit.apply(&mut after);
        edit.focus(&after)
    };
    let step = |s| format!("workloads[0].routes[0].steps[{s}]");
    assert_eq!(focus(Change::Add(Item::Step(0, 0, 0), "dry".into())), Some(step(2)));
    assert_eq!(focus(Change::Duplicate(Item::Step(0, 0, 0))), Some(step(1)));
    assert_eq!(focus(Change::Remove(Item::Step(0, 0, 0))), Some(step(0)));
    assert_eq!(focus(Change::Remove(Item::Step(0, 0, 1))), Some(step(0)));
    assert_eq!(focus(Change::Move(Item::Step(0, 0, 1), true)), Some(format!("{}-move-up", step(0))));
    assert_eq!(focus(Change::Remove(Item::Route(0, 0))).as_deref(), Some("workloads[0].routes"));
}

#[test]
fn an_unknown_technique_adds_nothing() {
    let mut after = document();
    assert!(!Edit::list(Change::Add(Item::Step(0, 0, 0), "alchemy".into())).apply(&mut after));
    assert_eq!(after, document());
}

#[test]
fn how_a_file_is_read_is_kept_once_for_each_file() {
    let mut after = document();
    for register in ["purchases", "stock count"] {
        let log = Log { name: "a.csv".into(), register: register.into(), ..Log::default() };
        let edit = Edit::list(Change::Log(Box::new(log)));
        assert_eq!(edit.name, "change how a.csv is read");
        assert!(edit.apply(&mut after));
    }
    assert_eq!(after.plan.logs.len(), 1);
    assert_eq!(after.plan.logs[0].register, "stock count");
}
