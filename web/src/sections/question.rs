//! Section "The question": what is asked, for which site, with which waste streams, and how much work there is.
use super::declared::{field, group};
use super::routes::of_list;
use super::{Section, View, When};
use crate::edit::{Change, Edit, Item};
use crate::form::{text_of, understood};
use crate::parts::{Ask, Field, Name, Options, Rows, said, tools};
use crate::show::unbroken;
use std::rc::Rc;
use thimbleworth::code::Activity;
use thimbleworth::plan::{Field as Value, OwnMaterial, Site, Stream, Workload};
use thimbleworth::program::{OWN_FIELDS, ROOM_FIELDS, SITE_FIELDS};
use thimbleworth::quantity::Kind;
use thimbleworth::source::{COMMON_PRACTICE, DEFINITION, FROM_MEMORY};
use thimbleworth::step::Need;
use yew::prelude::*;

pub(super) static SECTION: Section = Section {
    id: "question",
    title: "The question",
    lead: "What is asked, for which site, and how much work there is.",
    when: When::AtOnce,
    body: draw,
};

/// What is folded away or for paper comes a turn later than what can be typed into at once.
fn draw(view: &View) -> Html {
    html! {
        <>
            <div class="form halves">
                <div>
                    { about(view) }{ streams(view) }
                    if view.whole { { more(view) } }
                </div>
                <div>{ works(view) }</div>
            </div>
            if view.whole { { printed(view) } }
        </>
    }
}

/// One field of the plan's own; `value` is what stands there.
pub(super) struct Asked<'a> {
    pub(super) path: String,
    pub(super) label: &'a str,
    pub(super) hint: &'a str,
    pub(super) value: String,
    pub(super) kind: Option<Kind>,
    pub(super) need: Need,
    pub(super) ask: Ask,
}

impl<'a> Asked<'a> {
    pub(super) fn text(path: impl Into<String>, label: &'a str, value: impl Into<String>) -> Self {
        let value = value.into();
        Self { path: path.into(), label, hint: "", value, kind: None, need: Need::Optional, ask: Ask::Text }
    }

    pub(super) fn amount(
        path: impl Into<String>,
        label: &'a str,
        kind: Kind,
        value: Option<&String>,
    ) -> Self {
        let value = value.cloned().unwrap_or_default();
        Self { kind: Some(kind), ask: Ask::Amount(kind), ..Self::text(path, label, value) }
    }

    pub(super) fn hint(mut self, hint: &'a str) -> Self {
        self.hint = hint;
        self
    }

    pub(super) fn need(mut self, need: Need) -> Self {
        self.need = need;
        self
    }

    pub(super) fn ask(mut self, ask: Ask) -> Self {
        self.ask = ask;
        self
    }

    pub(super) fn draw(self, view: &View) -> Html {
        let echo = match self.kind {
            Some(kind) => understood(&self.value, kind, self.need),
            None if self.value.is_empty() => match self.need {
                Need::Default(..) => crate::form::left_out(self.need),
                Need::Required | Need::Optional => String::new(),
            },
            None => String::new(),
        };
        let units = match (&self.ask, self.kind) {
            (Ask::Number, _) | (_, None) => String::new(),
            (_, Some(kind)) => crate::form::units(kind),
        };
        html! {
            <Field label={self.label.to_owned()} {units} hint={self.hint.to_owned()} {echo}
                said={said(&view.reckoned.problems, &self.path)} show_all={view.show_all}
                optional={self.need == Need::Optional} value={self.value} ask={self.ask} path={self.path} edit={view.edit.clone()} />
        }
    }
}

/// The words of a choice, shown as they are written.
pub(super) fn options(left_out: &str, words: &[&str]) -> Options {
    let first = (AttrValue::from(""), AttrValue::from(left_out.to_owned()));
    let rest = words.iter().map(|w| (AttrValue::from((*w).to_owned()), AttrValue::from((*w).to_owned())));
    Rc::from_iter(std::iter::once(first).chain(rest))
}

