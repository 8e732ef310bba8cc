//! The result document.

mod air;
mod energy;
mod figure;
mod hazard;
mod posting;
mod waste;

pub(super) use figure::figure;
pub(super) use posting::{inputs, step_and_technique};

use super::drawn::{Drawn, Spreads};
use super::json::{Json, Value};
use super::odds::summary;
use super::row::{PROGRAM, figures};
use super::words::editions;
use crate::account::{Account, Pouring, RouteAccount};
use crate::chance::{Draw, identity_key};
use crate::compare::compare;
use crate::odds::Reading;
use crate::plan::save;
use crate::program::{RouteProgram, SiteUse, WorkloadProgram};

/// The version of the result document. Keys may be added under the same version; a key that goes or changes its meaning
/// brings a new one.
pub const RESULT_VERSION: u64 = 1;

/// The result document of an account: JSON for other programs, the same bytes from the command and from the page.
///
/// Laid out with two spaces a level and a final newline; keys in the order given here; numbers as the shortest text that
/// reads back as the same double. A figure that is not a finite number would be `null`. With `with_comparison` each
/// workload has `comparison` as well.
///
/// | key | what it holds |
/// | --- | --- |
/// | `thimbleworth_result` | [`RESULT_VERSION`] |
/// | `program` | name and version |
/// | `plan_digest` | `fnv1a64:` and 16 hexadecimal digits: FNV-1a, 64 bits, of the plan as [`save`] writes it; tells whether two results are of the same plan, and protects against nothing; `null` where there is no plan |
/// | `title`, `site`, `rules`, `as_of` | from the plan; `null` where it does not say |
/// | `data_editions` | the sources of the densities, hazards, flash and boiling points and waste codes of all materials on routes, by key, each with `cite` and `standing` |
/// | `workloads` | the pieces of work in the order of the plan; empty when the plan has an error |
/// | `waste_desk` | the site with the present route of each workload: `streams` (as `waste_codes`), `months` (what counts, the category under the rules of the United States, days of storage), `headroom` (results that a month takes before the category rises), `pick_ups`, containers begun, breaches; `null` without a program |
/// | `problems` | everything found on the way, errors first: `severity` (`error`, `warning`, `note`), `path` in the plan, `found`, `need` |
///
/// A workload has `name`, `work` (`results_per_year`, `extractions_per_year` with controls and repeats,
/// `batches_per_year`, which need not be whole), `present` (the name of the present route) and `routes`. A route has
/// `name` and `accounted`; where that is `false` its run stopped, `problems` says why, and nothing else follows. Else:
///
/// | key | what it holds |
/// | --- | --- |
/// | `kg_product_per_year` | what is placed in product |
/// | `figures` | see below |
/// | `refused` | metrics that are not given: `metrics`, `reason` |
/// | `hazard` | `materials` (statements with text where it is known, pictogram codes, signal word, CHEM21 scores 1 to 10 with reasons, or why there are none, source and date), `eco_scale` (Analytical Eco-Scale for one result, its penalty lines), `nemi` (four rules, `met` is `yes`, `no` or `not known`), `not_scored` (materials that reach air or drain without a score) |
/// | `waste_codes` | for each stream that the route fills: `standing`, `kg_per_year`, `codes` that are put on it, `test` (codes that only a test can clear), `verdicts` (`code`, `answer`, `why`, `figures` held against limits, `rule`, `cite`, `since`, `until`, `in_force`, what would `change` it), transport included |
/// | `assumptions` | values that stand in for what the plan leaves out: `path`, `label`, `value`, `source`, `standing` |
/// | `cautions` | what can hurt: `key`, `text`, `source`; local codes and licensed practice decide |
/// | `closure` | (mass in − mass out) / mass in: rounding only |
/// | `postings` | every mass moved, zeros left out: `step` (counted from 0 as in paths; `null` for the feed taken in and for what is placed at the end), `technique`, `rule`, `from`, `to`, `material`, `kg_per_run`, `runs_per_year`, `kg_per_year`, `seconds_per_run` (how long it takes in one run, for what goes to air where the step says so, else `null`), `measured` |
/// | `utilities` | zeros left out: electricity as it counts, and by stated power, physics and meter beside it, heat and cooling of streams (`kwh_per_run`, `kwh_per_year`), cooling water and CO2 sent round (`kg_per_run`, `kg_per_year`) |
/// | `air` | `null` without a room; else `gases`: what each step lets into the room on a day of work, the time course `as_ventilated` and `on_setback` (mean of the first 8 h, worst 8 h and 15 min, highest, every quarter of an hour), `limits` that hold on the plan's date with the verdict, `other_limits` with the reason, the `sensor` and which ones are `blind`; and `sudden`: a cylinder that lets go, at once and mixed, never averaged |
/// | `energy` | `steps`: what each step takes in a year, electricity with the face that `counts` and all three beside it, heat, cooling and work of streams, cooling water; `co2_circuits`: for each step with dense CO2 its `states` (enthalpy and entropy 0 for the ideal gas at 298.15 K and 1 atm; `null` where the equation has no state) and the `changes` between them in J/kg, what the let-down leaves in the vessel, the pressure of liquid `shut_in` between valves at 25 °C, and the flow as `metered` and as the same volume would be elsewhere |
/// | `inputs` | every number that the route rests on: `identity` (the path in the plan, or `material/NAME/PROPERTY`), `value_si`, `unit`, `low_si` and `high_si` (limits) or `standard_uncertainty_si` where it has a spread, `origin` (`entered`, `computed`, `measured`, `assumed`, `not known`), `basis` (the text that was read, or the source) |
///
/// **Figures.** Each has `id` (never reused for another meaning), `title`, `group`, `boundary` (what is counted),
/// `formula`, `source`, `standing`, and its values under keys that name the unit: `kg`, `l` (litres), `kwh`, `containers`
/// `kg_score` (mass times a score), `h`, `money` (in the `currency` of the site) or `kg_co2e` with `_per_result`, `_per_batch`, `_per_month`, `_per_year` and `_per_kg_product`
/// (`null` without a product). A month is a twelfth of the year. Containers are whole in a year; the other values are
/// shares of what fills them, before it is rounded up. A ratio has only `ratio`, a number of things `count`, money paid once `money_once`. All are central values; gross and net stand as figures of their own.
///
/// **Comparison.** `comparison` is `null` where the present route has no account, else `present` and `routes`, one for
/// each other route with an account: `name`, `finding`, `better`, `worse`, `doubts`, and `differences`: `id`, `title`,
/// `present_U`, `route_U`, `change_U` (route less present), `route_over_present` (`null` over nothing) and `causes`, where
/// `U` is the unit with `_per_year`, or `ratio`; of a cause `what` and `change_U`, for containers in litres.
///
/// ```
/// use thimbleworth::{account::account_text, report::result_json};
/// let result = result_json(&account_text("{}"), false);
/// assert!(result.starts_with("{\n  \"thimbleworth_result\": 1,\n  \"program\": \"Thimbleworth "));
/// assert!(result.contains("\"severity\": \"error\""));
/// ```
#[must_use]
pub fn result_json(account: &Account, with_comparison: bool) -> String {
    result_json_drawn(account, with_comparison, None)
}

