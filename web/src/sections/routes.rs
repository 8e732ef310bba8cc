//! Section "The routes": a card a route, one form open at a time.
use super::declared::{choices, field, group};
use super::question::{Asked, list_words, options};
use super::{Section, View, When};
use crate::edit::{Change, Edit, Item, dom_id, step_field};
use crate::form::{applies, cited, measured_lines, summary};
use crate::parts::{Ask, Field, Name, Rows, said, tools};
use crate::reckon::things;
use crate::show::unbroken;
use crate::state::Action;
use thimbleworth::ledger::Place;
use thimbleworth::plan::{Field as Value, Route, Severity, Step, below};
use thimbleworth::program::ROUTE_FIELDS;
use thimbleworth::quantity::Kind;
use thimbleworth::source::{DEFINITION, FROM_MEMORY};
use thimbleworth::step::{Group, Need, TECHNIQUES, Technique, technique};
use yew::prelude::*;

pub(super) static SECTION: Section = Section {
    id: "routes",
    title: "The routes",
    lead: "Every way of doing the work, step by step.",
    when: When::AtOnce,
    body: draw,
};

fn draw(view: &View) -> Html {
    let plan = view.plan();
    let several = plan.workloads.len() > 1;
    html! {
        <>
            { for plan.workloads.iter().enumerate().map(|(w, work)| html! {
                <div id={format!("workloads[{w}].routes")} tabindex="-1" role="group" aria-label={format!("Routes of {}", work.name)}>
                    if several { <h3 class="work">{ &work.name }</h3> }
                    { for work.routes.iter().enumerate().map(|(r, route)| card(view, w, r, route)) }
                    { add_route(view, w) }
                </div>
            }) }
        </>
    }
}

fn add_route(view: &View, w: usize) -> Html {
    let edit = view.edit.clone();
    let onclick = Callback::from(move |_: MouseEvent| {
        edit.emit(Edit::list(Change::Add(Item::Route(w, 0), String::new())));
    });
    html! { <button type="button" {onclick}>{ "Add a route" }</button> }
}

fn card(view: &View, w: usize, r: usize, route: &Route) -> Html {
    let plan = view.plan();
    let work = &plan.workloads[w];
    let id = view.document.route_id(w, r);
    let open = id.is_some() && view.route == id;
    let path = format!("workloads[{w}].routes[{r}]");
    let toggle = {
        let act = view.act.clone();
        Callback::from(move |_: MouseEvent| act.emit(Action::Route(if open { None } else { id })))
    };
    let errors =
        view.book().works.get(w).and_then(|work| work.routes.get(r)).map_or(0, |column| column.errors);
    let heading = format!("{path}-heading");
    html! {
        <article class={classes!("card", "route", open.then_some("open"))} key={id.unwrap_or_default()} id={path.clone()} tabindex="-1"
            aria-labelledby={heading.clone()}>
            <div class="cardhead">
                <h4 id={heading}>
                    { &route.name }
                    if route.name == work.present { <span class="present">{ " present" }</span> }
                </h4>
                <p class="state">{ if errors > 0 { format!("{} to mend", things(errors)) } else { format!("{} steps", route.steps.len()) } }</p>
                <button type="button" class="small" aria-expanded={open.to_string()} onclick={toggle}
                    aria-label={format!("{} {}", if open { "Close the form of" } else { "Open the form of" }, route.name)}>
                    { if open { "Close the form" } else { "Open the form" } }
                </button>
                { tools(Item::Route(w, r), &path, &route.name, work.routes.len(), &view.edit) }
            </div>
            <Summary route={route.clone()} open={open} />
            if open { { form(view, w, r, route, &path) } }
        </article>
    }
}

#[derive(Properties, PartialEq)]
struct SummaryProps {
    route: Route,
    /// Whether the form stands below: then the summary is for paper alone.
    open: bool,
}

