//! Running a route: one code path for the single traced run and for every draw.

use super::{PLACED, PLACED_BY_DEFAULT, PUSHED_OUT, RouteProgram, Runs, TAKEN_IN};
use crate::chance::Draw;
use crate::co2_loop::Scratch;
use crate::ledger::{BENCH_PLACES, Bench, Cells, Halt, Place, StepIx, Trace, Utility};
use crate::quantity::Kind;

/// The storage of one route's run, allocated once and reused for every draw.
#[derive(Clone, Debug)]
pub struct Desk {
    /// What lies where, and what has passed.
    pub cells: Cells,
    /// Utilities spent in a year; SI.
    pub spent: [f64; Utility::COUNT],
    /// States of carbon dioxide met in earlier draws.
    pub co2: Scratch,
    /// How often things happen in a year.
    pub runs: Runs,
    /// What was placed by default, in the order of [`Place::BENCH`]; kg in a run of the last step's basis.
    pub placed_by_default_kg: [f64; BENCH_PLACES],
    /// The steps that took longer than the plan says: bit `i` for step `i`.
    pub longer: u64,
}

/// Where and why a run stopped.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Failure {
    /// At which step.
    pub step: StepIx,
    /// Why.
    pub halt: Halt,
}

impl RouteProgram {
    /// Storage for this route.
    #[must_use]
    pub fn desk(&self) -> Desk {
        Desk {
            cells: Cells::new(self.materials.len(), self.streams),
            spent: [0.0; Utility::COUNT],
            co2: Scratch::with_room(self.steps.iter().fold(0, |sum, s| sum + s.step.co2_states())),
            runs: Runs { results: 0.0, extractions: 0.0, batches: 0.0, feed_share: 0.0 },
            placed_by_default_kg: [0.0; BENCH_PLACES],
            longer: 0,
        }
    }

    /// The central values of all inputs.
    #[must_use]
    pub fn central(&self) -> Vec<f64> {
        self.inputs.iter().map(|i| i.central_si).collect()
    }

    /// Draw number `draw` of all inputs under `seed`, into `x`.
    pub fn draw_into(&self, seed: u64, draw: u64, x: &mut [f64]) {
        for (slot, input) in x.iter_mut().zip(&self.inputs) {
            *slot = input.draw(seed, draw);
        }
    }

    /// Runs the route over one draw of its inputs.
    ///
    /// # Errors
    /// A [`Failure`] with the step at which the run stopped.
    pub fn run(&self, x: Draw<'_>, desk: &mut Desk, trace: Option<&mut Trace>) -> Result<(), Failure> {
        let at = |step| move |halt| Failure { step, halt };
        let runs = self.work.runs(x).map_err(at(StepIx::Opening))?;
        desk.runs = runs;
        let mut b = Bench::new(x, &self.natures, &mut desk.cells, &mut desk.spent, &mut desk.co2, trace);
        for (i, step) in self.steps.iter().enumerate() {
            if let Some((_, place)) = self.taken_in.filter(|(before, _)| *before == i) {
                self.take_in(x, &mut b, &runs, place).map_err(at(StepIx::Opening))?;
            }
            let ix = StepIx::Step(u16::try_from(i).unwrap_or(u16::MAX));
            b.turn_to(ix, runs.of(step.basis), &step.measured).map_err(at(ix))?;
            step.step.run(x, &mut b).map_err(at(ix))?;
        }
        let by_default_kg = self.close(x, &mut b).map_err(at(StepIx::Closing))?;
        desk.longer = b.longer();
        desk.placed_by_default_kg = by_default_kg;
        Ok(())
    }

    fn take_in(&self, x: Draw<'_>, b: &mut Bench<'_>, runs: &Runs, to: Place) -> Result<(), Halt> {
        b.turn_to(StepIx::Opening, runs.extractions, &[])?;
        b.note(TAKEN_IN, "share of runs that carry feed", runs.feed_share, Kind::Fraction);
        for &(m, mass) in &self.feed {
            b.note(TAKEN_IN, "m_feed", x.get(mass), Kind::Mass);
            // m = m_feed · share of runs that carry feed
            b.charge(Place::FEED, to, m, x.get(mass) * runs.feed_share, TAKEN_IN)?;
        }
        Ok(())
    }

    fn close(&self, x: Draw<'_>, b: &mut Bench<'_>) -> Result<[f64; BENCH_PLACES], Halt> {
        b.at_close();
        let mut by_default_kg = [0.0; BENCH_PLACES];
        for (i, place) in Place::BENCH.into_iter().enumerate() {
            match self.ends[i] {
                Some((to, true)) => {
                    b.sweep(place, to, PLACED);
                }
                Some((to, false)) => by_default_kg[i] = b.sweep(place, to, PLACED_BY_DEFAULT),
                None => {
                    let left_kg = b.mass_kg(place);
                    if left_kg > 0.0 {
                        return Err(Halt::NoEnd { place, left_kg });
                    }
                }
            }
        }
        if let Some(filling) = &self.filling {
            filling.run(x, b, PUSHED_OUT)?;
        }
        Ok(by_default_kg)
    }
}