/// As [`result_json`], with intervals: the document has `seed`, `draws` and `coverage` as well, and each figure the keys `mean_U`,
/// `u_U`, `median_U`, `low_U`, `high_U`, `shortest_low_U`, `shortest_high_U` of [`odds_json`](crate::report::odds_json), for a
/// year where it grows with the work, `null` where there is no interval. A difference of the comparison has the same keys for
/// the change (behind `change_`), and the shares of draws in which the route has `less` and the `same`.
#[must_use]
pub fn result_json_drawn(account: &Account, with_comparison: bool, drawn: Option<Drawn<'_>>) -> String {
    let plan = account.plan.as_ref();
    let program = account.program.as_ref();
    Json::document(|json| {
        json.put("thimbleworth_result", RESULT_VERSION);
        json.put("program", PROGRAM);
        let digest = plan.map(|p| format!("fnv1a64:{:016x}", identity_key(&save(p))));
        json.put("plan_digest", digest.as_deref());
        if let Some(drawn) = drawn {
            json.put("seed", drawn.sampled.seed());
            json.put("draws", drawn.sampled.done());
            json.put("coverage", drawn.coverage);
        }
        json.put("title", plan.map(|p| p.title.as_str()));
        json.put("site", plan.map(|p| p.site.name.as_str()));
        json.put("rules", plan.and_then(|p| p.site.rules.as_deref()));
        json.put("as_of", plan.and_then(|p| p.site.as_of.as_deref()));
        json.list("data_editions", |json| {
            for edition in program.map(editions).unwrap_or_default() {
                json.row(|json| {
                    json.put("key", &edition.key);
                    json.put("cite", &edition.cite);
                    json.put("standing", edition.standing);
                });
            }
        });
        json.list("workloads", |json| {
            let Some(program) = program else { return };
            for (i, work) in program.workloads.iter().enumerate() {
                json.row(|json| workload(json, account, work, i, with_comparison, drawn));
            }
        });
        waste::site(json, account);
        json.list("problems", |json| {
            for problem in &account.problems {
                json.row(|json| {
                    json.put("severity", problem.severity.word());
                    json.put("path", &problem.path);
                    json.put("found", &problem.found);
                    json.put("need", &problem.need);
                });
            }
        });
    })
}

