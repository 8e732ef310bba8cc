//! From a tree to a typed plan, as far as it goes. Nothing is reported here: what does not fit has been, and is kept
//! as text where it can be, so that it can be shown and mended.

use super::super::document::{
    Electricity, Field, Log, OtherWaste, OwnMaterial, Plan, Room, Route, Site, Step, Stream, Workload,
};
use super::super::keys::{ROOM, STEP};
use super::super::tree::Node;

/// The value of a key; of a key written twice the first.
fn get<'n>(node: &'n Node, key: &str) -> Option<&'n Node> {
    entries(node).iter().find(|(name, _)| name == key).map(|(_, value)| value)
}

fn entries(node: &Node) -> &[(String, Node)] {
    match node {
        Node::Map(entries) => entries,
        Node::Null | Node::YesNo(_) | Node::Number(_) | Node::Text(_) | Node::List(_) => &[],
    }
}

fn plain(node: &Node) -> Option<String> {
    match node {
        Node::Text(text) | Node::Number(text) => Some(text.clone()),
        Node::Null | Node::YesNo(_) | Node::List(_) | Node::Map(_) => None,
    }
}

fn text(node: &Node, key: &str) -> Option<String> {
    get(node, key).and_then(plain)
}

fn required(node: &Node, key: &str) -> String {
    text(node, key).unwrap_or_default()
}

fn yes_no(node: &Node, key: &str) -> Option<bool> {
    match get(node, key)? {
        Node::YesNo(yes) => Some(*yes),
        Node::Null | Node::Number(_) | Node::Text(_) | Node::List(_) | Node::Map(_) => None,
    }
}

fn field(node: &Node) -> Field {
    match node {
        Node::Text(text) => Field::Text(text.clone()),
        Node::Number(number) => Field::Number(number.clone()),
        Node::YesNo(yes) => Field::YesNo(*yes),
        Node::Map(_) => Field::Rows(rows(node)),
        Node::Null | Node::List(_) => Field::Text(String::new()),
    }
}

/// The fields of an object that is kept as it is written.
fn fields(node: &Node, key: &str) -> Vec<(String, Field)> {
    let inner = get(node, key).map(entries).unwrap_or_default();
    inner.iter().map(|(key, value)| (key.clone(), field(value))).collect()
}

fn rows(node: &Node) -> Vec<(String, String)> {
    entries(node).iter().map(|(name, value)| (name.clone(), plain(value).unwrap_or_default())).collect()
}

fn list<T>(node: &Node, key: &str, item: fn(&Node) -> T) -> Vec<T> {
    match get(node, key) {
        Some(Node::List(items)) => items.iter().map(item).collect(),
        _ => Vec::new(),
    }
}

pub(super) fn plan(node: &Node) -> Plan {
    Plan {
        title: required(node, "title"),
        notes: text(node, "notes"),
        seed: get(node, "seed").map(field),
        site: get(node, "site").map(site).unwrap_or_default(),
        materials: get(node, "materials").map(materials).unwrap_or_default(),
        workloads: list(node, "workloads", workload),
        logs: list(node, "logs", log),
    }
}

fn log(node: &Node) -> Log {
    Log {
        name: required(node, "name"),
        register: required(node, "register"),
        columns: get(node, "columns").map(rows).unwrap_or_default(),
        dates: text(node, "dates"),
        decimals: text(node, "decimals"),
        uncertainty: text(node, "uncertainty"),
        means: get(node, "means").map(rows).unwrap_or_default(),
    }
}

fn site(node: &Node) -> Site {
    Site {
        name: required(node, "name"),
        rules: text(node, "rules"),
        as_of: text(node, "as_of"),
        bench_temperature: text(node, "bench_temperature"),
        drain_permit: text(node, "drain_permit"),
        electricity: get(node, "electricity").map(|node| Electricity {
            climate: text(node, "climate"),
            price: text(node, "price"),
            year: get(node, "year").map(field),
            boundary: text(node, "boundary"),
            source: text(node, "source"),
        }),
        room: get(node, "room").map(|node| {
            let mut room = Room::default();
            for key in ROOM.keys {
                room.set(key.name, text(node, key.name));
            }
            room
        }),
        streams: list(node, "streams", stream),
        activity: text(node, "activity"),
        other_waste: list(node, "other_waste", other_waste),
        storage_limit: text(node, "storage_limit"),
        pick_up_every: text(node, "pick_up_every"),
        far_receiver: yes_no(node, "far_receiver"),
        deviations: text(node, "deviations"),
        money: fields(node, "money"),
        hours: fields(node, "hours"),
        climate: fields(node, "climate"),
    }
}

fn other_waste(node: &Node) -> OtherWaste {
    OtherWaste {
        name: required(node, "name"),
        each_month: required(node, "each_month"),
        months: text(node, "months"),
        acute: yes_no(node, "acute"),
    }
}

fn stream(node: &Node) -> Stream {
    Stream {
        name: required(node, "name"),
        holds: text(node, "holds"),
        container: text(node, "container"),
        fill: text(node, "fill"),
        bulk_density: text(node, "bulk_density"),
        treatment: text(node, "treatment"),
        ph: text(node, "ph"),
        flash_point: text(node, "flash_point"),
        unused: yes_no(node, "unused"),
        made_of: text(node, "made_of"),
        density_mark: get(node, "density_mark").map(field),
        area: text(node, "area"),
        counted: text(node, "counted"),
        goes_round: text(node, "goes_round"),
        saturation: text(node, "saturation"),
        vented_to: text(node, "vented_to"),
    }
}

fn materials(node: &Node) -> Vec<OwnMaterial> {
    entries(node)
        .iter()
        .map(|(name, value)| OwnMaterial {
            name: name.clone(),
            fields: entries(value).iter().map(|(key, value)| (key.clone(), field(value))).collect(),
        })
        .collect()
}

fn workload(node: &Node) -> Workload {
    let batch = get(node, "batch");
    Workload {
        name: required(node, "name"),
        results_per_year: get(node, "results_per_year").map(field),
        batch_samples: batch.and_then(|node| get(node, "samples")).map(field),
        batch_controls: batch.and_then(|node| get(node, "controls")).map(field),
        repeats: text(node, "repeats"),
        repeats_bring_controls: yes_no(node, "repeats_bring_controls"),
        controls_carry_feed: yes_no(node, "controls_carry_feed"),
        feed: get(node, "feed").map(rows).unwrap_or_default(),
        months: text(node, "months"),
        present: required(node, "present"),
        routes: list(node, "routes", route),
    }
}

fn route(node: &Node) -> Route {
    Route {
        name: required(node, "name"),
        feed: get(node, "feed").map(rows),
        recovery: text(node, "recovery"),
        equivalence: text(node, "equivalence"),
        permission: text(node, "permission"),
        ph: text(node, "ph"),
        steps: list(node, "steps", step),
        ends: get(node, "ends").map(rows).unwrap_or_default(),
        time: fields(node, "time"),
        money: fields(node, "money"),
    }
}

fn step(node: &Node) -> Step {
    let declared = |name: &str| STEP.keys.iter().any(|key| key.name == name);
    Step {
        technique: required(node, "step"),
        per: text(node, "per"),
        fields: entries(node)
            .iter()
            .filter(|(name, _)| !declared(name))
            .map(|(name, value)| (name.clone(), field(value)))
            .collect(),
        measured: get(node, "measured").map(rows).unwrap_or_default(),
        note: text(node, "note"),
    }
}