/// A route in plain lines.
#[component]
fn Summary(props: &SummaryProps) -> Html {
    let route = &props.route;
    let mut terms: Vec<String> = Vec::new();
    if let Some(feed) = &route.feed {
        let rows: Vec<String> = feed.iter().map(|(name, amount)| format!("{name} {amount}")).collect();
        terms.push(format!("One sample brings {}.", rows.join(", ")));
    }
    terms.extend(route.recovery.as_ref().map(|r| format!("Recovery {r}.")));
    terms.extend(route.equivalence.as_ref().map(|e| format!("Equal work: {e}.")));
    terms.extend(route.permission.as_ref().map(|p| format!("May be reported: {p}.")));
    terms.extend(route.ph.as_ref().map(|p| format!("pH {p}.")));
    for (title, list) in [("Time", &route.time), ("Money", &route.money)] {
        if !list.is_empty() {
            terms.push(format!("{title}: {}.", list_words(list)));
        }
    }
    if !route.ends.is_empty() {
        let ends: Vec<String> = route.ends.iter().map(|(from, to)| format!("{from} to {to}")).collect();
        terms.push(format!("What is left: {}.", ends.join(", ")));
    }
    html! {
        <div class={if props.open { "onpaper" } else { "summary" }}>
            <ol>
                { for route.steps.iter().map(|step| {
                    let known = technique(&step.technique);
                    html! {
                        <li>
                            <strong>{ known.map_or(step.technique.clone(), |t| t.title.to_owned()) }</strong>
                            { format!(", each {}: ", step.per.as_deref().unwrap_or("sample")) }
                            { for summary(known, step).into_iter().map(|(label, value)| html! {
                                <span class="entry">{ label }{ " " }<b>{ value }</b></span>
                            }) }
                        </li>
                    }
                }) }
            </ol>
            if !terms.is_empty() { <p>{ unbroken(&terms.join(" ")) }</p> }
        </div>
    }
}

fn form(view: &View, w: usize, r: usize, route: &Route, path: &str) -> Html {
    let at = |key: &str| format!("{path}.{key}");
    let feed = at("feed");
    let places = choices(view, "by default");
    html! {
        <div class="form">
            <Name item={Item::Route(w, r)} id={at("name")} label="Name of the route" value={route.name.clone()}
                refusal={view.refusal.clone()} edit={view.edit.clone()} />
            <section id={at("steps")} tabindex="-1" aria-label={format!("Steps of {}", route.name)}>
                { for route.steps.iter().enumerate().map(|(s, step)| one_step(view, (w, r, s), step, route)) }
                <AddStep edit={view.edit.clone()} {w} {r} />
            </section>
            <section class="halves" aria-label="What is left at the end">
                <h5>{ "What is left at the end goes to" }</h5>
                { for Place::BENCH.into_iter().filter_map(Place::name).map(|name| {
                    let value = route.ends.iter().find(|(k, _)| k == name).map_or(String::new(), |(_, v)| v.clone());
                    Asked::text(below(&at("ends"), name), &format!("From the {name}"), value)
                        .ask(Ask::Choice(places.clone())).draw(view)
                }) }
            </section>
            { for ROUTE_FIELDS.iter().enumerate().map(|(i, fields)| html! {
                <section class="halves" aria-label={fields.1}>
                    <h5>{ fields.1 }</h5>
                    { group(view, path, fields, &|key| of_route(route, fields.0, key)) }
                    if i == 0 {
                        <Rows label="What one sample brings on this route" optional={true} kind={Kind::Mass} amount="mass or volume" units="g, kg, mL, L"
                            rows={route.feed.clone().unwrap_or_default()} hint="Only where it differs from the work's own."
                            said={said(&view.reckoned.problems, &feed)} show_all={view.show_all} path={feed.clone()} edit={view.edit.clone()} />
                    }
                </section>
            }) }
        </div>
    }
}

/// What stands under a declared key of a route.
fn of_route(route: &Route, under: &str, key: &str) -> Option<Value> {
    let text = match (under, key) {
        ("time", _) => return of_list(&route.time, key),
        ("money", _) => return of_list(&route.money, key),
        (_, "recovery") => &route.recovery,
        (_, "equivalence") => &route.equivalence,
        (_, "permission") => &route.permission,
        _ => &route.ph,
    };
    text.clone().map(Value::Text)
}

/// What stands under a key of a list.
pub(super) fn of_list(list: &[(String, Value)], key: &str) -> Option<Value> {
    list.iter().find(|(k, _)| k == key).map(|(_, field)| field.clone())
}

#[derive(Properties, PartialEq)]
struct AddProps {
    edit: Callback<Edit>,
    w: usize,
    r: usize,
}

