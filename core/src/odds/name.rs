//! What an input is called in a sentence.

use crate::program::WorkloadProgram;

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
        return format!("{}: {}", route.name, plain(rest));
    }
    // Workload and site: the last keys say enough.
    match identity.split_once("].") {
        Some((_, rest)) => plain(rest),
        None => plain(identity.strip_prefix("site.").unwrap_or(identity)),
    }
}
