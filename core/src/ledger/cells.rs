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
    into: Vec<f64>,
    out_of: Vec<f64>,
}

impl Cells {
    /// Empty cells for a route with so many materials on a site with so many streams.
    #[must_use]
    pub fn new(materials: usize, streams: usize) -> Self {
        let outside = OUTSIDE_PLACES + BENCH_PLACES + streams;
        Self {
            materials,
            bench: vec![0.0; BENCH_PLACES * materials],
            into: vec![0.0; outside * materials],
            out_of: vec![0.0; outside * materials],
        }
    }

    /// Everything back to zero.
    pub fn clear(&mut self) {
        self.bench.fill(0.0);
        self.into.fill(0.0);
        self.out_of.fill(0.0);
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
        // Bench places have rows here too, always empty, so that the index of a place is the index of its row.
        let i = place.index() * self.materials + m.0 as usize;
        match direction {
            Direction::Into => self.into[i],
            Direction::OutOf => self.out_of[i],
        }
    }

    #[inline]
    pub(super) fn move_mass(&mut self, from: Place, to: Place, m: Material, kg: f64, runs_a_year: f64) {
        let (i, j) = (self.at(from, m), self.at(to, m));
        if from.on_bench() {
            self.bench[i] -= kg;
        } else {
            self.out_of[i] += kg * runs_a_year;
        }
        if to.on_bench() {
            self.bench[j] += kg;
        } else {
            self.into[j] += kg * runs_a_year;
        }
    }

    /// Everything of every material, as [`Cells::move_mass`] would move it; exactly 0 is left. Returns the mass moved; kg.
    pub(super) fn move_all(&mut self, from: Place, to: Place, runs_a_year: f64) -> f64 {
        let mut sum = 0.0;
        let start = self.at(from, Material(0));
        let end = start + self.materials;
        if to.on_bench() {
            if from != to {
                let there = self.at(to, Material(0));
                for i in 0..self.materials {
                    sum += self.bench[start + i];
                    self.bench[there + i] += self.bench[start + i];
                }
                self.bench[start..end].fill(0.0);
            }
            return sum;
        }
        let there = self.at(to, Material(0));
        let into = &mut self.into[there..there + self.materials];
        for (kg, into) in self.bench[start..end].iter_mut().zip(into) {
            sum += *kg;
            *into += *kg * runs_a_year;
            *kg = 0.0;
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
