//! Hours of instruments and people, and how many instruments the work needs.

use super::figure::{Draft, Entry, Figure, Group, How, Line, Measure};
use crate::program::RouteProgram;
use crate::source::{DEFINITION, SITE};

/// Where the figures stand that others rest on.
#[derive(Clone, Copy, Debug, Default)]
pub(super) struct Hours {
    /// Working time of people.
    pub(super) attended: Option<usize>,
    /// Instruments needed.
    pub(super) instruments: Option<usize>,
}

/// Draws up the account of time, as far as the plan says how long things take.
///
/// An instrument is there for so many hours a year: attended ones, and the others where it may run with nobody there. What
/// is needed is rounded up to whole instruments; waiting, repair and holding times are not in it.
pub(super) fn draw_up(draft: &mut Draft, route: &RouteProgram) -> Hours {
    let time = &route.time;
    let mut figure = |id: &str, title: &str, measure, boundary: &str, formula, how| {
        draft.add(Figure {
            id: format!("time.{id}"),
            title: title.into(),
            group: Group::Time,
            measure,
            boundary: boundary.into(),
            formula,
            source: if measure == Measure::Count { DEFINITION } else { SITE },
            how,
        })
    };
    let mut out = Hours::default();
    let by = |of, slot| Line::of(of).by(slot);
    let lines: Vec<Line> = [(Entry::Extractions, time.attended_s), (Entry::Batches, time.attended_batch_s)]
        .into_iter()
        .filter_map(|(of, slot)| Some(by(of, slot?)))
        .collect();
    if !lines.is_empty() {
        out.attended = Some(figure(
            "attended",
            "working time of people",
            Measure::Time,
            "for each extraction and each batch, controls and repeats included",
            "t = N t_extraction + N_batches t_batch",
            How::Lines(lines),
        ));
    }
    let Some(run) = time.run_s else { return out };
    let mut line = by(Entry::Extractions, run);
    if let Some(at_once) = time.at_once {
        line = line.over(at_once);
    }
    let needed = figure(
        "instrument",
        "time of the instrument",
        Measure::Time,
        "every extraction, controls and repeats included; runs are as full as the plan says",
        "t = N t_run / n",
        How::Lines(vec![line]),
    );
    let mut there = Vec::new();
    let free = if time.unattended { time.unattended_year_s } else { None };
    for slot in [time.attended_year_s, free].into_iter().flatten() {
        there.push(by(Entry::One, slot));
    }
    if time.attended_year_s.is_none() {
        return out;
    }
    let boundary = if time.unattended {
        "hours in which someone is there, and those in which it may run alone"
    } else {
        "hours in which someone is there: it may not run alone"
    };
    let there = figure(
        "there",
        "hours of one instrument",
        Measure::Time,
        boundary,
        "t = t_attended + t_unattended",
        How::Lines(there),
    );
    let share = figure(
        "load",
        "instruments kept busy",
        Measure::Ratio,
        "time of the instrument over the hours of one",
        "n = t / t_there",
        How::Ratio { over: needed, under: there },
    );
    out.instruments = Some(figure(
        "instruments",
        "instruments needed",
        Measure::Count,
        "whole ones; repair, waiting and holding times are not in it",
        "n = ⌈t / t_there⌉",
        How::Whole(share),
    ));
    out
}
