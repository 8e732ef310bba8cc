//! Why a figure cannot be opened.

use crate::account::{RouteAccount, WorkloadAccount};
use crate::plan::nearest;
use crate::program::WorkloadProgram;
use core::fmt;

/// So many names are listed at most.
const LISTED: usize = 12;

/// Why a figure cannot be opened.
#[derive(Clone, Debug, PartialEq, Eq)]
pub enum TraceError {
    /// The plan has errors, so that there are no accounts.
    NoAccount,
    /// The route's run stopped.
    Stopped {
        /// The route.
        route: String,
    },
    /// Several workloads could be meant.
    WhichWorkload {
        /// Their names.
        known: Vec<String>,
    },
    /// No workload has this name.
    UnknownWorkload {
        /// The name asked for.
        asked: String,
        /// The names there are.
        known: Vec<String>,
    },
    /// No route has this name.
    UnknownRoute {
        /// The name asked for.
        asked: String,
        /// The names there are.
        known: Vec<String>,
    },
    /// The route has no figure with this id.
    UnknownFigure {
        /// The id asked for.
        asked: String,
        /// The route.
        route: String,
        /// Ids of the route that come closest, or those of all its figures where none does.
        close: Vec<String>,
        /// Other routes of the workload that have the figure.
        elsewhere: Vec<String>,
    },
}

impl fmt::Display for TraceError {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            Self::NoAccount => write!(f, "the plan has errors, so there are no figures; mend those first"),
            Self::Stopped { route } => {
                write!(f, "the run of {route} stopped, so it has no figures; the plan's problems say why")
            }
            Self::WhichWorkload { known } => {
                write!(f, "several workloads could be meant; name one of: {}", list(known))
            }
            Self::UnknownWorkload { asked, known } => unknown(f, "workload", asked, known),
            Self::UnknownRoute { asked, known } => unknown(f, "route", asked, known),
            Self::UnknownFigure { asked, route, close, elsewhere } => {
                write!(f, "{route} has no figure \"{asked}\"")?;
                if !elsewhere.is_empty() {
                    return write!(f, "; {} has it: name that route", list(elsewhere));
                }
                write!(f, "; figures there are: {}", list(close))
            }
        }
    }
}

impl core::error::Error for TraceError {}

fn unknown(f: &mut fmt::Formatter<'_>, what: &str, asked: &str, known: &[String]) -> fmt::Result {
    match nearest(asked, known.iter().map(String::as_str)) {
        Some(name) => write!(f, "no {what} \"{asked}\"; did you mean {name}?"),
        None => write!(f, "no {what} \"{asked}\"; there are: {}", list(known)),
    }
}

fn list(names: &[String]) -> String {
    let shown = names.get(..LISTED).unwrap_or(names).join(", ");
    let more = names.len().saturating_sub(LISTED);
    if more > 0 { format!("{shown} and {more} more") } else { shown }
}

pub(super) fn unknown_figure(
    asked: &str,
    work: &WorkloadProgram,
    accounts: &WorkloadAccount,
    route: usize,
) -> TraceError {
    let has = |account: &Option<RouteAccount>| account.as_ref().is_some_and(|a| a.value(asked).is_some());
    let named = work.routes.iter().zip(&accounts.routes);
    let elsewhere = named.filter(|(_, account)| has(account)).map(|(r, _)| r.name.clone()).collect();
    let of_route = accounts.routes.get(route).and_then(Option::as_ref);
    let ids: Vec<&str> =
        of_route.map(|a| a.figures.iter().map(|f| f.id.as_str()).collect()).unwrap_or_default();
    let within = asked.len() > 2 && asked.len() < 100;
    let mut close: Vec<String> = nearest(asked, ids.iter().copied()).into_iter().map(str::to_owned).collect();
    let holding = ids.iter().filter(|id| within && id.contains(asked) && !close.iter().any(|c| c == *id));
    let holding: Vec<String> = holding.map(|id| (*id).to_owned()).collect();
    close.extend(holding);
    if close.is_empty() {
        close = ids.iter().map(|id| (*id).to_owned()).collect();
    }
    let route = work.routes.get(route).map_or_else(String::new, |r| r.name.clone());
    TraceError::UnknownFigure { asked: asked.chars().take(100).collect(), route, close, elsewhere }
}