fn about(view: &View) -> Html {
    let plan = view.plan();
    let site = &plan.site;
    let words = |text: &Option<String>| text.clone().unwrap_or_default();
    html! {
        <>
            { Asked::text("title", "Title", plan.title.clone()).need(Need::Required)
                .hint("The question in a few words, as it prints on the report.").draw(view) }
            { Asked::text("site.name", "Site", site.name.clone()).need(Need::Required).draw(view) }
            { Asked::text("site.rules", "Waste rules read", words(&site.rules))
                .ask(Ask::Choice(options("none", &["US", "EU"]))).draw(view) }
            { Asked::text("site.as_of", "Date of the plan", words(&site.as_of))
                .hint("Rules and classifications are read as of this day: year-month-day.").draw(view) }
            { Asked::amount("site.bench_temperature", "Temperature of the bench", Kind::Temperature, site.bench_temperature.as_ref())
                .need(Need::Default("20 °C", COMMON_PRACTICE)).hint("At which solvents are poured and stored.").draw(view) }
            { Asked::text("notes", "Notes", words(&plan.notes)).ask(Ask::Area).draw(view) }
            { Asked::text("seed", "Seed of the draws", text_of(plan.seed.as_ref())).need(Need::Default("1", DEFINITION)).ask(Ask::Number)
                .hint("A whole number; the same seed gives the same draws.").draw(view) }
        </>
    }
}

fn add(view: &View, words: &'static str, item: Item) -> Html {
    let edit = view.edit.clone();
    let onclick =
        Callback::from(move |_: MouseEvent| edit.emit(Edit::list(Change::Add(item, String::new()))));
    html! { <button type="button" {onclick}>{ words }</button> }
}

fn streams(view: &View) -> Html {
    let plan = view.plan();
    let count = plan.site.streams.len();
    html! {
        <section id="site.streams" tabindex="-1" aria-labelledby="streams-heading">
            <h3 id="streams-heading">{ "Waste streams that the site keeps apart" }</h3>
            { for plan.site.streams.iter().enumerate().map(|(i, stream)| one_stream(view, i, stream, count)) }
            { add(view, "Add a stream", Item::Stream(0)) }
        </section>
    }
}

fn one_stream(view: &View, i: usize, stream: &Stream, count: usize) -> Html {
    let path = format!("site.streams[{i}]");
    let id = view.document.ids.streams.get(i).copied().unwrap_or_default();
    html! {
        <details class="card" key={id} id={path.clone()}>
            <summary><h4>{ &stream.name }</h4>{ ": " }{ stream_words(stream) }</summary>
            if view.whole { { stream_fields(view, i, stream, count, &path) } }
        </details>
    }
}

fn stream_fields(view: &View, i: usize, stream: &Stream, count: usize, path: &str) -> Html {
    let at = |key: &str| format!("{path}.{key}");
    let solid = stream.holds.as_deref() == Some("solid");
    html! {
        <>
            { tools(Item::Stream(i), path, &stream.name, count, &view.edit) }
            <Name item={Item::Stream(i)} id={at("name")} label="Name of the stream" value={stream.name.clone()}
                refusal={view.refusal.clone()} edit={view.edit.clone()} />
            { Asked::text(at("holds"), "Holds", stream.holds.clone().unwrap_or_default())
                .need(Need::Default("liquid", DEFINITION)).ask(Ask::Choice(options("liquid (left out)", &["liquid", "solid"]))).draw(view) }
            { Asked::amount(at("container"), "Size of a container", Kind::Volume, stream.container.as_ref())
                .hint("Left out, no containers are counted.").draw(view) }
            { Asked::amount(at("fill"), "Filled to", Kind::Fraction, stream.fill.as_ref())
                .need(Need::Default("90 %", COMMON_PRACTICE)).draw(view) }
            if solid || stream.bulk_density.is_some() {
                { Asked::amount(at("bulk_density"), "Bulk density", Kind::Density, stream.bulk_density.as_ref())
                    .need(Need::Default("0.6 kg/L", FROM_MEMORY)).hint("Weigh a full container to know.").draw(view) }
            }
            { Asked::text(at("treatment"), "Treatment on site", stream.treatment.clone().unwrap_or_default())
                .need(Need::Default("none", DEFINITION))
                .ask(Ask::Choice(options("none (left out)", &["recycling", "degradation", "passivation", "none"]))).draw(view) }
            { for stream_waste(view, path, stream) }
        </>
    }
}

