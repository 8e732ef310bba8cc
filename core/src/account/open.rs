//! From a plan to the account of every route.

use super::air::{self, AirAccount};
use super::figure::{Draft, Figure, How, evaluate};
use super::hazard::HazardAccount;
use super::metric::Refusal;
use super::{carbon_dioxide, climate, cost, energy, hazard, mass, metric, time, waste};
use crate::chance::Draw;
use crate::ledger::{Direction, Halt, Material, Place, RuleIx, StepIx, Trace};
use crate::plan::{Plan, Problem, Severity, below, open};
use crate::program::{BOOK_RULES, Desk, Failure, Program, RouteProgram, Runs, SiteUse, resolve};
use crate::quantity::{Kind, show};
use crate::step::{Caution, DenseCo2, Rule};

/// The account of a whole plan.
pub struct Account {
    /// The plan as it was read, as far as it could be read.
    pub plan: Option<Plan>,
    /// The program, where the plan has no error.
    pub program: Option<Program>,
    /// The accounts, a workload each; empty where there is no program.
    pub workloads: Vec<WorkloadAccount>,
    /// Everything found on the way, worst first.
    pub problems: Vec<Problem>,
}

/// The account of one piece of work.
pub struct WorkloadAccount {
    /// The account of each route, in the order of the plan; `None` for a route whose run stopped, with the reason among the problems.
    pub routes: Vec<Option<RouteAccount>>,
}

/// The account of one route.
pub struct RouteAccount {
    /// How often things happen in a year.
    pub runs: Runs,
    /// The figures.
    pub figures: Vec<Figure>,
    /// The value of each figure: a year for those that grow with the work, SI.
    pub values: Vec<f64>,
    /// Every posting with its working.
    pub trace: Trace,
    /// (In − out) / in: how far rounding keeps the book from closing.
    pub closure: f64,
    /// What the materials can do to people and water.
    pub hazard: HazardAccount,
    /// Metrics that are not given, with the reason.
    pub refusals: Vec<Refusal>,
    /// The usual cautions of its steps.
    pub cautions: Vec<&'static Caution>,
    /// Steps with dense CO2 as their states are, by their index in the route; central values.
    pub dense: Vec<(usize, DenseCo2)>,
    /// The air of the room, where the site gives one.
    pub air: Option<AirAccount>,
    /// Product made in a year; kg.
    pub product_kg: f64,
    /// What cost and climate leave open: what it is, and the path at which the plan could say it.
    pub open: Vec<(String, String)>,
}

impl Account {
    /// Whether any problem is an error.
    #[must_use]
    pub fn broken(&self) -> bool {
        self.problems.iter().any(|p| p.severity == Severity::Error)
    }
}

impl RouteAccount {
    /// The value of the figure with this id: a year for those that grow with the work, SI.
    #[must_use]
    pub fn value(&self, id: &str) -> Option<f64> {
        let i = self.figures.iter().position(|f| f.id == id)?;
        self.values.get(i).copied()
    }

    /// What of a figure is shared out over results, batches, months and product: the year's amount, and of containers what fills them,
    /// before the year's number is rounded up.
    #[must_use]
    pub fn shared(&self, figure: &Figure, a_year: f64) -> f64 {
        match figure.how {
            // V / (V_c · fill)
            How::Containers { of, takes } => self.values.get(of).map_or(a_year, |amount| amount / takes),
            _ => a_year,
        }
    }

    /// A yearly figure for each reported result.
    #[must_use]
    pub fn per_result(&self, a_year: f64) -> f64 {
        a_year / self.runs.results
    }

    /// A yearly figure for each batch.
    #[must_use]
    pub fn per_batch(&self, a_year: f64) -> f64 {
        a_year / self.runs.batches
    }

    /// A yearly figure for each kilogram of product, where there is any.
    #[must_use]
    pub fn per_kg_product(&self, a_year: f64) -> Option<f64> {
        (self.product_kg > 0.0).then(|| a_year / self.product_kg)
    }
}

/// Opens a plan's text and accounts for every route.
///
/// Never fails: what is wrong stands in [`Account::problems`], each with its path, what was found and what would do.
#[must_use]
pub fn account_text(text: &str) -> Account {
    let opened = open(text);
    let usable = opened.usable();
    let mut problems = opened.problems;
    let mut account = match opened.plan {
        // A plan with errors of shape is resolved all the same, so that errors of meaning are told with them.
        Some(plan) => {
            let (program, workloads, problems) = drawn_up(&plan);
            Account { plan: Some(plan), program, workloads, problems }
        }
        None => Account { plan: None, program: None, workloads: Vec::new(), problems: Vec::new() },
    };
    if !usable {
        account.program = None;
        account.workloads.clear();
    }
    // What the reader has refused is not refused again for its meaning.
    let refused = |p: &Problem| problems.iter().any(|q| q.severity == Severity::Error && q.path == p.path);
    let mut meant: Vec<Problem> = account.problems.into_iter().filter(|p| !refused(p)).collect();
    problems.append(&mut meant);
    sort(&mut problems);
    account.problems = problems;
    account
}

