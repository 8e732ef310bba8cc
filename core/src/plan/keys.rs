//! The keys of the document, declared once: the reader checks by these tables, and the schema is made from them.
//! The order here is the order in which a plan is written.

use crate::climate::{Edition, Origin};
use crate::code::Activity;

/// The key that says that a document is a plan, and of which version.
pub(super) const VERSION_KEY: &str = "thimbleworth";

/// What may stand at a key.
#[derive(Clone, Copy, Debug)]
pub(super) enum Shape {
    /// The version of the document.
    Version,
    /// Any text.
    Text,
    /// A text that is not empty.
    Name,
    /// An amount with its unit, as text.
    Amount,
    /// A bare number, or an amount as text.
    Count,
    /// One of these words.
    Word(&'static [&'static str]),
    /// `true` or `false`.
    YesNo,
    /// Names of the user's own, each with a text.
    Rows,
    /// An object with declared keys.
    Object(&'static Object),
    /// Names of the user's own, each with an object.
    Named(&'static Object),
    /// A list of objects, and the least number of them.
    List(&'static Object, usize),
}

/// One key of an object.
#[derive(Clone, Copy, Debug)]
pub(super) struct Key {
    /// The key.
    pub(super) name: &'static str,
    /// What may stand there.
    pub(super) shape: Shape,
    /// Whether it must be written.
    pub(super) required: bool,
    /// An example, as JSON.
    pub(super) example: &'static str,
    /// What it is: completes the sentence "here stands ...".
    pub(super) what: &'static str,
}

/// One kind of object.
#[derive(Clone, Copy, Debug)]
pub(super) struct Object {
    /// What it is called in a sentence, with its article.
    pub(super) title: &'static str,
    /// Its declared keys in the order written.
    pub(super) keys: &'static [Key],
    /// How many of these keys are written before the fields that are declared elsewhere (by a technique, by the
    /// catalogue of materials); none when there are no such fields.
    pub(super) fields_after: Option<usize>,
}

const fn must(name: &'static str, shape: Shape, example: &'static str, what: &'static str) -> Key {
    Key { name, shape, required: true, example, what }
}

const fn may(name: &'static str, shape: Shape, example: &'static str, what: &'static str) -> Key {
    Key { name, shape, required: false, example, what }
}

pub(super) static PLAN: Object = Object {
    title: "a plan",
    keys: &[
        must(VERSION_KEY, Shape::Version, "1", "the version of the plan document"),
        must("title", Shape::Text, r#""Harbour sediment: leave the Soxhlet bench?""#, "the question asked"),
        may(
            "notes",
            Shape::Text,
            r#""Figures of the spring campaign""#,
            "free text that prints with the report",
        ),
        may(
            "seed",
            Shape::Count,
            "1",
            "the whole number from which draws of uncertain amounts follow; 1 when left out",
        ),
        must(
            "site",
            Shape::Object(&SITE),
            r#"{ "name": "Harbour laboratory", "streams": [] }"#,
            "the site: its rules, its date, its waste streams",
        ),
        may(
            "materials",
            Shape::Named(&MATERIAL),
            r#"{ "sorbent mix": { "density": "1.4 kg/L", "source": "supplier's sheet" } }"#,
            "materials that the plan adds to the catalogue or overrides, each with its source",
        ),
        must("workloads", Shape::List(&WORKLOAD, 1), "", "the pieces of work, at least one"),
        may(
            "logs",
            Shape::List(&LOG, 0),
            r#"[{ "name": "purchases.csv", "register": "purchases", "columns": { "Volume (L)": "amount in L" } }]"#,
            "how the site's own records are read, one entry a file",
        ),
    ],
    fields_after: None,
};

pub(super) static SITE: Object = Object {
    title: "a site",
    keys: &[
        must("name", Shape::Name, r#""Harbour laboratory""#, "the name of the site"),
        may("rules", Shape::Word(&["US", "EU", "none"]), r#""EU""#, "whose waste rules are read"),
        may("as_of", Shape::Text, r#""2026-12-01""#, "the date on which the rules are read"),
        may(
            "bench_temperature",
            Shape::Amount,
            r#""20 °C""#,
            "the temperature at which solvents are poured and stored",
        ),
        may(
            "drain_permit",
            Shape::Text,
            r#""discharge permit 7, section 2""#,
            "the named permit under which something may go down the drain",
        ),
        may(
            "electricity",
            Shape::Object(&ELECTRICITY),
            r#"{ "climate": "0.37 kg/kWh", "price": "0.14 USD/kWh", "source": "the site's own figure" }"#,
            "what the site knows of its electricity",
        ),
        may(
            "room",
            Shape::Object(&ROOM),
            r#"{ "volume": "140 m3", "air_changes": "8 /h", "hood_capture": "95 to 99 %" }"#,
            "the room in which the work happens",
        ),
        must(
            "streams",
            Shape::List(&STREAM, 0),
            r#"[{ "name": "flammable", "container": "20 L", "fill": "90 %" }]"#,
            "the waste streams that the site keeps apart",
        ),
        may(
            "activity",
            Shape::Word(Activity::WORDS),
            r#""laboratory""#,
            "the kind of work; it decides the chapter of the List of Waste; laboratory when left out",
        ),
        may(
            "other_waste",
            Shape::List(&OTHER_WASTE, 0),
            r#"[{ "name": "rest of the campus", "each_month": "55 kg" }]"#,
            "hazardous waste that the site makes beside this work; without it no category holds",
        ),
        may(
            "storage_limit",
            Shape::Amount,
            r#""365 d""#,
            "the longest that waste may be stored on site, as the nation or the permit says",
        ),
        may(
            "pick_up_every",
            Shape::Amount,
            r#""60 d""#,
            "the interval of pick-ups; left out, the fewest that keep every limit are sought",
        ),
        may(
            "far_receiver",
            Shape::YesNo,
            "false",
            "whether the receiving facility lies more than 200 miles away",
        ),
        may(
            "deviations",
            Shape::Text,
            r#""the state counts satellite containers of all rooms together""#,
            "where state or nation deviate from these rules; prints with every paper",
        ),
        may(
            "money",
            Shape::Object(&MONEY),
            r#"{ "currency": "USD", "prices": { "n-hexane": "95 USD for 2.5 L" } }"#,
            "what things cost; without it there is no account of cost",
        ),
        may(
            "hours",
            Shape::Object(&HOURS),
            r#"{ "attended": "1300 h" }"#,
            "the hours of a year in which instruments can run",
        ),
        may(
            "climate",
            Shape::Object(&CLIMATE),
            r#"{ "gwp": "AR6", "co2_origin": "fossil by-product" }"#,
            "what the account of climate rests on beside electricity",
        ),
    ],
    fields_after: None,
};

static OTHER_WASTE: Object = Object {
    title: "other waste",
    keys: &[
        must("name", Shape::Name, r#""rest of the campus""#, "what it is"),
        must("each_month", Shape::Amount, r#""55 kg""#, "its mass in each of its months"),
        may("months", Shape::Text, r#""9-12, 1-5""#, "its months; all when left out"),
        may(
            "acute",
            Shape::YesNo,
            "false",
            "whether it is acutely hazardous (P list); it is not when left out",
        ),
    ],
    fields_after: None,
};

static LOG: Object = Object {
    title: "a log",
    keys: &[
        must("name", Shape::Name, r#""purchases.csv""#, "the name of the file"),
        must(
            "register",
            Shape::Word(&crate::log::Register::WORDS),
            r#""purchases""#,
            "which of the site's records it is",
        ),
        may(
            "columns",
            Shape::Rows,
            r#"{ "Date": "date", "Solvent": "material", "Volume (L)": "amount in L" }"#,
            "its headings with what stands below them",
        ),
        may(
            "dates",
            Shape::Word(&crate::log::DayOrder::WORDS),
            r#""day first""#,
            "which number is the day in dates with strokes",
        ),
        may(
            "decimals",
            Shape::Word(&crate::log::Decimals::WORDS),
            r#""comma""#,
            "which sign stands before decimals",
        ),
        may("uncertainty", Shape::Amount, r#""2 %""#, "how far its amounts can be off, as half a width"),
        may(
            "means",
            Shape::Rows,
            r#"{ "SOX-PAH": "PAH in sediment / Soxhlet", "Hexanes": "n-hexane" }"#,
            "names in the file with the names in the plan that they mean",
        ),
    ],
    fields_after: None,
};

static ELECTRICITY: Object = Object {
    title: "the electricity",
    keys: &[
        may("climate", Shape::Amount, r#""0.37 kg/kWh""#, "the CO2-equivalent for each unit of energy"),
        may("price", Shape::Amount, r#""0.14 USD/kWh""#, "the price of each unit of energy"),
        may("year", Shape::Count, "2025", "the year for which the climate figure holds"),
        may("boundary", Shape::Text, r#""generation only""#, "what the climate figure counts"),
        may("source", Shape::Text, r#""the site's own figure""#, "where these figures come from"),
    ],
    fields_after: None,
};

pub(super) static MONEY: Object = Object {
    title: "money",
    keys: &[
        must("currency", Shape::Name, r#""USD""#, "the currency of every price, by its three letters"),
        may(
            "prices",
            Shape::Rows,
            r#"{ "n-hexane": "95 USD for 2.5 L", "acetone": "12 ± 2 USD/L", "nitrile glove": "18 USD for 100" }"#,
            "the price of each material: by mass, by volume, or of a pack",
        ),
        may(
            "disposal",
            Shape::Rows,
            r#"{ "flammable": "85 USD/container + 140 USD/pick-up", "solids": "1.9 USD/kg" }"#,
            "what the removal of each stream costs: by kg, L, container or pick-up, or several of them",
        ),
        may("pick_ups", Shape::Count, "6", "the pick-ups of waste in a year"),
        may("labour_hour", Shape::Amount, r#""48 ± 6 USD""#, "what an hour of labour costs"),
        may(
            "cooling_water",
            Shape::Amount,
            r#""2.8 USD/m3""#,
            "the price of cooling water, sewerage included",
        ),
        may("discount", Shape::Amount, r#""6 ± 2 %""#, "the yearly rate at which later money counts less"),
        may("years", Shape::Count, "8", "how many years the case is drawn up for"),
        may("source", Shape::Text, r#""purchase ledger 2025""#, "where these figures come from"),
    ],
    fields_after: None,
};

pub(super) static HOURS: Object = Object {
    title: "hours",
    keys: &[
        may("attended", Shape::Amount, r#""1300 h""#, "the hours of a year in which someone is there"),
        may(
            "unattended",
            Shape::Amount,
            r#""4000 h""#,
            "the further hours of a year in which instruments may run alone",
        ),
    ],
    fields_after: None,
};

pub(super) static CLIMATE: Object = Object {
    title: "climate",
    keys: &[
        may(
            "gwp",
            Shape::Word(Edition::WORDS),
            r#""AR6""#,
            "the assessment report whose 100-year warming potentials are read; AR6 when left out",
        ),
        may(
            "co2_origin",
            Shape::Word(Origin::WORDS),
            r#""fossil by-product""#,
            "where bought CO2 comes from",
        ),
        may(
            "incinerated",
            Shape::Rows,
            r#"{ "flammable": "100 %" }"#,
            "the share of each stream that is burnt",
        ),
        may(
            "upstream",
            Shape::Rows,
            r#"{ "n-hexane": "0.9 ± 0.2 kg/kg" }"#,
            "the CO2-equivalent of making a kilogram of a material; needs source",
        ),
        may("source", Shape::Text, r#""supplier's declaration, 2025""#, "where the factors come from"),
    ],
    fields_after: None,
};

pub(super) static TIME: Object = Object {
    title: "time",
    keys: &[
        may("run", Shape::Amount, r#""1.2 h""#, "how long the instrument is taken by one run"),
        may(
            "at_once",
            Shape::Count,
            "6",
            "how many extractions one run of one instrument holds; 1 when left out",
        ),
        may("attended", Shape::Amount, r#""15 min""#, "the working time of people for each extraction"),
        may(
            "attended_batch",
            Shape::Amount,
            r#""40 min""#,
            "the working time of people for each batch, beside it",
        ),
        may(
            "unattended",
            Shape::YesNo,
            "true",
            "whether it may run with nobody there; it may not when left out",
        ),
        may("instruments", Shape::Count, "1", "how many such instruments are there; none when left out"),
    ],
    fields_after: None,
};

pub(super) static ROUTE_MONEY: Object = Object {
    title: "the money of a route",
    keys: &[
        may("instrument", Shape::Amount, r#""62000 USD""#, "the price of one more instrument, installed"),
        may(
            "validation",
            Shape::Amount,
            r#""18000 ± 5000 USD""#,
            "what it costs once to show that the route works",
        ),
        may("residual", Shape::Amount, r#""5000 USD""#, "what each bought instrument is worth at the end"),
        may("service", Shape::Amount, r#""4200 USD""#, "service and spare parts of all instruments, a year"),
        may("rent", Shape::Amount, r#""360 USD""#, "rent of cylinders and the like, a year"),
        may("other", Shape::Amount, r#""900 USD""#, "other cost, a year"),
    ],
    fields_after: None,
};

pub(super) static ROOM: Object = Object {
    title: "a room",
    keys: &[
        may("volume", Shape::Amount, r#""140 m3""#, "the volume of its air"),
        may("air_changes", Shape::Amount, r#""8 /h""#, "how often its air is changed by day"),
        may(
            "hood_capture",
            Shape::Amount,
            r#""95 to 99 %""#,
            "the share of a release at the hood that the hood captures; all of it when left out",
        ),
        may(
            "setback",
            Shape::Amount,
            r#""0.3 /h""#,
            "how often its air is changed while ventilation is set back",
        ),
        may(
            "day_from",
            Shape::Amount,
            r#""7 h""#,
            "from which hour of the day it is ventilated in full; 7 h when left out",
        ),
        may("day_until", Shape::Amount, r#""19 h""#, "until which hour; 19 h when left out"),
        may(
            "work_from",
            Shape::Amount,
            r#""8 h""#,
            "at which hour of the day the work starts; 8 h when left out",
        ),
        may(
            "work_days",
            Shape::Amount,
            r#""230""#,
            "on how many days a year there is work; 230 when left out",
        ),
        may(
            "at_once",
            Shape::Amount,
            r#""3""#,
            "how many runs of a step go on side by side; 1 when left out",
        ),
        may(
            "mixing",
            Shape::Amount,
            r#""0.5""#,
            "the mixing factor, 0.1 to 1: how much of the air change reaches the air that people breathe; 1 when left out",
        ),
        may(
            "low_spaces",
            Shape::Text,
            r#""cable duct under the bench""#,
            "pits, ducts, cellars and cold rooms where heavy gas gathers",
        ),
        may("cylinder", Shape::Amount, r#""22.7 kg""#, "the largest cylinder that could let go"),
        may("cylinder_of", Shape::Text, r#""carbon dioxide""#, "what is in it; carbon dioxide when left out"),
        may("store", Shape::Amount, r#""30 m3""#, "the volume of the store in which cylinders stand"),
    ],
    fields_after: None,
};

static STREAM: Object = Object {
    title: "a stream",
    keys: &[
        must("name", Shape::Name, r#""flammable""#, "the name by which steps and ends refer to the stream"),
        may("holds", Shape::Word(&["liquid", "solid"]), r#""solid""#, "what it holds; liquid when left out"),
        may("container", Shape::Amount, r#""20 L""#, "the size of one container"),
        may("fill", Shape::Amount, r#""90 %""#, "how full a container is when it is closed"),
        may("bulk_density", Shape::Amount, r#""0.4 kg/L""#, "the bulk density of a solid stream"),
        may(
            "treatment",
            Shape::Word(&["none", "recycling", "degradation", "passivation"]),
            r#""recycling""#,
            "what happens to it on site",
        ),
        may("ph", Shape::Amount, r#""6 to 8""#, "the lowest and the highest pH measured in its containers"),
        may("flash_point", Shape::Amount, r#""26 °C""#, "its flash point by a closed-cup test, or none"),
        may("unused", Shape::YesNo, "false", "whether what goes in is unused product"),
        may("made_of", Shape::Word(MADE_OF), r#""polyethylene""#, "what its containers are made of"),
        may(
            "density_mark",
            Shape::Count,
            "1.2",
            "the relative density up to which the mark on the container allows a liquid",
        ),
        may(
            "area",
            Shape::Word(AREAS),
            r#""satellite""#,
            "where its containers fill: central, or satellite (at the bench, US); central when left out",
        ),
        may(
            "counted",
            Shape::Word(COUNTED),
            r#""when made""#,
            "how it counts each month: when made, reclaimed (stored, then reclaimed and used again here), reclaimed at once or treated at once (never stored)",
        ),
        may(
            "goes_round",
            Shape::Amount,
            r#""20 kg""#,
            "of a reclaimed stream: the mass that goes round, which counts once a month however often it is reclaimed",
        ),
        may(
            "saturation",
            Shape::Amount,
            r#""1""#,
            "how far the air that filling pushes out is saturated with vapour, 1 to be cautious; not counted when left out",
        ),
        may(
            "vented_to",
            Shape::Word(&["hood", "room"]),
            r#""room""#,
            "where that air goes; hood when left out",
        ),
    ],
    fields_after: None,
};

static MATERIAL: Object = Object { title: "a material", keys: &[], fields_after: Some(0) };

static WORKLOAD: Object = Object {
    title: "a workload",
    keys: &[
        must("name", Shape::Name, r#""PAH in sediment""#, "the name of the work"),
        must(
            "results_per_year",
            Shape::Count,
            "1400",
            "the results reported, or product batches made, in a year",
        ),
        must("batch", Shape::Object(&BATCH), r#"{ "samples": 13, "controls": 4 }"#, "what leaves together"),
        may("repeats", Shape::Amount, r#""3 %""#, "the share of results that have to be done again"),
        may(
            "repeats_bring_controls",
            Shape::YesNo,
            "true",
            "whether repeats bring their own controls; they do when left out",
        ),
        may(
            "controls_carry_feed",
            Shape::YesNo,
            "false",
            "whether controls carry feed as a sample does; they do when left out",
        ),
        must(
            "feed",
            Shape::Rows,
            r#"{ "sediment": "10 g" }"#,
            "what one sample, or one product batch, brings",
        ),
        may("months", Shape::Text, r#""5""#, "the months in which the work is done; all when left out"),
        must("present", Shape::Name, r#""Soxhlet""#, "the name of the route in use now"),
        must("routes", Shape::List(&ROUTE, 1), "", "the routes, at least one"),
    ],
    fields_after: None,
};

static BATCH: Object = Object {
    title: "a batch",
    keys: &[
        must(
            "samples",
            Shape::Count,
            "13",
            "the samples in a batch as batches really leave, controls not counted",
        ),
        may("controls", Shape::Count, "4", "the blanks and other control samples that go with each batch"),
    ],
    fields_after: None,
};

static ROUTE: Object = Object {
    title: "a route",
    keys: &[
        must("name", Shape::Name, r#""Soxhlet""#, "the name of the route, its own within the workload"),
        may(
            "feed",
            Shape::Rows,
            r#"{ "sediment": "3 g" }"#,
            "what one sample brings, where this route differs",
        ),
        may(
            "recovery",
            Shape::Amount,
            r#""94 ± 3 %""#,
            "the recovery of what is sought, as this route reaches it",
        ),
        may("equivalence", Shape::Text, r#""paired samples, 2026""#, "what the claim of equal work rests on"),
        may(
            "permission",
            Shape::Text,
            r#""the permit names no method""#,
            "by which method, permit or agreement results of this route may be reported",
        ),
        may("ph", Shape::Amount, r#""2 to 7""#, "the lowest and the highest pH on the way"),
        must("steps", Shape::List(&STEP, 0), "", "the steps in their order"),
        may(
            "ends",
            Shape::Rows,
            r#"{ "liquor": "flammable", "marc": "solids" }"#,
            "where what is left on the bench goes",
        ),
        may(
            "time",
            Shape::Object(&TIME),
            r#"{ "run": "1.2 h", "attended": "15 min" }"#,
            "time that a run takes",
        ),
        may(
            "money",
            Shape::Object(&ROUTE_MONEY),
            r#"{ "instrument": "62000 USD", "service": "4200 USD" }"#,
            "what this route costs beside its materials, energy and labour",
        ),
    ],
    fields_after: None,
};

/// What a waste container is made of.
pub(super) const MADE_OF: &[&str] = &["polyethylene", "glass", "stainless steel", "steel", "lined steel"];
/// Where a waste container fills.
pub(super) const AREAS: &[&str] = &["central", "satellite"];
/// How a stream counts towards the month.
pub(super) const COUNTED: &[&str] = &["when made", "reclaimed", "reclaimed at once", "treated at once"];

/// How often a step is done.
pub(super) const BASES: &[&str] = &["sample", "batch", "month", "year"];

pub(super) static STEP: Object = Object {
    title: "a step",
    keys: &[
        must("step", Shape::Name, r#""soxhlet""#, "the technique"),
        may(
            "per",
            Shape::Word(BASES),
            r#""batch""#,
            "how often the step is done; for each sample when left out",
        ),
        may(
            "measured",
            Shape::Rows,
            r#"{ "condenser loss": "6 ± 2 g" }"#,
            "measured figures by the name of the rule whose result they replace",
        ),
        may("note", Shape::Text, r#""chiller shared with bench 2""#, "free text that prints with the step"),
    ],
    fields_after: Some(2),
};

#[cfg(test)]
pub(super) static ALL: [&Object; 17] = [
    &PLAN,
    &LOG,
    &SITE,
    &ELECTRICITY,
    &ROOM,
    &STREAM,
    &OTHER_WASTE,
    &MATERIAL,
    &WORKLOAD,
    &BATCH,
    &ROUTE,
    &STEP,
    &MONEY,
    &HOURS,
    &CLIMATE,
    &TIME,
    &ROUTE_MONEY,
];
