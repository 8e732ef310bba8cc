//! How a figure is worked out: its boundary and formula, the postings behind it, each rule with the numbers put in, and the
//! sources.
use super::{ByRc, figure_button};
use crate::form::cited;
use crate::reckon::{Basis, Book};
use crate::show::Scale;
use crate::state::{Action, Opened};
use thimbleworth::account::{Contribution, Figure, How, RouteAccount, behind, rule_of};
use thimbleworth::ledger::{Place, RuleIx, StepIx};
use thimbleworth::program::{RouteProgram, SiteUse};
use thimbleworth::quantity::{Kind, show};
use yew::prelude::*;

/// The most postings and numbers that are listed; of a figure with more, the largest.
const LISTED: usize = 60;

#[derive(Properties, PartialEq)]
pub(crate) struct Props {
    pub(crate) book: ByRc<Book>,
    pub(crate) opened: Option<Opened>,
    pub(crate) act: Callback<Action>,
}

/// The name of a place, streams by the site's names.
fn place(site: &SiteUse, place: Place) -> String {
    match place.stream_index().and_then(|i| site.streams.get(i)) {
        Some(stream) => stream.name.clone(),
        None => place.name().unwrap_or_default().to_owned(),
    }
}

/// When a step happens, in words.
fn step_words(route: &RouteProgram, step: StepIx) -> String {
    match step {
        StepIx::Opening => "before the first step".to_owned(),
        StepIx::Closing => "at the end".to_owned(),
        StepIx::Step(i) => {
            let title = route.steps.get(usize::from(i)).map_or("", |s| s.technique.title);
            format!("step {}, {title}", i + 1)
        }
    }
}

#[component]
pub(crate) fn Working(props: &Props) -> Html {
    let dialog = use_node_ref();
    {
        let dialog = dialog.clone();
        use_effect_with(props.opened.clone(), move |opened| {
            if let Some(dialog) = dialog.cast::<web_sys::HtmlDialogElement>() {
                match (opened.is_some(), dialog.open()) {
                    // A dialog that cannot be shown as one is shown in the flow.
                    (true, false) if dialog.show_modal().is_err() => dialog.set_open(true),
                    (true, _) => dialog.set_scroll_top(0),
                    (false, true) => dialog.close(),
                    (false, false) => {}
                }
            }
        });
    }
    let onclose = {
        let act = props.act.clone();
        Callback::from(move |_: Event| act.emit(Action::Figure(None)))
    };
    let close = {
        let dialog = dialog.clone();
        Callback::from(move |_: MouseEvent| {
            if let Some(dialog) = dialog.cast::<web_sys::HtmlDialogElement>() {
                dialog.close();
            }
        })
    };
    let body = props.opened.as_ref().and_then(|opened| {
        let (route, account) = props.book.route(opened.workload, opened.route)?;
        let (figure, value) = props.book.figure(opened.workload, opened.route, &opened.figure)?;
        let site = props.book.site()?;
        Some(working(opened, route, account, site, figure, value))
    });
    html! {
        <dialog ref={dialog} class="working" aria-labelledby="working-heading" {onclose}>
            <p class="tools"><button type="button" class="small" onclick={close}>{ "Close" }</button></p>
            { body.unwrap_or_else(|| html! { <h2 id="working-heading">{ "No figure is open" }</h2> }) }
        </dialog>
    }
}