fn workload(
    json: &mut Json,
    account: &Account,
    work: &WorkloadProgram,
    index: usize,
    with_comparison: bool,
    drawn: Option<Drawn<'_>>,
) {
    let Some(site) = account.program.as_ref().map(|p| &p.site) else { return };
    json.put("name", &work.name);
    match work.routes.first().and_then(|route| route.work.runs(Draw(&route.central())).ok()) {
        Some(runs) => json.object("work", |json| {
            json.put("results_per_year", runs.results);
            json.put("extractions_per_year", runs.extractions);
            json.put("batches_per_year", runs.batches);
        }),
        None => json.put("work", Value::Null),
    }
    json.put("present", work.routes.get(work.present).map_or("", |r| r.name.as_str()));
    json.list("routes", |json| {
        let Some(accounts) = account.workloads.get(index) else { return };
        for (r, (route, account)) in work.routes.iter().zip(&accounts.routes).enumerate() {
            json.row(|json| {
                json.put("name", &route.name);
                json.put("accounted", account.is_some());
                if let Some(account) = account {
                    route_account(json, route, site, account, Spreads::of(drawn, index, r));
                }
            });
        }
    });
    if with_comparison {
        match compare(account, index) {
            Some(comparison) => {
                let reading = drawn.and_then(|d| Reading::new(account, d.sampled, index, d.coverage));
                json.object("comparison", |json| {
                    figure::comparison(json, work, &comparison, reading.as_ref());
                });
            }
            None => json.put("comparison", Value::Null),
        }
    }
}