/// What the waste desk asks of a stream: key, label, hint, words to choose from.
const STREAM_WASTE: [(&str, &str, &str, &[&str]); 10] = [
    ("ph", "pH in its containers", "Lowest to highest as measured, such as 6 to 8.", &[]),
    ("flash_point", "Flash point by test", "Closed cup, such as 26 °C, or none.", &[]),
    ("unused", "Takes unused product", "Expired stock, not used solvent.", &["true", "false"]),
    (
        "made_of",
        "Containers are made of",
        "",
        &["polyethylene", "glass", "stainless steel", "steel", "lined steel"],
    ),
    (
        "density_mark",
        "Mark for density",
        "The relative density up to which its mark allows a liquid, such as 1.2.",
        &[],
    ),
    (
        "area",
        "Fills in",
        "Satellite: at the bench, under the rules of the United States.",
        &["central", "satellite"],
    ),
    (
        "counted",
        "Counts towards the month",
        "",
        &["when made", "reclaimed", "reclaimed at once", "treated at once"],
    ),
    ("goes_round", "Goes round, where it is reclaimed", "Counts once a month, such as 20 kg.", &[]),
    (
        "saturation",
        "Saturation of what filling pushes out",
        "1 to be cautious; not counted when left out.",
        &[],
    ),
    ("vented_to", "That air goes to", "", &["hood", "room"]),
];

fn stream_waste<'a>(view: &'a View, path: &'a str, stream: &'a Stream) -> impl Iterator<Item = Html> + 'a {
    STREAM_WASTE.iter().map(move |(key, label, hint, choice)| {
        let value = match *key {
            "ph" => stream.ph.clone(),
            "flash_point" => stream.flash_point.clone(),
            "unused" => stream.unused.map(|yes| yes.to_string()),
            "made_of" => stream.made_of.clone(),
            "density_mark" => Some(text_of(stream.density_mark.as_ref())),
            "area" => stream.area.clone(),
            "counted" => stream.counted.clone(),
            "goes_round" => stream.goes_round.clone(),
            "saturation" => stream.saturation.clone(),
            _ => stream.vented_to.clone(),
        };
        let ask = match *key {
            "unused" => Ask::YesNo("no (left out)".into()),
            _ if choice.is_empty() => Ask::Text,
            _ => Ask::Choice(options("not said", choice)),
        };
        Asked::text([path, ".", key].concat(), label, value.unwrap_or_default())
            .hint(hint)
            .ask(ask)
            .draw(view)
    })
}

/// A stream in one line.
fn stream_words(stream: &Stream) -> String {
    let mut parts = vec![stream.holds.clone().unwrap_or_else(|| "liquid".into())];
    parts.extend(stream.container.as_ref().map(|c| format!("containers of {c}")));
    parts.extend(stream.fill.as_ref().map(|f| format!("filled to {f}")));
    parts.extend(stream.bulk_density.as_ref().map(|d| format!("bulk density {d}")));
    parts.extend(stream.treatment.as_ref().map(|t| format!("treatment {t}")));
    parts.extend(stream.ph.as_ref().map(|p| format!("pH {p}")));
    parts.extend(stream.flash_point.as_ref().map(|f| format!("flash point {f}")));
    parts.extend(stream.made_of.clone());
    parts.extend(stream.area.clone());
    parts.extend(stream.counted.as_ref().map(|c| format!("counted {c}")));
    unbroken(&parts.join(", "))
}