fn working(
    opened: &Opened,
    route: &RouteProgram,
    account: &RouteAccount,
    site: &SiteUse,
    figure: &Figure,
    value: f64,
) -> Html {
    let scale = Scale::of(figure.measure, [value].into_iter());
    let bases: Vec<Html> = Basis::ALL
        .into_iter()
        .filter_map(|basis| {
            let shared = if basis == Basis::Year { value } else { account.shared(figure, value) };
            let value = basis.of(account, shared)?;
            let scale = Scale::of(figure.measure, [value].into_iter());
            Some(html! { <li>{ format!("{} {} {}", scale.write(value), scale.unit(), basis.words()) }</li> })
        })
        .collect();
    let found = behind(route, account, figure);
    html! {
        <>
            <h2 id="working-heading">{ format!("{}: {}", route.name, figure.title) }</h2>
            <p class="amount">
                { format!("{} {}", scale.write(value), scale.unit()) }
                if figure.measure.extensive() { { " a year" } }
            </p>
            if figure.measure.extensive() { <ul class="bases">{ for bases }</ul> }
            <dl>
                <dt>{ "In full" }</dt><dd>{ scale.full(value) }</dd>
                <dt>{ "Counted" }</dt><dd>{ &figure.boundary }</dd>
                <dt>{ "Formula" }</dt><dd class="formula">{ figure.formula }</dd>
                <dt>{ "Source" }</dt><dd>{ cited(&figure.source) }</dd>
            </dl>
            { parts(opened, account, figure) }
            { postings(route, account, site, figure, &found) }
            { rules(route, account, &found) }
        </>
    }
}

/// The figures that a ratio or a number of containers is made of.
fn parts(opened: &Opened, account: &RouteAccount, figure: &Figure) -> Html {
    let (indices, words): (Vec<usize>, String) = match figure.how {
        How::Ratio { over, under } => (vec![over, under], "One figure over another:".to_owned()),
        How::Containers { of, takes } => {
            let kind = match account.figures.get(of).map(|f| f.measure) {
                Some(thimbleworth::account::Measure::Mass) => Kind::Mass,
                _ => Kind::Volume,
            };
            (vec![of], format!("One container takes {} of this:", show(takes, kind)))
        }
        How::Times { of, factor } => {
            (vec![of], format!("{} times this figure:", thimbleworth::quantity::significant(factor, 4)))
        }
        How::Whole(of) => (vec![of], "This, rounded up:".to_owned()),
        How::Lines(ref lines) if !figure.how.rests_on().is_empty() => {
            (figure.how.rests_on(), format!("A sum of {} lines, with:", lines.len()))
        }
        How::Lines(_) | How::Sum(_) | How::Spent(_) => return Html::default(),
    };
    html! {
        <>
            <p>{ words }</p>
            <ul>
                { for indices.into_iter().filter_map(|i| Some((account.figures.get(i)?, *account.values.get(i)?))).map(|(part, value)| {
                    let scale = Scale::of(part.measure, [value].into_iter());
                    let text = format!("{} {}", scale.write(value), scale.unit());
                    html! {
                        <li>{ &part.title }{ ": " }
                            { figure_button(opened.workload, opened.route, &part.id, &text, scale.full(value)) }
                        </li>
                    }
                }) }
            </ul>
        </>
    }
}

