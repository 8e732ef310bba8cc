//! What is to be mended: a line that always stands at the top, and the list behind it, with a link to every field.
use super::ByRc;
use super::field::value_of;
use crate::edit::dom_id;
use crate::form::sentence;
use crate::reckon::{Reckoned, things};
use crate::show::unbroken;
use crate::state::Action;
use thimbleworth::plan::{Plan, Severity, keys};
use thimbleworth::step::technique;
use yew::prelude::*;

#[derive(Properties, PartialEq)]
pub(crate) struct Props {
    pub(crate) plan: std::rc::Rc<crate::document::Document>,
    pub(crate) reckoned: ByRc<Reckoned>,
    pub(crate) open: bool,
    pub(crate) act: Callback<Action>,
}

/// Where a path lies, in the words of the page: "PAH in sediment, Soxhlet, step 1, Extraction time".
pub(crate) fn place_words(plan: &Plan, path: &str) -> String {
    let keys = keys(path).unwrap_or_default();
    let keys: Vec<&str> = keys.iter().map(String::as_str).collect();
    let plain = |key: &str| crate::edit::lowered(&key.replace('_', " "));
    let mut out: Vec<String> = Vec::new();
    match keys.as_slice() {
        ["workloads", w, rest @ ..] => {
            let workload = w.parse::<usize>().ok().and_then(|w| plan.workloads.get(w));
            if plan.workloads.len() > 1 {
                out.extend(workload.map(|w| w.name.clone()));
            }
            match rest {
                ["routes", r, rest @ ..] => {
                    let route = r.parse::<usize>().ok().and_then(|r| workload?.routes.get(r));
                    out.extend(route.map(|r| r.name.clone()));
                    match rest {
                        ["steps", s, rest @ ..] => {
                            let number = s.parse::<usize>().map_or(0, |s| s + 1);
                            out.push(format!("step {number}"));
                            let step = s.parse::<usize>().ok().and_then(|s| route?.steps.get(s));
                            let known = step.and_then(|s| technique(&s.technique));
                            for key in rest {
                                let label = known
                                    .and_then(|t| t.params.iter().find(|p| p.key == *key))
                                    .map(|p| p.label);
                                out.push(label.map_or_else(|| plain(key), str::to_owned));
                            }
                        }
                        rest => out.extend(rest.iter().map(|key| plain(key))),
                    }
                }
                rest => out.extend(rest.iter().map(|key| plain(key))),
            }
        }
        ["site", "streams", i, rest @ ..] => {
            let stream = i.parse::<usize>().ok().and_then(|i| plan.site.streams.get(i));
            out.push(format!("stream {}", stream.map_or("", |s| s.name.as_str())));
            out.extend(rest.iter().map(|key| plain(key)));
        }
        rest => out.extend(rest.iter().map(|key| plain(key))),
    }
    out.join(", ")
}

#[component]
pub(crate) fn Mend(props: &Props) -> Html {
    let (errors, doubts) = (props.reckoned.count(Severity::Error), props.reckoned.count(Severity::Warning));
    let heading = match errors {
        _ if props.reckoned.pending => "Being added up".to_owned(),
        0 => "Nothing has to be mended".to_owned(),
        n => format!(
            "There {} to mend",
            if n == 1 { "is 1 thing".to_owned() } else { format!("are {}", things(n)) }
        ),
    };
    let doubtful = match doubts {
        0 => "no doubts".to_owned(),
        1 => "1 doubt".to_owned(),
        n => format!("{n} doubts"),
    };
    let toggle = {
        let (act, open) = (props.act.clone(), props.open);
        Callback::from(move |_: MouseEvent| act.emit(Action::List(!open)))
    };
    let group = |severity: Severity, title: &'static str| {
        let listed: Vec<_> = props.reckoned.problems.iter().filter(|p| p.severity == severity).collect();
        if listed.is_empty() {
            return Html::default();
        }
        html! {
            <>
                <h3>{ title }</h3>
                <ul>
                    { for listed.into_iter().map(|problem| {
                        let (act, path) = (props.act.clone(), problem.path.clone());
                        let onclick = Callback::from(move |event: MouseEvent| {
                            event.prevent_default();
                            act.emit(Action::Go(path.clone()));
                        });
                        let place = place_words(&props.plan.plan, &problem.path);
                        html! {
                            <li>
                                <a href={format!("#{}", dom_id(&problem.path))} {onclick}>{ unbroken(&sentence(problem)) }</a>
                                if !place.is_empty() { <span class="place">{ format!(" {place}") }</span> }
                            </li>
                        }
                    }) }
                </ul>
            </>
        }
    };
    html! {
        <section id="mend" class={classes!("mend", (errors > 0).then_some("wrong"))} tabindex="-1" aria-labelledby="mend-heading">
            <h2 id="mend-heading">
                if errors > 0 { <span class="sign" aria-hidden="true">{ "✕ " }</span> }
                { heading }
                if !props.reckoned.pending { <span class="doubtful">{ format!("; {doubtful}") }</span> }
            </h2>
            if errors + doubts > 0 {
                <button type="button" class="small" aria-expanded={props.open.to_string()} onclick={toggle}>
                    { if props.open { "Close the list" } else { "Open the list" } }
                </button>
            }
            if errors + doubts > 0 {
                <div class={if props.open { "listed" } else { "onpaper" }}>
                    { group(Severity::Error, "To mend") }
                    { group(Severity::Warning, "Doubts, which keep nothing from being accounted") }
                </div>
            }
        </section>
    }
}

/// What a change of the list of bases asks for.
pub(crate) fn basis_of(event: &Event) -> Option<crate::reckon::Basis> {
    let value = value_of(event)?;
    crate::reckon::Basis::ALL.into_iter().find(|basis| basis.words() == value)
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::document::blank;
    use crate::edit::new_step;

    #[test]
    fn places_are_named_in_the_words_of_the_page() {
        let mut plan = blank();
        plan.workloads[0].routes[0].steps.push(new_step("soxhlet").expect("a technique"));
        let words = |path: &str| place_words(&plan, path);
        assert_eq!(
            words("workloads[0].routes[0].steps[0].charge"),
            "Present route, step 1, Solvent in the flask"
        );
        assert_eq!(words("site.streams[1].fill"), "stream solids, fill");
        assert_eq!(words("workloads[0].results_per_year"), "results per year");
        assert_eq!(words(""), "");
    }
}