fn works(view: &View) -> Html {
    let plan = view.plan();
    let count = plan.workloads.len();
    html! {
        <section id="workloads" tabindex="-1" aria-labelledby="workloads-heading">
            <h3 id="workloads-heading">{ "The work that is to be done" }</h3>
            { for plan.workloads.iter().enumerate().map(|(w, work)| one_work(view, w, work, count)) }
            { add(view, "Add a piece of work", Item::Workload(0)) }
        </section>
    }
}

fn one_work(view: &View, w: usize, work: &Workload, count: usize) -> Html {
    let path = format!("workloads[{w}]");
    let id = view.document.ids.workloads.get(w).map(|ids| ids.id).unwrap_or_default();
    let at = |key: &str| format!("{path}.{key}");
    let number = |key: &str, label: &'static str, value: Option<&Value>| Asked {
        kind: Some(Kind::Number),
        ask: Ask::Number,
        ..Asked::text(at(key), label, text_of(value))
    };
    let yes = |key: &str, label: &'static str, value: Option<bool>| {
        let text = value.map_or("", |yes| if yes { "true" } else { "false" });
        Asked::text(at(key), label, text)
            .need(Need::Default("true", DEFINITION))
            .ask(Ask::YesNo("yes (left out)".into()))
    };
    let routes: Vec<&str> = work.routes.iter().map(|r| r.name.as_str()).collect();
    let feed = at("feed");
    html! {
        <div class="card" key={id} id={path.clone()} role="group" aria-label={format!("Work {}", work.name)}>
            <div class="cardhead"><h4>{ &work.name }</h4>{ tools(Item::Workload(w), &path, &work.name, count, &view.edit) }</div>
            <Name item={Item::Workload(w)} id={at("name")} label="Name of the work" value={work.name.clone()}
                refusal={view.refusal.clone()} edit={view.edit.clone()} />
            { number("results_per_year", "Results reported in a year", work.results_per_year.as_ref()).need(Need::Required)
                .hint("Or product batches made. It may be uncertain: 1400 ± 100.").draw(view) }
            { number("batch.samples", "Samples in a batch", work.batch_samples.as_ref()).need(Need::Default("1", DEFINITION))
                .hint("As batches really leave, controls not counted.").draw(view) }
            { number("batch.controls", "Controls in a batch", work.batch_controls.as_ref()).need(Need::Default("0", DEFINITION))
                .hint("Blanks and other control samples that go with each batch.").draw(view) }
            { Asked::amount(at("repeats"), "Results done again", Kind::Fraction, work.repeats.as_ref())
                .need(Need::Default("0 %", DEFINITION)).draw(view) }
            { yes("repeats_bring_controls", "Repeats bring their own controls", work.repeats_bring_controls).draw(view) }
            { yes("controls_carry_feed", "Controls carry feed as a sample does", work.controls_carry_feed).draw(view) }
            { Asked::text(at("months"), "Months of the work", work.months.clone().unwrap_or_default())
                .hint("Such as 5, or 9-12, 2; all when left out.").draw(view) }
            <Rows label="What one sample brings" kind={Kind::Mass} amount="mass or volume" units="g, kg, mL, L" rows={work.feed.clone()}
                hint="Or one product batch. A route may say that it takes another amount."
                said={said(&view.reckoned.problems, &feed)} show_all={view.show_all} path={feed} edit={view.edit.clone()} />
            { Asked::text(at("present"), "The present route", work.present.clone()).need(Need::Required)
                .hint("The one in use now; the others are compared with it.")
                .ask(Ask::Choice(routes.iter().map(|r| (AttrValue::from((*r).to_owned()), AttrValue::from((*r).to_owned()))).collect())).draw(view) }
        </div>
    }
}