fn postings(
    route: &RouteProgram,
    account: &RouteAccount,
    site: &SiteUse,
    figure: &Figure,
    found: &[Contribution],
) -> Html {
    if found.is_empty() {
        return Html::default();
    }
    let amount_of = |c: &Contribution| match c {
        Contribution::Posting { amount_si, .. } | Contribution::Spending { amount_si, .. } => *amount_si,
    };
    let measure = match figure.how {
        How::Containers { of, .. } => account.figures.get(of).map_or(figure.measure, |f| f.measure),
        _ => figure.measure,
    };
    let scale = Scale::of(measure, found.iter().map(amount_of));
    let name = |m: thimbleworth::ledger::Material| {
        route.materials.get(usize::from(m.0)).map_or("", |m| m.name.as_str())
    };
    html! {
        <>
            <h3>{ "Behind it, largest first" }</h3>
            <div class="scroll" role="region" tabindex="0" aria-label="Postings behind the figure">
                <table class="figures">
                    <thead><tr>
                        <th scope="col">{ "Rule" }</th><th scope="col">{ "Material" }</th>
                        <th scope="col">{ "From" }</th><th scope="col">{ "To" }</th>
                        <th scope="col">{ "When" }</th>
                        <th scope="col" class="num">{ "One run" }</th>
                        <th scope="col" class="num">{ "Runs a year" }</th>
                        <th scope="col" class="num">{ format!("Adds / {} a year", scale.unit()) }</th>
                        <th scope="col">{ "By" }</th>
                    </tr></thead>
                    <tbody>
                        { for found.iter().take(LISTED).filter_map(|c| match c {
                            Contribution::Posting { index, amount_si } => {
                                let p = account.trace.postings.get(*index)?;
                                Some(html! { <tr>
                                    <th scope="row">{ rule_of(route, p.step, p.rule).map_or("", |r| r.name) }</th>
                                    <td>{ name(p.material) }</td>
                                    <td>{ place(site, p.from) }</td><td>{ place(site, p.to) }</td>
                                    <td>{ step_words(route, p.step) }</td>
                                    <td class="num">{ show(p.kg, Kind::Mass) }</td>
                                    <td class="num">{ thimbleworth::quantity::significant(p.runs_a_year, 6) }</td>
                                    <td class="num">{ scale.write(*amount_si) }</td>
                                    <td>{ if p.measured { "measured" } else { "computed" } }</td>
                                </tr> })
                            }
                            Contribution::Spending { index, amount_si } => {
                                let s = account.trace.spendings.get(*index)?;
                                let kind = if s.utility.is_energy() { Kind::Energy } else { Kind::Mass };
                                Some(html! { <tr>
                                    <th scope="row">{ rule_of(route, s.step, s.rule).map_or("", |r| r.name) }</th>
                                    <td>{ s.utility.name() }</td><td></td><td></td>
                                    <td>{ step_words(route, s.step) }</td>
                                    <td class="num">{ show(s.amount_si, kind) }</td>
                                    <td class="num">{ thimbleworth::quantity::significant(s.runs_a_year, 6) }</td>
                                    <td class="num">{ scale.write(*amount_si) }</td>
                                    <td>{ "computed" }</td>
                                </tr> })
                            }
                        }) }
                    </tbody>
                </table>
            </div>
            if found.len() > LISTED { <p>{ format!("{} smaller ones are not listed.", found.len() - LISTED) }</p> }
        </>
    }
}

/// Each rule that is at work in the figure, with the numbers put in.
fn rules(route: &RouteProgram, account: &RouteAccount, found: &[Contribution]) -> Html {
    let mut met: Vec<(StepIx, RuleIx)> = Vec::new();
    for contribution in found {
        let key = match contribution {
            Contribution::Posting { index, .. } => {
                account.trace.postings.get(*index).map(|p| (p.step, p.rule))
            }
            Contribution::Spending { index, .. } => {
                account.trace.spendings.get(*index).map(|s| (s.step, s.rule))
            }
        };
        if let Some(key) = key.filter(|key| !met.contains(key)) {
            met.push(key);
        }
    }
    if met.is_empty() {
        return Html::default();
    }
    html! {
        <>
            <h3>{ "Rules and the numbers put in" }</h3>
            <ul class="rules">
                { for met.into_iter().filter_map(|(step, rule)| {
                    let declared = rule_of(route, step, rule)?;
                    let numbers: Vec<String> = account.trace.working(step, rule).take(LISTED)
                        .map(|n| format!("{}\u{a0}=\u{a0}{}", n.symbol, show(n.value_si, n.kind))).collect();
                    Some(html! {
                        <li>
                            <strong>{ declared.name }</strong>{ format!(", {}", step_words(route, step)) }
                            <span class="formula">{ declared.equation }</span>
                            if !numbers.is_empty() { <span class="numbers">{ numbers.join("; ") }</span> }
                            <span class="margin">{ format!("Source: {}.", cited(&declared.source)) }</span>
                        </li>
                    })
                }) }
            </ul>
        </>
    }
}