/// Accounts for every route of a plan.
#[must_use]
pub fn account(plan: &Plan) -> Account {
    let (program, workloads, problems) = drawn_up(plan);
    Account { plan: Some(plan.clone()), program, workloads, problems }
}

fn drawn_up(plan: &Plan) -> (Option<Program>, Vec<WorkloadAccount>, Vec<Problem>) {
    let resolved = resolve(plan);
    let mut problems = resolved.problems;
    let mut workloads = Vec::new();
    if let Some(program) = &resolved.program {
        for workload in &program.workloads {
            let routes =
                workload.routes.iter().map(|r| account_route(r, &program.site, &mut problems)).collect();
            workloads.push(WorkloadAccount { routes });
        }
    }
    sort(&mut problems);
    (resolved.program, workloads, problems)
}

/// Worst first; among equals in the order of the document.
fn sort(problems: &mut Vec<Problem>) {
    let mut milder = std::mem::take(problems);
    for severity in [Severity::Error, Severity::Warning] {
        let (these, others) = milder.into_iter().partition(|p| p.severity == severity);
        problems.extend::<Vec<_>>(these);
        milder = others;
    }
    problems.append(&mut milder);
}

fn account_route(route: &RouteProgram, site: &SiteUse, problems: &mut Vec<Problem>) -> Option<RouteAccount> {
    let x = route.central();
    let mut desk = route.desk();
    let mut trace = Trace::default();
    if let Err(failure) = route.run(Draw(&x), &mut desk, Some(&mut trace)) {
        problems.push(explain(route, &failure));
        return None;
    }
    doubted(route, &trace, problems);
    placed_by_default(route, site, &desk, problems);
    returned_unbought(route, &desk, problems);
    let mut draft = Draft::default();
    mass::draw_up(&mut draft, route, site, &desk);
    waste::draw_up(&mut draft, route, site, &desk);
    let dense = energy::dense(route, Draw(&x), &trace);
    carbon_dioxide::draw_up(&mut draft, route, site, &desk, &dense);
    let refusals = metric::draw_up(&mut draft, route, site, &desk);
    energy::draw_up(&mut draft, &desk);
    let hours = time::draw_up(&mut draft, route);
    let mut open = cost::draw_up(&mut draft, route, site, &desk, hours);
    open.extend(climate::draw_up(&mut draft, route, site, &desk));
    let assessed = hazard::materials(route, &desk, site);
    hazard::draw_up(&mut draft, route, &desk, &assessed);
    left_open(route, &open, problems);
    let figures = draft.kept_to(&trace, &desk.cells);
    let mut values = vec![0.0; figures.len()];
    evaluate(&figures, &desk, Draw(&x), &mut values);
    let mut product_kg = 0.0;
    for m in mass::materials(route) {
        product_kg += desk.cells.passed(Place::PRODUCT, Direction::Into, m);
    }
    let mut cautions: Vec<&'static Caution> = Vec::new();
    for caution in route.steps.iter().flat_map(|s| s.technique.cautions) {
        if !cautions.iter().any(|c| c.key == caution.key) {
            cautions.push(caution);
        }
    }
    let air = air::air(route, site, &trace);
    if let Some(air) = &air {
        air::tell(air, &route.name, problems);
    }
    Some(RouteAccount {
        runs: desk.runs,
        closure: mass::closure(route, site, &desk),
        hazard: hazard::account(route, site, &desk, assessed),
        figures,
        values,
        trace,
        refusals,
        cautions,
        dense,
        air,
        product_kg,
        open,
    })
}

/// What cost and climate leave open, because the plan does not say it: each is told once, whatever the number of routes.
fn left_open(route: &RouteProgram, open: &[(String, String)], problems: &mut Vec<Problem>) {
    for (what, path) in open {
        let found = format!("{what} is not known, so neither is what rests on it");
        if problems.iter().any(|p| p.path == *path && p.found == found) {
            continue;
        }
        let need = if path.starts_with("site.") {
            "its figure, with its limits".to_owned()
        } else {
            format!("its figure for {}", route.name)
        };
        problems.push(Problem::warning(path.clone(), found, need));
    }
}

