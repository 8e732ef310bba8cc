//! Saving a plan: the same plan always gives the same bytes.

use super::document::{Field, Log, OtherWaste, PLAN_VERSION, Plan, Route, Site, Step, Stream, Workload};
use super::keys::VERSION_KEY;
use super::print::print;
use super::tree::{Node, is_number};

/// The plan as a JSON document: keys in their declared order, two spaces a level, LF, a final newline, every amount as
/// it was written. An object of plain values stands on one line where it fits.
///
/// What was opened and saved is saved the same way again, and [`open`](super::open) gives back the plan that was
/// saved, as far as JSON can hold it: a field of a step must not be called `step`, `per`, `measured` or `note`, and a
/// [`Field::Number`] that is no JSON number is written as text.
///
/// ```
/// use thimbleworth::plan::{Plan, open, save};
/// let plan = Plan { title: "Trial".into(), ..Plan::default() };
/// let text = save(&plan);
/// assert!(text.starts_with("{\n  \"thimbleworth\": 1,\n  \"title\": \"Trial\",\n"));
/// assert_eq!(open(&text).plan, Some(plan));
/// ```
#[must_use]
pub fn save(plan: &Plan) -> String {
    print(&tree(plan))
}

/// The entries of an object as they are written.
#[derive(Default)]
struct Entries(Vec<(String, Node)>);

impl Entries {
    fn put(&mut self, key: &str, value: Node) {
        self.0.push((key.to_owned(), value));
    }

    fn text(&mut self, key: &str, text: &str) {
        self.put(key, Node::Text(text.to_owned()));
    }

    fn optional(&mut self, key: &str, text: Option<&String>) {
        if let Some(text) = text {
            self.text(key, text);
        }
    }

    fn yes_no(&mut self, key: &str, yes: Option<bool>) {
        if let Some(yes) = yes {
            self.put(key, Node::YesNo(yes));
        }
    }

    fn field(&mut self, key: &str, value: Option<&Field>) {
        if let Some(value) = value {
            self.put(key, field(value));
        }
    }

    fn fields(&mut self, key: &str, fields: &[(String, Field)]) {
        if !fields.is_empty() {
            let inner = fields.iter().map(|(key, value)| (key.clone(), field(value)));
            self.put(key, Node::Map(inner.collect()));
        }
    }

    fn list<T>(&mut self, key: &str, items: &[T], item: fn(&T) -> Node) {
        self.put(key, Node::List(items.iter().map(item).collect()));
    }
}

impl From<Entries> for Node {
    fn from(entries: Entries) -> Self {
        Self::Map(entries.0)
    }
}

pub(super) fn tree(plan: &Plan) -> Node {
    let mut out = Entries::default();
    out.put(VERSION_KEY, Node::Number(PLAN_VERSION.to_string()));
    out.text("title", &plan.title);
    out.optional("notes", plan.notes.as_ref());
    out.field("seed", plan.seed.as_ref());
    out.put("site", site(&plan.site));
    if !plan.materials.is_empty() {
        let mut materials = Entries::default();
        for material in &plan.materials {
            let fields = material.fields.iter().map(|(key, value)| (key.clone(), field(value)));
            materials.put(&material.name, Node::Map(fields.collect()));
        }
        out.put("materials", materials.into());
    }
    out.list("workloads", &plan.workloads, workload);
    if !plan.logs.is_empty() {
        out.list("logs", &plan.logs, log);
    }
    out.into()
}

fn log(log: &Log) -> Node {
    let mut out = Entries::default();
    out.text("name", &log.name);
    out.text("register", &log.register);
    if !log.columns.is_empty() {
        out.put("columns", rows(&log.columns));
    }
    out.optional("dates", log.dates.as_ref());
    out.optional("decimals", log.decimals.as_ref());
    out.optional("uncertainty", log.uncertainty.as_ref());
    if !log.means.is_empty() {
        out.put("means", rows(&log.means));
    }
    out.into()
}

fn site(site: &Site) -> Node {
    let mut out = Entries::default();
    out.text("name", &site.name);
    out.optional("rules", site.rules.as_ref());
    out.optional("as_of", site.as_of.as_ref());
    out.optional("bench_temperature", site.bench_temperature.as_ref());
    out.optional("drain_permit", site.drain_permit.as_ref());
    if let Some(electricity) = &site.electricity {
        let mut inner = Entries::default();
        inner.optional("climate", electricity.climate.as_ref());
        inner.optional("price", electricity.price.as_ref());
        inner.field("year", electricity.year.as_ref());
        inner.optional("boundary", electricity.boundary.as_ref());
        inner.optional("source", electricity.source.as_ref());
        out.put("electricity", inner.into());
    }
    if let Some(room) = &site.room {
        let mut inner = Entries::default();
        for (key, text) in room.given() {
            inner.text(key, text);
        }
        out.put("room", inner.into());
    }
    out.list("streams", &site.streams, stream);
    out.optional("activity", site.activity.as_ref());
    if !site.other_waste.is_empty() {
        out.list("other_waste", &site.other_waste, other_waste);
    }
    out.optional("storage_limit", site.storage_limit.as_ref());
    out.optional("pick_up_every", site.pick_up_every.as_ref());
    out.yes_no("far_receiver", site.far_receiver);
    out.optional("deviations", site.deviations.as_ref());
    out.fields("money", &site.money);
    out.fields("hours", &site.hours);
    out.fields("climate", &site.climate);
    out.into()
}