fn route_account(
    json: &mut Json,
    route: &RouteProgram,
    site: &SiteUse,
    account: &RouteAccount,
    spreads: Spreads<'_>,
) {
    json.put("kg_product_per_year", account.product_kg);
    json.list("figures", |json| {
        for (of, value_si) in figures(account) {
            json.row(|json| {
                figure(json, account, of, value_si);
                if spreads.there() {
                    summary(json, "", of.measure, spreads.get(&of.id));
                }
            });
        }
    });
    json.list("refused", |json| {
        for refusal in &account.refusals {
            json.row(|json| {
                json.put("metrics", refusal.metrics);
                json.put("reason", &refusal.reason);
            });
        }
    });
    json.object("hazard", |json| hazard::hazard(json, &account.hazard));
    json.list("waste_codes", |json| waste::streams(json, Pouring { route, account }, site));
    json.list("assumptions", |json| {
        for assumption in &route.assumptions {
            json.row(|json| posting::assumption(json, assumption));
        }
    });
    json.list("cautions", |json| {
        for caution in &account.cautions {
            json.row(|json| {
                json.put("key", caution.key);
                json.put("text", caution.text);
                json.put("source", caution.source.cite);
            });
        }
    });
    json.put("closure", account.closure);
    json.list("postings", |json| {
        for moved in account.trace.postings.iter().filter(|p| p.kg != 0.0) {
            json.row(|json| posting::posting(json, route, site, moved));
        }
    });
    json.list("utilities", |json| {
        for spent in account.trace.spendings.iter().filter(|s| s.amount_si != 0.0) {
            json.row(|json| posting::spending(json, route, spent));
        }
    });
    json.object("energy", |json| energy::energy(json, route, account));
    air::air(json, route, account);
    inputs(json, &mut route.inputs.iter());
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::account::account_text;
    use crate::example::EXAMPLES;
    use serde_json::Value as Read;

    fn read(text: &str, compared: bool) -> Read {
        serde_json::from_str(&result_json(&account_text(text), compared)).unwrap()
    }

    #[test]
    fn every_figure_has_its_unit_in_its_keys_and_scales() {
        for example in EXAMPLES {
            let result = read(example.text, false);
            assert_eq!(result["thimbleworth_result"], 1);
            for workload in result["workloads"].as_array().unwrap() {
                let results = workload["work"]["results_per_year"].as_f64().unwrap();
                for route in workload["routes"].as_array().unwrap() {
                    assert_eq!(route["accounted"], true, "{}", example.key);
                    for figure in route["figures"].as_array().unwrap() {
                        let keys: Vec<&String> = figure.as_object().unwrap().keys().collect();
                        if ["ratio", "count", "money_once"].iter().any(|k| figure.get(k).is_some()) {
                            assert_eq!(keys.len(), 8, "{keys:?}");
                            continue;
                        }
                        let unit = ["kg", "l", "kwh", "containers", "kg_score", "h", "money", "kg_co2e"]
                            .into_iter()
                            .find(|u| figure.get(format!("{u}_per_year")).is_some())
                            .unwrap();
                        let value = |per: &str| figure[format!("{unit}_per_{per}")].as_f64().unwrap();
                        let year = value("year");
                        let near = |a: f64, b: f64| (a - b).abs() <= 1e-12 * b.abs();
                        // Of containers what fills them is shared out; the year's number is that, rounded up.
                        let shared = value("result") * results;
                        assert!(near(value("month") * 12.0, shared));
                        assert!(
                            near(shared, year)
                                || unit == "containers" && (0.0..1.0).contains(&(year - shared))
                        );
                        assert_eq!(keys.len(), 12, "{keys:?}");
                    }
                }
            }
        }
    }

    #[test]
    fn the_postings_add_up_to_the_mass_that_came_in() {
        let result = read(EXAMPLES[0].text, false);
        let route = &result["workloads"][0]["routes"][0];
        let came: f64 = route["postings"]
            .as_array()
            .unwrap()
            .iter()
            .filter(|p| p["from"] == "feed" || p["from"] == "store")
            .map(|p| p["kg_per_year"].as_f64().unwrap())
            .sum();
        let figure = route["figures"].as_array().unwrap().iter().find(|f| f["id"] == "mass.in").unwrap();
        assert!((came / figure["kg_per_year"].as_f64().unwrap() - 1.0).abs() < 1e-12);
        assert!(route["closure"].as_f64().unwrap().abs() < 1e-12);
    }

    #[test]
    fn the_comparison_is_there_when_asked_for_and_keys_keep_their_order() {
        let account = account_text(EXAMPLES[0].text);
        let (plain, compared) = (result_json(&account, false), result_json(&account, true));
        assert!(!plain.contains("\"comparison\"") && compared.contains("\"finding\""));
        let at = |key: &str| compared.find(&format!("\n  \"{key}\": ")).unwrap();
        let order =
            ["thimbleworth_result", "program", "plan_digest", "title", "site", "workloads", "problems"];
        assert!(order.windows(2).all(|w| at(w[0]) < at(w[1])));
        assert_eq!(result_json(&account_text(EXAMPLES[0].text), true), compared);
    }

    #[test]
    fn what_is_no_plan_still_gives_a_document() {
        for text in ["", "{", "[]", "{\"thimbleworth\": 99}"] {
            let result = read(text, true);
            assert_eq!(result["workloads"].as_array().unwrap().len(), 0);
            assert_eq!(result["problems"][0]["severity"], "error", "{text}");
        }
    }

    #[test]
    fn the_digest_follows_the_plan_and_not_its_layout() {
        let text = EXAMPLES[0].text;
        let spaced = text.replace("\": ", "\":   ");
        assert_eq!(read(text, false)["plan_digest"], read(&spaced, false)["plan_digest"]);
        let other = text.replacen("\"title\": \"", "\"title\": \"Again: ", 1);
        assert_ne!(read(text, false)["plan_digest"], read(&other, false)["plan_digest"]);
    }
}