fn doubted(route: &RouteProgram, trace: &Trace, problems: &mut Vec<Problem>) {
    for doubt in &trace.doubts {
        let path = match doubt.step {
            StepIx::Step(i) => route.steps.get(i as usize).map_or(&route.path, |s| &s.path),
            StepIx::Opening | StepIx::Closing => &route.path,
        };
        let rule = rule_of(route, doubt.step, doubt.rule).map_or("", |r| r.name);
        let found = format!("{rule}: {} {}", doubt.found, show(doubt.value_si, doubt.kind));
        problems.push(Problem::warning(path.clone(), found, doubt.need));
    }
}

fn placed_by_default(route: &RouteProgram, site: &SiteUse, desk: &Desk, problems: &mut Vec<Problem>) {
    for (i, place) in Place::BENCH.into_iter().enumerate() {
        let kg = desk.placed_by_default_kg[i];
        if let (true, Some((to, false))) = (kg > 0.0, route.ends[i]) {
            let name = place.name().unwrap_or_default();
            problems.push(Problem::warning(
                below(&below(&route.path, "ends"), name),
                format!(
                    "{} left in the {name} is placed in {} by default",
                    show(kg, Kind::Mass),
                    mass::place_name(site, to)
                ),
                format!("say under ends where the {name} goes"),
            ));
        }
    }
}

/// What goes back to the store without having come from it: feed water in a condensate, for one.
fn returned_unbought(route: &RouteProgram, desk: &Desk, problems: &mut Vec<Problem>) {
    for m in mass::materials(route) {
        let drawn = desk.cells.passed(Place::STORE, Direction::OutOf, m);
        let back = desk.cells.passed(Place::STORE, Direction::Into, m);
        if back > drawn * (1.0 + 1e-9) {
            let name = route.materials.get(m.0 as usize).map_or("", |m| m.name.as_str());
            problems.push(Problem::warning(
                below(&route.path, "steps"),
                format!(
                    "{} of {name} goes back to the store in a year where {} was drawn: the figures net of recovery count the rest as a gain",
                    show(back, Kind::Mass),
                    show(drawn, Kind::Mass)
                ),
                format!("a stream for the {name}, or a step that takes it out before"),
            ));
        }
    }
}

/// The rule that a posting, note or halt names.
#[must_use]
pub fn rule_of(route: &RouteProgram, step: StepIx, rule: RuleIx) -> Option<&'static Rule> {
    match step {
        StepIx::Opening | StepIx::Closing => BOOK_RULES.get(rule.0 as usize),
        StepIx::Step(i) => route.steps.get(i as usize)?.technique.rules.get(rule.0 as usize),
    }
}

/// The path of the measured figure that stands in place of a rule, where one does.
fn measured_path(route: &RouteProgram, step: StepIx, rule: RuleIx) -> Option<String> {
    let StepIx::Step(i) = step else { return None };
    let step = route.steps.get(i as usize)?;
    step.measured.get(rule.0 as usize).copied().flatten()?;
    let name = step.technique.rules.get(rule.0 as usize)?.name;
    Some(below(&below(&step.path, "measured"), name))
}

/// The sentence of a state or loop says what would do after its last semicolon.
pub(super) fn found_and_need(text: &str) -> (String, String) {
    let (found, need) = text.rsplit_once("; ").unwrap_or((text, "another temperature or pressure"));
    (found.to_owned(), need.to_owned())
}

