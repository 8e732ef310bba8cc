//! What a full container holds, summed from everything poured in, with a draft of its waste profile.

use super::{Paper, PaperTable, Sheet, mass, percent, volume};
use crate::account::{StreamDesk, classified};
use crate::code::Flash;
use crate::order;
use crate::quantity::{Kind, show, significant};

pub(super) fn paper(sheet: &Sheet<'_>) -> Paper {
    Paper {
        title: "Contents of full containers".into(),
        lead: vec!["In the proportions of a year; a single container may differ.".into()],
        tables: sheet.desk.streams.iter().map(|s| one(sheet, s)).collect(),
        foot: vec![
            "A draft of a profile, not an analysis: pH and flash point are measured before it is signed."
                .into(),
        ],
    }
}

fn one(sheet: &Sheet<'_>, s: &StreamDesk<'_>) -> PaperTable {
    let kg = s.contents.mass_kg();
    let full = sheet.container_kg(s);
    let mut rows = Vec::new();
    let mut put = |what: &str, amount: String, share: String| rows.push(vec![what.to_owned(), amount, share]);
    for p in &s.contents.parts {
        let share = p.kg / kg;
        put(&p.substance.name, full.map_or_else(String::new, |full| mass(full * share)), percent(share));
    }
    put("all of it", full.map_or_else(String::new, mass), String::new());
    let (water, halogen) = (s.contents.water_share(), s.contents.halogen_share());
    if water == 0.0 {
        put("water", String::new(), percent(water));
    }
    put("organic halogen, as the elements", String::new(), percent(halogen));
    if let Some(density) = s.contents.density_kg_m3().filter(|_| !s.contents.solid) {
        put("density, as if volumes added", show(density, Kind::Density), String::new());
    }
    if s.contents.aqueous() {
        let ph = s.contents.ph.map_or_else(
            || "not known".to_owned(),
            |(low, high)| [significant(low, 3), significant(high, 3)].join(" to "),
        );
        put("pH", ph, String::new());
    }
    let flash = match s.contents.flash {
        None => "not tested".to_owned(),
        Some(Flash::None) => "none by test".to_owned(),
        Some(Flash::AtK(k)) => show(k, Kind::Temperature),
    };
    put("flash point", flash, String::new());
    // How many batches it takes to fill one: N = n M / m, with n batches a year that bring the stream m a year.
    if let Some(full) = full {
        for (work, pouring) in sheet.program.workloads.iter().zip(&sheet.desk.routes) {
            let Some(pouring) = pouring else { continue };
            if classified(&[*pouring], sheet.site).iter().any(|own| own.stream == s.stream) {
                let batches = pouring.account.runs.batches * full / kg;
                let what = ["batches of ", &work.name, ", ", &pouring.route.name].concat();
                put(&what, significant(batches, 3), String::new());
            }
        }
    }
    put("codes", s.codes().join(" "), String::new());
    put("open until tested", s.open().join(" "), String::new());
    let mut charges: Vec<&str> = s.contents.charges.iter().map(|c| c.what.as_str()).collect();
    order::sort(&mut charges, &|a, b| a < b);
    charges.dedup();
    put("solvents come from", charges.join("; "), String::new());
    let size = sheet.stream(s).and_then(|u| Some((u.container_m3?, u.fill)));
    let title = size.map_or_else(
        || [sheet.name(s), ", shares only: the plan gives no size"].concat(),
        |(m3, fill)| [sheet.name(s), ", ", &volume(m3), " filled to ", &percent(fill)].concat(),
    );
    PaperTable { title, head: &["What", "Amount", "Share by mass"], rows }
}
