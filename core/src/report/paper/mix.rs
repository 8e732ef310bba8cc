//! The mix of routes that lowers a figure most for what it costs, as a paper.

use super::{Paper, PaperTable, Sheet};
use crate::account::{Account, Measure, site_desk};
use crate::case::{Bound, Mix, Mixes, mixes};
use crate::program::Program;
use crate::quantity::{Currency, significant};

/// The most steps that are listed.
const MOST: usize = 24;

/// The mix with the least of a figure under a bound, with the steps that lead there.
///
/// ```
/// use thimbleworth::{account::account_text, case::Bound, example::EXAMPLES, report::mix_paper};
/// let account = account_text(EXAMPLES[0].text);
/// let paper = mix_paper(&account, "waste.hazardous", Bound::None).unwrap();
/// assert!(paper.title.starts_with("The mix with least"));
/// ```
///
/// # Errors
/// What stands in the way, a sentence without a full stop.
pub fn mix_paper(account: &Account, figure: &str, bound: Bound) -> Result<Paper, String> {
    let found = mixes(account, figure, bound)?;
    let program = account.program.as_ref().ok_or("the plan has no program")?;
    let chosen = found.chosen.and_then(|at| found.front.get(at));
    let desk = site_desk(account, chosen.map_or(&[][..], |m| &m.routes)).ok_or("the plan has no program")?;
    let sheet = Sheet { account, program, site: &program.site, desk: &desk };
    let mut paper = Paper {
        title: ["The mix with least ", &found.title].concat(),
        lead: vec![sheet.heading()],
        ..Paper::default()
    };
    let words = Words { measure: found.measure, currency: found.currency };
    paper.lead.push(match bound {
        Bound::None => "Nothing holds the cost.".to_owned(),
        Bound::Budget(more) => {
            ["At most ", &words.money(more), " a year more than the present routes."].concat()
        }
        Bound::Price(price) => {
            [&words.money(price), " is paid for each ", words.unit(), " that is not there."].concat()
        }
    });
    match chosen {
        None => paper.lead.push("No mix keeps within that; the cheapest stands first below.".to_owned()),
        Some(mix) if mix.routes == found.present.routes => {
            paper.lead.push("The present routes are that mix.".to_owned());
        }
        Some(mix) => {
            paper.lead.push(words.sentence(mix, &found.present));
            paper.tables.push(switched(program, mix, &found.present));
        }
    }
    paper.tables.push(steps(program, &found, words));
    if !found.left_out.is_empty() {
        let rows = found.left_out.iter().filter_map(|l| {
            let work = program.workloads.get(l.workload)?;
            Some(vec![work.name.clone(), work.routes.get(l.route)?.name.clone(), l.why.join("; ")])
        });
        paper.tables.push(PaperTable {
            title: "In no mix".into(),
            head: &["Work", "Route", "Why"],
            rows: rows.collect(),
        });
    }
    paper.foot.push(
        "Figures and costs of workloads add up, so every mix is held against every other one.".to_owned(),
    );
    if found.currency.is_some() {
        paper.foot.push("Cost is the running cost of a year, and what is paid once (instruments, validation) spread over the site's years at its rate.".to_owned());
    }
    if found.thinned {
        paper.foot.push("There are more mixes than are kept: those that differ by less than a two-thousandth of the range are left out.".to_owned());
    }
    for doubt in &found.doubts {
        paper.foot.push([&crate::letter::sentence(doubt), "."].concat());
    }
    sheet.foot(&mut paper.foot);
    Ok(paper)
}

/// How amounts of this figure and money are written.
#[derive(Clone, Copy)]
struct Words {
    measure: Measure,
    currency: Option<Currency>,
}

impl Words {
    fn unit(&self) -> &'static str {
        self.measure.written().0
    }

    fn amount(&self, si: f64) -> String {
        significant(si * self.measure.written().1, 4)
    }

    fn money(&self, amount: f64) -> String {
        let code = self.currency.as_ref().map_or("", Currency::code);
        [&significant(amount, 4), " ", code].concat()
    }

    /// The cost of each unit that is lowered; empty where nothing is.
    fn each(&self, mix: &Mix, before: &Mix) -> String {
        let (less, more) = ((before.figure - mix.figure) * self.measure.written().1, mix.cost - before.cost);
        if self.currency.is_some() && less > 0.0 && more > 0.0 {
            significant(more / less, 4)
        } else {
            String::new()
        }
    }

    fn sentence(&self, mix: &Mix, present: &Mix) -> String {
        let mut out = [
            self.measure.shown(mix.figure).as_str(),
            " a year instead of ",
            &self.measure.shown(present.figure),
        ]
        .concat();
        if self.currency.is_some() {
            let more = mix.cost - present.cost;
            let (how, way) = if more < 0.0 { (", and ", " less a year") } else { (", for ", " more a year") };
            out.push_str(&[how, &self.money(more.abs()), way].concat());
        }
        out.push('.');
        out
    }
}