fn other_waste(other: &OtherWaste) -> Node {
    let mut out = Entries::default();
    out.text("name", &other.name);
    out.text("each_month", &other.each_month);
    out.optional("months", other.months.as_ref());
    out.yes_no("acute", other.acute);
    out.into()
}

fn stream(stream: &Stream) -> Node {
    let mut out = Entries::default();
    out.text("name", &stream.name);
    out.optional("holds", stream.holds.as_ref());
    out.optional("container", stream.container.as_ref());
    out.optional("fill", stream.fill.as_ref());
    out.optional("bulk_density", stream.bulk_density.as_ref());
    out.optional("treatment", stream.treatment.as_ref());
    out.optional("ph", stream.ph.as_ref());
    out.optional("flash_point", stream.flash_point.as_ref());
    out.yes_no("unused", stream.unused);
    out.optional("made_of", stream.made_of.as_ref());
    out.field("density_mark", stream.density_mark.as_ref());
    out.optional("area", stream.area.as_ref());
    out.optional("counted", stream.counted.as_ref());
    out.optional("goes_round", stream.goes_round.as_ref());
    out.optional("saturation", stream.saturation.as_ref());
    out.optional("vented_to", stream.vented_to.as_ref());
    out.into()
}

fn workload(workload: &Workload) -> Node {
    let mut out = Entries::default();
    out.text("name", &workload.name);
    out.field("results_per_year", workload.results_per_year.as_ref());
    if workload.batch_samples.is_some() || workload.batch_controls.is_some() {
        let mut batch = Entries::default();
        batch.field("samples", workload.batch_samples.as_ref());
        batch.field("controls", workload.batch_controls.as_ref());
        out.put("batch", batch.into());
    }
    out.optional("repeats", workload.repeats.as_ref());
    out.yes_no("repeats_bring_controls", workload.repeats_bring_controls);
    out.yes_no("controls_carry_feed", workload.controls_carry_feed);
    out.put("feed", rows(&workload.feed));
    out.optional("months", workload.months.as_ref());
    out.text("present", &workload.present);
    out.list("routes", &workload.routes, route);
    out.into()
}

fn route(route: &Route) -> Node {
    let mut out = Entries::default();
    out.text("name", &route.name);
    if let Some(feed) = &route.feed {
        out.put("feed", rows(feed));
    }
    out.optional("recovery", route.recovery.as_ref());
    out.optional("equivalence", route.equivalence.as_ref());
    out.optional("permission", route.permission.as_ref());
    out.optional("ph", route.ph.as_ref());
    out.list("steps", &route.steps, step);
    if !route.ends.is_empty() {
        out.put("ends", rows(&route.ends));
    }
    out.fields("time", &route.time);
    out.fields("money", &route.money);
    out.into()
}

fn step(step: &Step) -> Node {
    let mut out = Entries::default();
    out.text("step", &step.technique);
    out.optional("per", step.per.as_ref());
    for (key, value) in &step.fields {
        out.put(key, field(value));
    }
    if !step.measured.is_empty() {
        out.put("measured", rows(&step.measured));
    }
    out.optional("note", step.note.as_ref());
    out.into()
}

fn field(field: &Field) -> Node {
    match field {
        Field::Text(text) => Node::Text(text.clone()),
        Field::Number(number) if is_number(number) => Node::Number(number.clone()),
        Field::Number(number) => Node::Text(number.clone()),
        Field::YesNo(yes) => Node::YesNo(*yes),
        Field::Rows(list) => rows(list),
    }
}

fn rows(list: &[(String, String)]) -> Node {
    Node::Map(list.iter().map(|(name, value)| (name.clone(), Node::Text(value.clone()))).collect())
}

#[cfg(test)]
mod tests {
    use super::super::keys::{CLIMATE, HOURS, MONEY, Object, PLAN, ROOM, ROUTE_MONEY, Shape, TIME};
    use super::super::{Electricity, OwnMaterial, Room, open};
    use super::*;

    /// A field at every key of an object that is kept as it is written.
    fn every(table: &Object) -> Vec<(String, Field)> {
        let value = |shape| match shape {
            Shape::Rows => Field::Rows(vec![("a".into(), "b".into())]),
            Shape::YesNo => Field::YesNo(true),
            Shape::Word(words) => Field::Text((*words.first().unwrap()).into()),
            _ => Field::Text("c".into()),
        };
        table.keys.iter().map(|key| (key.name.to_owned(), value(key.shape))).collect()
    }