/// What is seldom needed: materials of the plan's own, the drain, and what later accounts will use.
fn more(view: &View) -> Html {
    let plan = view.plan();
    let site = &plan.site;
    let count = plan.materials.len();
    html! {
        <>
            <details class="more" open={count > 0}>
                <summary>{ format!("Materials of the plan's own ({count})") }</summary>
                <section id="materials" tabindex="-1" aria-label="Materials of the plan's own">
                    <p class="hint">{ "For what the catalogue does not know, or knows otherwise. Every figure needs its source." }</p>
                    { for plan.materials.iter().enumerate().map(|(i, material)| one_material(view, i, material, count)) }
                    { add(view, "Add a material", Item::Material(0)) }
                </section>
            </details>
            <details class="more">
                <summary>{ "Waste of the whole site" }</summary>
                { Asked::text("site.activity", "Kind of work", site.activity.clone().unwrap_or_default())
                    .need(Need::Default("laboratory", DEFINITION)).hint("It decides the chapter of the List of Waste.")
                    .ask(Ask::Choice(options("laboratory (left out)", Activity::WORDS))).draw(view) }
                <Rows label="Other hazardous waste of the site" names="Source" kind={Kind::Mass} amount="each month" units="kg" optional={true}
                    rows={site.other_waste.iter().map(|o| (o.name.clone(), o.each_month.clone())).collect::<Vec<_>>()}
                    hint="Made beside this work; without it no category holds." path="site.other_waste"
                    said={said(&view.reckoned.problems, "site.other_waste")} show_all={view.show_all} edit={view.edit.clone()} />
                { Asked::amount("site.storage_limit", "Longest storage", Kind::Time, site.storage_limit.as_ref())
                    .hint("As nation or permit say; the rules of the United States bring their own.").draw(view) }
                { Asked::amount("site.pick_up_every", "Picked up every", Kind::Time, site.pick_up_every.as_ref())
                    .hint("Left out, the fewest pick-ups that keep every limit are sought.").draw(view) }
                { Asked::text("site.far_receiver", "Receiver more than 200 miles away", site.far_receiver.map_or(String::new(), |yes| yes.to_string()))
                    .ask(Ask::YesNo("no (left out)".into())).draw(view) }
                { Asked::text("site.deviations", "State or national deviations", site.deviations.clone().unwrap_or_default())
                    .hint("They print with every paper.").ask(Ask::Area).draw(view) }
            </details>
            <details class="more">
                <summary>{ "Drain and room" }</summary>
                { Asked::text("site.drain_permit", "Permit for the drain", site.drain_permit.clone().unwrap_or_default())
                    .hint("The drain is closed until a permit is named; never by dilution.").draw(view) }
                { for ROOM_FIELDS.iter().map(|p| {
                    let given = site.room.as_ref().and_then(|room| room.get(p.key));
                    field(view, "site.room", p, given.map(|text| Value::Text(text.to_owned())).as_ref())
                }) }
            </details>
            { for SITE_FIELDS.iter().map(|fields| html! {
                <details class="more">
                    <summary>{ fields.1 }</summary>
                    { group(view, "site", fields, &|key| of_site(site, fields.0, key)) }
                </details>
            }) }
        </>
    }
}

/// What stands under a declared key of the site.
fn of_site(site: &Site, under: &str, key: &str) -> Option<Value> {
    let list = match under {
        "money" => &site.money,
        "hours" => &site.hours,
        "climate" => &site.climate,
        _ => {
            let of = site.electricity.as_ref()?;
            let text = match key {
                "climate" => &of.climate,
                "price" => &of.price,
                "boundary" => &of.boundary,
                "source" => &of.source,
                _ => return of.year.clone(),
            };
            return text.clone().map(Value::Text);
        }
    };
    of_list(list, key)
}

/// A list of fields in one line.
pub(super) fn list_words(list: &[(String, Value)]) -> String {
    let mut out = String::new();
    for (key, value) in list {
        if !out.is_empty() {
            out.push_str("; ");
        }
        out.push_str(&key.replace('_', " "));
        for (name, amount) in crate::form::rows_of(Some(value)) {
            // One value alone is a row of its own with the whole share.
            let rows = matches!(value, Value::Rows(_));
            out.push_str(
                &[" ", &name, if rows { " " } else { "" }, if rows { &amount } else { "" }].concat(),
            );
        }
    }
    out
}

