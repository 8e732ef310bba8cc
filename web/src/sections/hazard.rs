//! Section "Hazard": hazard-weighted mass, statements in words, CHEM21 numbers with their reasons, the Eco-Scale line by
//! line, the NEMI criteria as yes or no. No published pictogram is drawn.
use super::places::lines;
use super::{Section, View, When};
use crate::parts::Sheet;
use thimbleworth::account::{Group, HazardAccount, MaterialHazard};
use thimbleworth::hazard::chem21::{Assessment, Score};
use thimbleworth::letter::sentence;
use thimbleworth::material::{catalogue, statement_text};
use yew::prelude::*;

pub(super) static SECTION: Section = Section {
    id: "hazard",
    title: "Hazard",
    lead: "What can hurt people and water, with the reasons behind every score.",
    when: When::Follows,
    body: draw,
};

fn draw(view: &View) -> Html {
    view.works(|w| {
        let mut lines = lines(view.book(), w, |f| f.group == Group::Hazard);
        for line in &mut lines {
            line.label = sentence(&line.label);
        }
        let routes = view.book().works.get(w).map_or(0, |work| work.routes.len());
        let accounts = || (0..routes).filter_map(|r| Some((r, &view.book().route(w, r)?.1.hazard)));
        let mut materials: Vec<&MaterialHazard> = Vec::new();
        for (_, hazard) in accounts() {
            for material in &hazard.materials {
                if !materials.iter().any(|m| m.name == material.name) {
                    materials.push(material);
                }
            }
        }
        if routes == 0 || accounts().next().is_none() {
            return html! { <p class="empty">{ "No hazards can be accounted yet." }</p> };
        }
        html! {
            <>
                if !lines.is_empty() {
                    { Sheet {
                        id: format!("hazard-{w}"),
                        caption: "Mass weighted by our own rule: mass times CHEM21 score".to_owned(),
                        first: "What reaches whom",
                        lines,
                        book: view.book(),
                        work: w,
                        basis: view.basis,
                        beside: true,
                    }.draw() }
                }
                <h4>{ "Materials" }</h4>
                { for materials.into_iter().map(material) }
                <h4>{ "Published scores of the routes" }</h4>
                { for accounts().map(|(r, hazard)| scores(&view.book().works[w].routes[r].name, hazard)) }
            </>
        }
    })
}

fn material(material: &MaterialHazard) -> Html {
    let source = catalogue().source(&material.source).map_or(material.source.clone(), |s| s.cite.to_owned());
    let words: Vec<&str> = material.label.pictograms.iter().map(|p| p.words()).collect();
    let statements = match (material.statements.is_empty(), material.source.is_empty()) {
        (true, true) => "nothing is known of its hazards".to_owned(),
        (true, false) => "no statement".to_owned(),
        (false, _) => material.statements.join(", "),
    };
    html! {
        <details class="more">
            <summary>{ &material.name }{ ": " }{ &statements }
                if !words.is_empty() { { format!(" ({})", words.join(", ")) } }
            </summary>
            if !material.statements.is_empty() {
                <ul>
                    { for material.statements.iter().map(|code| html! {
                        <li>{ code }{ statement_text(code).map_or(String::new(), |text| format!(": {text}")) }</li>
                    }) }
                </ul>
            }
            <dl>
                if !material.source.is_empty() {
                    <dt>{ "Statements from" }</dt>
                    <dd>{ source }{ if material.as_of.is_empty() { String::new() } else { format!(", as of {}", material.as_of) } }</dd>
                }
                <dt>{ "Signal word" }</dt><dd>{ material.label.signal_word.word() }</dd>
                { match &material.chem21 {
                    Some(Ok(assessment)) => chem21(assessment),
                    Some(Err(why)) => html! { <><dt>{ "CHEM21" }</dt><dd>{ format!("no score: {why}") }</dd></> },
                    None => Html::default(),
                } }
            </dl>
        </details>
    }
}

fn chem21(assessment: &Assessment) -> Html {
    let score = |title: &'static str, score: &Score| {
        let reasons: Vec<String> = score.reasons.iter().map(ToString::to_string).collect();
        html! { <><dt>{ title }</dt><dd><b>{ score.value }</b>{ " of 10: " }{ reasons.join("; ") }</dd></> }
    };
    html! {
        <>
            { score("CHEM21 safety", &assessment.safety) }
            { score("CHEM21 health", &assessment.health) }
            { score("CHEM21 environment", &assessment.environment) }
            <dt>{ "CHEM21 ranking by default" }</dt>
            <dd>{ format!("{}: {}", assessment.ranking.word(), assessment.because) }</dd>
        </>
    }
}

fn scores(name: &str, hazard: &HazardAccount) -> Html {
    let nemi: Vec<&str> = hazard.nemi.iter().map(|criterion| criterion.met.word()).collect();
    html! {
        <details class="more">
            <summary>{ name }{ ": Analytical Eco-Scale " }
                { match &hazard.eco_scale {
                    Ok(eco) => format!("{} of 100, {}", eco.score, eco.verdict.word()),
                    Err(why) => format!("not given: {why}"),
                } }
                { "; NEMI " }{ nemi.join(", ") }
            </summary>
            if let Ok(eco) = &hazard.eco_scale {
                <p>{ "Penalty points for one reported result:" }</p>
                <ul>
                    { for eco.lines.iter().map(|line| {
                        let amount = if line.amount.is_empty() { String::new() } else { format!(", {}", line.amount) };
                        html! { <li>{ format!("{} for {}{amount}: {}", line.penalty, line.what, line.why) }</li> }
                    }) }
                </ul>
            }
            <p>{ "NEMI criteria:" }</p>
            <ul>
                { for hazard.nemi.iter().map(|criterion| html! {
                    <li>{ format!("{}: ", criterion.rule) }<b>{ criterion.met.word() }</b>{ format!(". {}", sentence(&criterion.why)) }</li>
                }) }
            </ul>
            if !hazard.not_scored.is_empty() {
                <p>{ format!("Reaches air or drain without a score, so that the weighted mass leaves it out: {}.", hazard.not_scored.join(", ")) }</p>
            }
        </details>
    }
}