fn explain(route: &RouteProgram, failure: &Failure) -> Problem {
    let path = match failure.step {
        StepIx::Opening => below(&route.path, "steps"),
        StepIx::Closing => below(&route.path, "ends"),
        StepIx::Step(i) => route.steps.get(i as usize).map_or_else(|| route.path.clone(), |s| s.path.clone()),
    };
    let path = match failure.halt {
        Halt::Short { rule, .. }
        | Halt::MeasuredTooMuch { rule, .. }
        | Halt::NothingToMeasure { rule, .. } => measured_path(route, failure.step, rule).unwrap_or(path),
        _ => path,
    };
    let rule = |r| rule_of(route, failure.step, r).map_or("a rule", |r| r.name);
    let name = |m: Material| route.materials.get(m.0 as usize).map_or("", |m| m.name.as_str());
    let at = |p: Place| p.name().unwrap_or("a stream");
    let (found, need) = match failure.halt {
        Halt::Short { rule: r, place, material, wanted_kg, there_kg } => (
            format!(
                "\"{}\" takes {} of {} from the {}, where {} is",
                rule(r),
                show(wanted_kg, Kind::Mass),
                name(material),
                at(place),
                show(there_kg, Kind::Mass)
            ),
            "a smaller amount, or an earlier step that brings more".to_owned(),
        ),
        Halt::MeasuredTooMuch { rule: r, place, measured_kg, there_kg } => (
            format!(
                "{} is measured for \"{}\", but of what it moves only {} is there, in the {}",
                show(measured_kg, Kind::Mass),
                rule(r),
                show(there_kg, Kind::Mass),
                at(place)
            ),
            "a mass in one run of the step, no more than is there".to_owned(),
        ),
        Halt::NothingToMeasure { rule: r, place } => (
            format!(
                "a measured figure is given for \"{}\", but the {} holds nothing that it could apply to",
                rule(r),
                at(place)
            ),
            "leave the measured figure out, or an earlier step that puts something there".to_owned(),
        ),
        Halt::Empty { place } => (
            format!("the step needs something in the {}, and it is empty", at(place)),
            match place {
                Place::MARC | Place::SECOND_PHASE => "a feed for the workload or the route".to_owned(),
                _ => format!("an earlier step that leaves something in the {}", at(place)),
            },
        ),
        Halt::NoLiquid { place } => (
            format!("the step shakes a liquid in the {}, and there is none", at(place)),
            "a feed with water, such as { \"water\": \"1 L\" }".to_owned(),
        ),
        Halt::Occupied { place, left_kg } => (
            format!("the step works through the {}, where {} still lies", at(place), show(left_kg, Kind::Mass)),
            "let the vessel down in the stage before (let_down true), or place what lies there with \"discard\"".to_owned(),
        ),
        Halt::FinerBasis { left_kg } => (
            format!(
                "the step happens more often than the one before it while {} still lies on the bench",
                show(left_kg, Kind::Mass)
            ),
            "steps in the order sample, batch, month, year; or empty the bench first".to_owned(),
        ),
        Halt::NoEnd { place, left_kg } => (
            format!(
                "{} is left in the {}, and nothing says where it goes",
                show(left_kg, Kind::Mass),
                at(place)
            ),
            match place {
                Place::VAPOUR => "let_down true in the last stage, or under ends a place for \"vapour\"".to_owned(),
                _ => format!("under ends a place for \"{}\", or a stream of that kind under site.streams", at(place)),
            },
        ),
        Halt::DoesNotFit { wanted_m3, there_m3 } => (
            format!("{} has to fit into {}", show(wanted_m3, Kind::Volume), show(there_m3, Kind::Volume)),
            "a larger vessel or less in it".to_owned(),
        ),
        Halt::NotReached { wanted_m3, there_m3 } => (
            format!(
                "{} is to be left, but only {} is there",
                show(wanted_m3, Kind::Volume),
                show(there_m3, Kind::Volume)
            ),
            "a smaller volume to be left, or no concentration".to_owned(),
        ),
        Halt::Boils { vapour_pa, pressure_pa, temperature_k } => (
            format!(
                "at {} the vapour has {} of the {} that are held: nothing is left to condense it or to carry it",
                show(temperature_k, Kind::Temperature),
                show(vapour_pa, Kind::Pressure),
                show(pressure_pa, Kind::Pressure)
            ),
            "a colder coolant or liquid, or a higher pressure".to_owned(),
        ),
        Halt::TooShort { given_s, least_s } => (
            format!(
                "{} is stated, but a gas that leaves saturated needs at least {}",
                show(given_s, Kind::Time),
                show(least_s, Kind::Time)
            ),
            "more time, more gas or a warmer bath; a real stream takes several times the least time".to_owned(),
        ),
        Halt::NoVapour { temperature_k, low_k, high_k } => (
            format!("the vapour over the liquid is not known at {}", show(temperature_k, Kind::Temperature)),
            format!(
                "a temperature between {} and {}, or a share in place of the physics",
                show(low_k, Kind::Temperature),
                show(high_k, Kind::Temperature)
            ),
        ),
        Halt::OutOfRange { of, value, allowed } => {
            (format!("the {of} comes to {value}"), allowed.to_owned())
        }
        Halt::Co2(e) => found_and_need(&e.to_string()),
        Halt::Loop(e) => found_and_need(&e.to_string()),
        Halt::NotANumber { rule: r } => (
            format!("\"{}\" comes to an amount that is negative or not a finite number", rule(r)),
            "check the amounts of this step".to_owned(),
        ),
        Halt::NoRuns => {
            ("the work comes to no runs in a year".to_owned(), "results and a batch above zero".to_owned())
        }
    };
    Problem::error(path, found, need)
}
