//! The flat store of one run: what lies on the bench, and what has passed into and out of every outside place.

use super::{BENCH_PLACES, Material, OUTSIDE_PLACES, Place};

/// Which way mass passed an outside place.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum Direction {
    /// Into it.
    Into,
    /// Out of it.
    OutOf,
}

/// The cells of one route: bench stock in kg a run, outside totals in kg a year.
///
/// One allocation per route, reused for every draw.
#[derive(Clone, Debug)]
pub struct Cells {
    materials: usize,
    bench: Vec<f64>,
    /// What has passed into every place, then what has passed out of it.
    passed: Vec<f64>,
    out_of: usize,
}

impl Cells {
    /// Empty cells for a route with so many materials on a site with so many streams.
    #[must_use]
    pub fn new(materials: usize, streams: usize) -> Self {
        let outside = OUTSIDE_PLACES + BENCH_PLACES + streams;
        Self {
            materials,
            bench: vec![0.0; BENCH_PLACES * materials],
            passed: vec![0.0; 2 * outside * materials],
            out_of: outside * materials,
        }
    }

    /// Everything back to zero.
    pub fn clear(&mut self) {
        self.bench.fill(0.0);
        self.passed.fill(0.0);
    }

    #[inline]
    fn at(&self, place: Place, m: Material) -> usize {
        let row = if place.on_bench() { place.index() - OUTSIDE_PLACES } else { place.index() };
        row * self.materials + m.0 as usize
    }

    /// What lies in a bench place; kg a run.
    #[inline]
    #[must_use]
    pub fn there(&self, place: Place, m: Material) -> f64 {
        self.bench[self.at(place, m)]
    }

    /// All that lies in a bench place, material by material; kg a run.
    #[inline]
    #[must_use]
    pub fn lying(&self, place: Place) -> &[f64] {
        let from = self.at(place, Material(0));
        &self.bench[from..from + self.materials]
    }

    /// What has passed an outside place; kg a year.
    #[inline]
    #[must_use]
    pub fn passed(&self, place: Place, direction: Direction, m: Material) -> f64 {
        self.passed[self.cell(place, direction, m) as usize]
    }

    /// The index of a cell of an outside place, for [`Cells::passed_at`].
    pub(crate) fn cell(&self, place: Place, direction: Direction, m: Material) -> u32 {
        // Bench places have rows here too, always empty, so that the index of a place is the index of its row.
        let i = place.index() * self.materials + m.0 as usize;
        let i = match direction {
            Direction::Into => i,
            Direction::OutOf => self.out_of + i,
        };
        u32::try_from(i).unwrap_or(u32::MAX)
    }

    /// What has passed a cell; kg a year.
    #[inline]
    pub(crate) fn passed_at(&self, cell: u32) -> f64 {
        self.passed.get(cell as usize).copied().unwrap_or(0.0)
    }

    #[inline]
    pub(super) fn move_mass(&mut self, from: Place, to: Place, m: Material, kg: f64, runs_a_year: f64) {
        let (i, j) = (self.at(from, m), self.at(to, m));
        if from.on_bench() {
            self.bench[i] -= kg;
        } else if from.stream_index().is_some() {
            // What leaves a container again has never been waste: what has passed into a stream is net.
            self.passed[i] -= kg * runs_a_year;
        } else {
            self.passed[self.out_of + i] += kg * runs_a_year;
        }
        if to.on_bench() {
            self.bench[j] += kg;
        } else {
            self.passed[j] += kg * runs_a_year;
        }
    }

    /// Everything of every material, as [`Cells::move_mass`] would move it; exactly 0 is left. Returns the mass moved; kg.
    pub(super) fn move_all(&mut self, from: Place, to: Place, runs_a_year: f64) -> f64 {
        self.move_each(from, to, runs_a_year, |kg| kg)
    }

    /// A share from 0 to 1 of every material that moves, as [`Cells::move_mass`] would move it. Returns the mass moved; kg.
    pub(super) fn move_share(
        &mut self,
        from: Place,
        to: Place,
        share: f64,
        mut moves: impl Iterator<Item = bool>,
        runs_a_year: f64,
    ) -> f64 {
        self.move_each(from, to, runs_a_year, |kg| if moves.next() == Some(true) { kg * share } else { 0.0 })
    }

    #[inline]
    fn move_each(
        &mut self,
        from: Place,
        to: Place,
        runs_a_year: f64,
        mut part: impl FnMut(f64) -> f64,
    ) -> f64 {
        let (start, there, count) = (self.at(from, Material(0)), self.at(to, Material(0)), self.materials);
        let mut sum = 0.0;
        if to.on_bench() {
            for i in 0..count {
                let kg = part(self.bench[start + i]);
                sum += kg;
                self.bench[start + i] -= kg;
                self.bench[there + i] += kg;
            }
        } else {
            let into = &mut self.passed[there..there + count];
            for (lying, into) in self.bench[start..start + count].iter_mut().zip(into) {
                let kg = part(*lying);
                sum += kg;
                *lying -= kg;
                *into += kg * runs_a_year;
            }
        }
        sum
    }

    pub(super) fn gather(&mut self, factor: f64) {
        for kg in &mut self.bench {
            *kg *= factor;
        }
    }

    pub(super) fn bench_kg(&self) -> f64 {
        let mut sum = 0.0;
        for kg in &self.bench {
            sum += kg;
        }
        sum
    }
}