fn name(program: &Program, w: usize, route: Option<usize>) -> &str {
    let route = route.and_then(|r| program.workloads.get(w)?.routes.get(r));
    route.map_or("no account", |r| r.name.as_str())
}

/// The workloads whose route changes.
fn changes<'a>(
    mix: &'a Mix,
    present: &'a Mix,
) -> impl Iterator<Item = (usize, Option<usize>, Option<usize>)> + 'a {
    let both = mix.routes.iter().zip(&present.routes).enumerate();
    both.filter(|(_, (new, old))| new != old).map(|(w, (new, old))| (w, *old, *new))
}

fn switched(program: &Program, mix: &Mix, present: &Mix) -> PaperTable {
    let mut rows = Vec::new();
    for (w, old, new) in changes(mix, present) {
        let work = program.workloads.get(w).map_or("", |work| work.name.as_str());
        rows.push([work, name(program, w, old), name(program, w, new)].map(str::to_owned).to_vec());
    }
    PaperTable { title: "What it changes".into(), head: &["Work", "Present route", "Route in the mix"], rows }
}

/// The mixes that lower most for each sum: the corners of the front, which a price would choose.
fn corners(front: &[Mix]) -> Vec<usize> {
    let mut out: Vec<usize> = Vec::new();
    for (at, mix) in front.iter().enumerate() {
        while let [.., a, b] = out[..] {
            let (Some(a), Some(b)) = (front.get(a), front.get(b)) else { break };
            // The corner b lies on or above the line from a to the next one.
            let turn =
                (b.cost - a.cost) * (mix.figure - a.figure) - (mix.cost - a.cost) * (b.figure - a.figure);
            if turn > 0.0 {
                break;
            }
            out.pop();
        }
        out.push(at);
    }
    out
}

fn steps(program: &Program, found: &Mixes, words: Words) -> PaperTable {
    let few = found.front.len() <= MOST;
    let mut listed: Vec<usize> = if few { (0..found.front.len()).collect() } else { corners(&found.front) };
    listed.truncate(MOST);
    let mut rows = Vec::new();
    let mut one = |mix: &Mix, what: &str| {
        let mut names = Vec::new();
        for (w, _, new) in changes(mix, &found.present) {
            let work = program.workloads.get(w).map_or("", |work| work.name.as_str());
            names.push([work, ": ", name(program, w, new)].concat());
        }
        let change = |now: f64, then: f64| significant(now - then, 4);
        let unit = words.measure.written().1;
        rows.push(vec![
            if names.is_empty() { "none".to_owned() } else { names.join("; ") },
            words.amount(mix.figure),
            change(mix.figure * unit, found.present.figure * unit),
            if words.currency.is_some() {
                change(mix.cost, found.present.cost)
            } else {
                "not known".to_owned()
            },
            words.each(mix, &found.present),
            what.to_owned(),
        ]);
    };
    if !found.front.iter().any(|m| m.routes == found.present.routes) {
        one(&found.present, "present");
    }
    for at in listed.iter().copied().chain(found.chosen.filter(|at| !listed.contains(at))) {
        let Some(mix) = found.front.get(at) else { continue };
        let present = mix.routes == found.present.routes;
        one(
            mix,
            match (Some(at) == found.chosen, present) {
                (true, true) => "sought, present",
                (true, false) => "sought",
                (false, true) => "present",
                (false, false) => "",
            },
        );
    }
    let unit = words.unit();
    let code = words.currency.as_ref().map_or("money", Currency::code);
    PaperTable {
        title: [
            if few {
                "Every mix that no other beats in both"
            } else {
                "The mixes that lower most for each sum"
            },
            ": ",
            &found.title,
            " in ",
            unit,
            ", cost in ",
            code,
            ", a year",
        ]
        .concat(),
        head: &["Changed", "Figure", "Change", "Change of cost", "Cost of each unit less", ""],
        rows,
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn corners_are_what_some_price_would_choose() {
        let mix = |cost: f64, figure: f64| Mix { routes: Vec::new(), figure, cost };
        let front =
            [mix(0.0, 10.0), mix(1.0, 9.0), mix(2.0, 4.0), mix(5.0, 3.0), mix(6.0, 1.0), mix(9.0, 0.0)];
        assert_eq!(corners(&front), [0, 2, 4, 5]);
        for price in [0.01, 0.1, 0.5, 1.0, 2.0, 4.0, 20.0] {
            let whole = |m: &Mix| m.cost + price * m.figure;
            let best =
                (0..front.len()).min_by(|a, b| whole(&front[*a]).total_cmp(&whole(&front[*b]))).unwrap();
            assert!(corners(&front).contains(&best), "{price}");
        }
    }
}
