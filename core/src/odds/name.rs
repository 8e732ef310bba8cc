//! What an input is called in a sentence.

use crate::program::{Fields, ROUTE_FIELDS, SITE_FIELDS, WorkloadProgram};

/// What a declared field is called, inside a sentence.
fn label(groups: &[Fields], under: &str, key: &str) -> Option<String> {
    let fields = groups.iter().find(|g| g.0 == under)?.2;
    let label = fields.iter().find(|p| p.key == key)?.label;
    Some(if label.starts_with("CO2") { label.to_owned() } else { crate::letter::small_text(label) })
}

/// The input of this identity in words: `density of n-hexane`, `Soxhlet, step 3 (Soxhlet extraction): charge`, `price of
/// acetone`.
#[must_use]
pub fn input_words(work: &WorkloadProgram, identity: &str) -> String {
    let plain =
        |path: &str| path.trim_start_matches('.').replace(['_', '[', ']', '"', '.'], " ").trim().to_owned();
    if let Some((name, property)) = identity.strip_prefix("material/").and_then(|r| r.rsplit_once('/')) {
        return format!("{} of {name}", property.replace('_', " "));
    }
    for (under, words) in [("site.money.prices", "price of"), ("site.money.disposal", "removal of")] {
        if let Some(name) = identity.strip_prefix(under) {
            return format!("{words} {}", name.trim_start_matches('.').replace(['[', ']', '"'], ""));
        }
    }
    for route in &work.routes {
        let Some(rest) = identity.strip_prefix(route.path.as_str()) else { continue };
        for (i, step) in route.steps.iter().enumerate() {
            if let Some(rest) = identity.strip_prefix(step.path.as_str()) {
                let key = rest.trim_start_matches('.');
                let param = step.technique.params.iter().find(|p| p.key == key);
                let what = param.map_or_else(|| plain(key), |p| crate::letter::small_text(p.label));
                return format!("{}, step {} ({}): {what}", route.name, i + 1, step.technique.title);
            }
        }
        let (under, key) =
            rest.trim_start_matches('.').rsplit_once('.').unwrap_or(("", rest.trim_start_matches('.')));
        let declared = label(ROUTE_FIELDS, under, key);
        return format!("{}: {}", route.name, declared.unwrap_or_else(|| plain(rest)));
    }
    if let Some((under, key)) = identity.strip_prefix("site.").and_then(|rest| rest.split_once('.'))
        && let Some(declared) = label(SITE_FIELDS, under, key)
    {
        return declared;
    }
    // Workload and site: the last keys say enough.
    match identity.split_once("].") {
        Some((_, rest)) => plain(rest),
        None => plain(identity.strip_prefix("site.").unwrap_or(identity)),
    }
}