    /// A plan in which every key is used.
    fn full() -> Plan {
        let some = |text: &str| Some(text.to_owned());
        let pair = |name: &str, value: &str| vec![(name.to_owned(), value.to_owned())];
        let step = Step {
            technique: "rinse".into(),
            per: some("batch"),
            fields: vec![("charge".into(), Field::Text("40 mL".into()))],
            measured: pair("held", "2 g"),
            note: some("n"),
        };
        let route = Route {
            name: "A".into(),
            feed: Some(pair("soil", "3 g")),
            recovery: some("94 %"),
            equivalence: some("paired"),
            permission: some("p"),
            ph: some("2 to 7"),
            steps: vec![step],
            ends: pair("liquor", "flammable"),
            time: every(&TIME),
            money: every(&ROUTE_MONEY),
        };
        Plan {
            title: "t".into(),
            notes: some("n"),
            seed: Some(Field::Number("7".into())),
            site: Site {
                name: "s".into(),
                rules: some("EU"),
                as_of: some("2026-12-01"),
                bench_temperature: some("20 °C"),
                drain_permit: some("p"),
                electricity: Some(Electricity {
                    climate: some("c"),
                    price: some("p"),
                    year: Some(Field::Number("2025".into())),
                    boundary: some("b"),
                    source: some("s"),
                }),
                room: Some({
                    let mut room = Room::default();
                    for key in ROOM.keys {
                        assert!(room.set(key.name, Some(key.name.to_owned())));
                    }
                    room
                }),
                streams: vec![Stream {
                    name: "flammable".into(),
                    holds: some("liquid"),
                    container: some("20 L"),
                    fill: some("90 %"),
                    bulk_density: some("1 kg/L"),
                    treatment: some("none"),
                    ph: some("6 to 8"),
                    flash_point: some("none"),
                    unused: Some(false),
                    made_of: some("glass"),
                    density_mark: Some(Field::Number("1.2".into())),
                    area: some("satellite"),
                    counted: some("reclaimed"),
                    goes_round: some("20 kg"),
                    saturation: some("1"),
                    vented_to: some("room"),
                }],
                activity: some("food"),
                other_waste: vec![OtherWaste {
                    name: "o".into(),
                    each_month: "55 kg".into(),
                    months: some("1-5"),
                    acute: Some(false),
                }],
                storage_limit: some("365 d"),
                pick_up_every: some("60 d"),
                far_receiver: Some(true),
                deviations: some("d"),
                money: every(&MONEY),
                hours: every(&HOURS),
                climate: every(&CLIMATE),
            },
            materials: vec![OwnMaterial { name: "m".into(), fields: vec![("x".into(), Field::YesNo(true))] }],
            workloads: vec![Workload {
                name: "w".into(),
                results_per_year: Some(Field::Number("1400".into())),
                batch_samples: Some(Field::Number("13".into())),
                batch_controls: Some(Field::Text("4".into())),
                repeats: some("3 %"),
                repeats_bring_controls: Some(true),
                controls_carry_feed: Some(false),
                feed: pair("soil", "10 g"),
                months: some("2-5"),
                present: "A".into(),
                routes: vec![route],
            }],
            logs: vec![Log {
                name: "purchases.csv".into(),
                register: "purchases".into(),
                columns: pair("Volume (L)", "amount in L"),
                dates: some("day first"),
                decimals: some("comma"),
                uncertainty: some("2 %"),
                means: pair("Hexanes", "n-hexane"),
            }],
        }
    }

    /// The object's keys are those of its table, all of them, in the table's order.
    fn follows(node: &Node, table: &Object) {
        let Node::Map(entries) = node else { panic!("{} is no object", table.title) };
        let declared = |name: &str| table.keys.iter().find(|key| key.name == name);
        let written: Vec<&str> = entries.iter().map(|(name, _)| name.as_str()).collect();
        let mut expected: Vec<&str> = table.keys.iter().map(|key| key.name).collect();
        if let Some(place) = table.fields_after {
            let fields: Vec<&str> = written.iter().copied().filter(|name| declared(name).is_none()).collect();
            assert!(!fields.is_empty(), "{} without a field", table.title);
            expected.splice(place..place, fields);
        }
        assert_eq!(written, expected, "{}", table.title);
        for (name, value) in entries {
            match (declared(name).map(|key| key.shape), value) {
                (Some(Shape::Object(inner)), _) => follows(value, inner),
                (Some(Shape::Named(inner)), Node::Map(named)) => {
                    named.iter().for_each(|(_, v)| follows(v, inner));
                }
                (Some(Shape::List(inner, _)), Node::List(items)) => {
                    items.iter().for_each(|v| follows(v, inner));
                }
                _ => {}
            }
        }
    }

    #[test]
    fn a_plan_is_written_as_the_tables_declare_it_and_nothing_is_lost() {
        follows(&tree(&full()), &PLAN);
        let opened = open(&save(&full()));
        assert_eq!(opened.problems, []);
        assert_eq!(opened.plan, Some(full()));
    }

    #[test]
    fn a_number_that_json_cannot_hold_is_written_as_text() {
        let written = |number: &str| field(&Field::Number(number.into()));
        assert_eq!(written("0.10"), Node::Number("0.10".into()));
        for odd in ["", "1 ", "05", "NaN", "1e999", "1, 2", "{}", "\"1\""] {
            assert_eq!(written(odd), Node::Text(odd.into()));
        }
    }
}