fn one_material(view: &View, i: usize, material: &OwnMaterial, count: usize) -> Html {
    let item = Item::Material(i);
    let path = item.path(view.plan());
    let id = view.document.ids.materials.get(i).copied().unwrap_or_default();
    html! {
        <div class="card" key={id} id={crate::edit::dom_id(&path)} role="group" aria-label={format!("Material {}", material.name)}>
            <div class="cardhead"><h4>{ &material.name }</h4>{ tools(item, &path, &material.name, count, &view.edit) }</div>
            <Name {item} id={format!("material-{id}-name")} label="Name of the material" value={material.name.clone()}
                refusal={view.refusal.clone()} edit={view.edit.clone()} />
            { for OWN_FIELDS.iter().map(|p| field(view, &path, p, material.fields.iter().find(|(k, _)| k == p.key).map(|(_, field)| field))) }
        </div>
    }
}

/// The same as plain lines, for the report.
fn printed(view: &View) -> Html {
    let plan = view.plan();
    let line = |label: &str, value: Option<String>| {
        let value = value.filter(|v| !v.is_empty())?;
        Some(html! { <><dt>{ label.to_owned() }</dt><dd>{ unbroken(&value) }</dd></> })
    };
    let site = &plan.site;
    let rows = |rows: &[(String, String)]| {
        rows.iter().map(|(name, amount)| format!("{name} {amount}")).collect::<Vec<_>>().join(", ")
    };
    let mut lines = vec![
        line("Site", Some(site.name.clone())),
        line("Waste rules read", site.rules.clone()),
        line("Date of the plan", site.as_of.clone()),
        line("Temperature of the bench", site.bench_temperature.clone()),
        line("Permit for the drain", site.drain_permit.clone()),
        line("Kind of work", site.activity.clone()),
        line(
            "Other hazardous waste",
            Some(rows(
                &site.other_waste.iter().map(|o| (o.name.clone(), o.each_month.clone())).collect::<Vec<_>>(),
            )),
        ),
        line("Longest storage", site.storage_limit.clone()),
        line("Picked up every", site.pick_up_every.clone()),
        line("State or national deviations", site.deviations.clone()),
        line("Prices and money", Some(list_words(&site.money))),
        line("Hours of instruments", Some(list_words(&site.hours))),
        line("Climate", Some(list_words(&site.climate))),
        line("Seed of the draws", plan.seed.as_ref().map(|s| text_of(Some(s)))),
        line("Notes", plan.notes.clone()),
    ];
    for stream in &site.streams {
        lines.push(line(&format!("Stream {}", stream.name), Some(stream_words(stream))));
    }
    for material in &plan.materials {
        let fields = material
            .fields
            .iter()
            .map(|(k, v)| format!("{k} {}", text_of(Some(v))))
            .collect::<Vec<_>>()
            .join(", ");
        lines.push(line(&format!("Material {}", material.name), Some(fields)));
    }
    for work in &plan.workloads {
        let samples = text_of(work.batch_samples.as_ref());
        let controls = work.batch_controls.as_ref().map_or("0".to_owned(), |c| text_of(Some(c)));
        let mut parts = vec![format!("{} results a year", text_of(work.results_per_year.as_ref()))];
        parts.push(format!("batches of {samples} samples and {controls} controls"));
        parts.extend(work.repeats.as_ref().map(|r| format!("{r} done again")));
        parts.push(format!("one sample brings {}", rows(&work.feed)));
        parts.extend(work.months.as_ref().map(|m| format!("months {m}")));
        parts.push(format!("present route {}", work.present));
        lines.push(line(&format!("Work {}", work.name), Some(parts.join("; "))));
    }
    html! { <dl class="onpaper">{ for lines.into_iter().flatten() }</dl> }
}