/// A step is chosen from the list of techniques, then added.
#[component]
fn AddStep(props: &AddProps) -> Html {
    let chosen = use_state_eq(|| TECHNIQUES.first().map_or("", |t| t.key).to_owned());
    let id = format!("add-step-{}-{}", props.w, props.r);
    let onchange = {
        let chosen = chosen.clone();
        Callback::from(move |event: Event| {
            if let Some(select) = event.target_dyn_into::<web_sys::HtmlSelectElement>() {
                chosen.set(select.value());
            }
        })
    };
    let onclick = {
        let (edit, w, r, chosen) = (props.edit.clone(), props.w, props.r, chosen.clone());
        Callback::from(move |_: MouseEvent| {
            edit.emit(Edit::list(Change::Add(Item::Step(w, r, 0), (*chosen).clone())));
        })
    };
    let group = |group: Group, label: &'static str| {
        html! {
            <optgroup {label}>
                { for TECHNIQUES.iter().filter(|t| t.group == group).map(|t| html! {
                    <option value={t.key} selected={*chosen == t.key}>{ t.title }</option>
                }) }
            </optgroup>
        }
    };
    html! {
        <div class="add">
            <label for={id.clone()}>{ "Next step" }</label>
            <select {id} {onchange}>
                { group(Group::Extraction, "Takes something out") }
                { group(Group::Extract, "Works on the extract") }
                { group(Group::Around, "Goes with it") }
            </select>
            <button type="button" {onclick}>{ "Add the step" }</button>
        </div>
    }
}

fn one_step(view: &View, (w, r, s): (usize, usize, usize), step: &Step, route: &Route) -> Html {
    let path = format!("workloads[{w}].routes[{r}].steps[{s}]");
    let ids = view.document.ids.workloads.get(w).and_then(|w| w.routes.get(r));
    let id = ids.and_then(|r| r.steps.get(s)).copied().unwrap_or_default();
    let known = technique(&step.technique);
    let title = known.map_or_else(|| step.technique.clone(), |t| t.title.to_owned());
    let named = format!("step {}, {title}", s + 1);
    let per = step.per.clone().unwrap_or_default();
    let problems = &view.reckoned.problems;
    let errors =
        problems.iter().filter(|p| p.severity == Severity::Error && p.path.starts_with(&path)).count();
    html! {
        <details class="card step" key={id} id={path.clone()}>
            <summary>
                <h5><span class="folio">{ s + 1 }</span>{ " " }{ &title }</h5>
                { for summary(known, step).into_iter().map(|(label, value)| html! {
                    <span class="entry">{ label }{ " " }<b>{ value }</b></span>
                }) }
                if errors > 0 { <span class="wrong">{ format!("{} to mend", things(errors)) }</span> }
            </summary>
            { tools(Item::Step(w, r, s), &path, &named, route.steps.len(), &view.edit) }
            if let Some(technique) = known {
                <p class="hint">{ technique.about }</p>
                { for technique.cautions.iter().map(|c| html! { <p class="caution"><strong>{ "Caution: " }</strong>{ c.text }</p> }) }
                { for technique.params.iter().filter(|p| applies(technique, step, p) || step_field(step, p.key).is_some())
                    .map(|p| field(view, &path, p, step_field(step, p.key))) }
                { measured(view, technique, step, &path, (w, r, s)) }
            }
            { Asked::text(format!("{path}.per"), "Done once for each", per).need(Need::Default("sample", DEFINITION))
                .ask(Ask::Choice(options("sample (left out)", &["sample", "batch", "month", "year"]))).draw(view) }
            { Asked::text(format!("{path}.note"), "Note on the step", step.note.clone().unwrap_or_default()).draw(view) }
        </details>
    }
}

fn measured(
    view: &View,
    technique: &'static Technique,
    step: &Step,
    path: &str,
    at: (usize, usize, usize),
) -> Html {
    let lines = measured_lines(technique, step, path, view.book(), at);
    if lines.is_empty() {
        return Html::default();
    }
    html! {
        <section id={dom_id(&below(path, "measured"))} class="measured" aria-label="Measured on your own bench">
            <h6>{ "Measured on your own bench" }</h6>
            <p class="hint">{ "A weighing takes the place of what is computed; the computed figure stays beside it." }</p>
            { for lines.into_iter().map(|line| html! {
                <Field key={line.rule} label={format!("Measured: {}", line.rule)} units="g in one run, or %" optional={true}
                    echo={line.computed} said={said(&view.reckoned.problems, &line.path)} show_all={view.show_all}
                    value={line.value} path={line.path} edit={view.edit.clone()}
                    margin={rule_source(technique, line.rule)} />
            }) }
        </section>
    }
}

fn rule_source(technique: &Technique, rule: &str) -> String {
    technique
        .rules
        .iter()
        .find(|r| r.name == rule)
        .map_or_else(|| cited(&FROM_MEMORY), |r| format!("The rule: {}.", cited(&r.source)))
}
