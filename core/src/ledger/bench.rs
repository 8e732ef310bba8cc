//! The bench on which a route runs: the only hand that writes postings.

use super::{
    Batch, Cells, Direction, Doubt, Halt, Material, Note, Place, Posting, RuleIx, Spending, StepIx, Trace,
    Utility,
};
use crate::chance::{Draw, In};
use crate::co2::Memo;
use crate::co2_loop::Scratch;
use crate::heat::Demand;
use crate::quantity::Kind;

/// A measured figure that takes the place of a computed one.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Measured {
    /// A mass in one run of the step; kg.
    Mass(In),
    /// A share of what was there.
    Share(In),
    /// Electricity in one run of the step, as a meter reads it; J.
    Energy(In),
}

/// What the bench knows of a material of the route.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Nature {
    /// Its density at the bench's temperature, where it has one; kg/m³.
    pub density: Option<In>,
    /// Whether it can evaporate from an extract: solvents, gases and water.
    pub volatile: bool,
}

/// The books of one route for one draw. All storage is lent by the caller and reused; nothing is allocated.
///
/// A step can only move what is there. Verbs that take materials in a list, or everything in a place, apply a measured
/// figure in place of the computed one; the sequence of postings is the same in every draw.
pub struct Bench<'a> {
    draw: Draw<'a>,
    natures: &'a [Nature],
    cells: &'a mut Cells,
    spent: &'a mut [f64; Utility::COUNT],
    co2: &'a mut Scratch,
    trace: Option<&'a mut Trace>,
    step: StepIx,
    measured: &'a [Option<Measured>],
    runs_a_year: f64,
    /// How long what goes to air from here on takes; s.
    over_s: Option<f64>,
    /// The steps that take longer than the plan says: a bit each, the last for all from the 64th on.
    longer: u64,
}

impl<'a> Bench<'a> {
    /// A bench over lent storage, which it clears.
    pub fn new(
        draw: Draw<'a>,
        natures: &'a [Nature],
        cells: &'a mut Cells,
        spent: &'a mut [f64; Utility::COUNT],
        co2: &'a mut Scratch,
        trace: Option<&'a mut Trace>,
    ) -> Self {
        cells.clear();
        spent.fill(0.0);
        co2.states.begin();
        Self {
            draw,
            natures,
            cells,
            spent,
            co2,
            trace,
            step: StepIx::Opening,
            measured: &[],
            runs_a_year: 0.0,
            over_s: None,
            longer: 0,
        }
    }

    /// Turns to the next step, which runs so often a year.
    ///
    /// What lies on the bench is gathered: when four samples make a batch, a step that happens once a batch finds four
    /// times as much. The other way round is refused, because a batch cannot be taken apart again.
    ///
    /// # Errors
    /// [`Halt::FinerBasis`] when the step runs more often than the one before it and the bench is not empty;
    /// [`Halt::NoRuns`] when the number of runs is not a positive finite number.
    pub fn turn_to(
        &mut self,
        step: StepIx,
        runs_a_year: f64,
        measured: &'a [Option<Measured>],
    ) -> Result<(), Halt> {
        if !(runs_a_year > 0.0 && runs_a_year.is_finite()) {
            return Err(Halt::NoRuns);
        }
        if runs_a_year > self.runs_a_year {
            let left_kg = self.cells.bench_kg();
            if left_kg > 0.0 {
                return Err(Halt::FinerBasis { left_kg });
            }
        } else if runs_a_year < self.runs_a_year {
            // m_coarse = m_fine · runs_fine / runs_coarse
            self.cells.gather(self.runs_a_year / runs_a_year);
        }
        self.runs_a_year = runs_a_year;
        self.step = step;
        self.measured = measured;
        self.over_s = None;
        Ok(())
    }

    /// Says that the step takes longer than the plan says, because its numbers ask for it in this draw.
    pub fn takes_longer(&mut self) {
        if let StepIx::Step(i) = self.step {
            self.longer |= 1 << if i < 63 { i } else { 63 };
        }
    }

    /// The steps that took longer than the plan says: bit `i` for step `i`.
    #[must_use]
    pub const fn longer(&self) -> u64 {
        self.longer
    }

    /// Turns to the closing of the book, on the basis of the last step.
    pub fn at_close(&mut self) {
        self.step = StepIx::Closing;
        self.measured = &[];
        self.over_s = None;
    }

    /// From here on what this step sends to hood or room goes evenly over so long a time; s. 0 is all at once.
    ///
    /// A mass alone has no concentration: the account of the room's air needs the time beside it. Until a step says it, and
    /// again from the next step on, the time is not known, and the account of air takes the worst. Does nothing to the masses.
    #[inline]
    pub fn release_over(&mut self, time_s: f64) {
        self.over_s = if time_s >= 0.0 && time_s.is_finite() { Some(time_s) } else { None };
    }

    /// What lies in a bench place; kg in this run.
    #[inline]
    #[must_use]
    pub fn there(&self, place: Place, m: Material) -> f64 {
        self.cells.there(place, m)
    }

    /// All that lies in a bench place; kg in this run.
    #[must_use]
    pub fn mass_kg(&self, place: Place) -> f64 {
        let mut sum = 0.0;
        for kg in self.cells.lying(place) {
            sum += kg;
        }
        sum
    }

    /// The volume of the liquids that lie in a bench place, as if they mixed without change of volume; m³.
    ///
    /// Only materials that can evaporate count: a dissolved solid is left out. Excess volumes of solvent mixtures reach a
    /// few per cent (ethanol and water: about −3.5 %, from memory).
    #[must_use]
    pub fn liquid_volume_m3(&self, place: Place) -> f64 {
        let mut sum = 0.0;
        for (kg, nature) in self.cells.lying(place).iter().zip(self.natures) {
            // Most cells are empty, and a division costs more than a look.
            if let (true, Some(density)) = (nature.volatile && *kg > 0.0, nature.density) {
                // V = Σ mᵢ / ρᵢ
                sum += kg / self.draw.get(density);
            }
        }
        sum
    }

    /// As [`Bench::liquid_volume_m3`], of some materials only; m³.
    #[must_use]
    pub fn liquid_volume_of_m3(&self, place: Place, materials: &[Material]) -> f64 {
        let mut sum = 0.0;
        for m in materials {
            let nature = self.natures.get(m.0 as usize);
            if let Some(density) = nature.filter(|n| n.volatile).and_then(|n| n.density) {
                // V = Σ mᵢ / ρᵢ
                sum += self.there(place, *m) / self.draw.get(density);
            }
        }
        sum
    }

    /// What has passed into a place outside the bench so far, in a run of the present step's basis; kg.
    #[must_use]
    pub fn poured_kg(&self, place: Place, m: Material) -> f64 {
        self.cells.passed(place, Direction::Into, m) / self.runs_a_year
    }

    /// The volume of the liquids in it, as [`Bench::liquid_volume_m3`]; m³.
    #[must_use]
    pub fn poured_m3(&self, place: Place) -> f64 {
        let mut sum = 0.0;
        for (i, nature) in self.natures.iter().enumerate() {
            if let (true, Some(density)) = (nature.volatile, nature.density) {
                // V = Σ mᵢ / ρᵢ
                sum += self.poured_kg(place, Material(index(i))) / self.draw.get(density);
            }
        }
        sum
    }

    /// How many materials the route has.
    #[must_use]
    pub fn materials(&self) -> usize {
        self.natures.len()
    }

    /// Whether a material can evaporate from an extract.
    #[must_use]
    pub fn volatile(&self, m: Material) -> bool {
        self.natures.get(m.0 as usize).is_some_and(|n| n.volatile)
    }

    #[inline]
    fn post(&mut self, from: Place, to: Place, m: Material, kg: f64, rule: RuleIx, measured: bool) {
        // Moving nothing changes no cell; only the trace wants to know.
        if kg != 0.0 {
            self.cells.move_mass(from, to, m, kg, self.runs_a_year);
        }
        if let Some(trace) = self.trace.as_deref_mut() {
            let (step, runs_a_year) = (self.step, self.runs_a_year);
            let over_s = if to.is_air() { self.over_s } else { None };
            trace.postings.push(Posting {
                step,
                rule,
                from,
                to,
                material: m,
                kg,
                runs_a_year,
                over_s,
                measured,
            });
        }
    }

    /// Draws a mass from the store, or takes in feed.
    ///
    /// # Errors
    /// [`Halt::NotANumber`] for a mass that is negative or not finite.
    pub fn charge(
        &mut self,
        from: Place,
        to: Place,
        m: Material,
        kg: f64,
        rule: RuleIx,
    ) -> Result<f64, Halt> {
        if !(kg >= 0.0 && kg.is_finite()) {
            return Err(Halt::NotANumber { rule });
        }
        self.post(from, to, m, kg, rule, false);
        Ok(kg)
    }

    /// Moves exactly this mass of one material.
    ///
    /// # Errors
    /// [`Halt::Short`] when less is there, [`Halt::NotANumber`] for a mass that is negative or not finite.
    pub fn take(&mut self, from: Place, to: Place, m: Material, kg: f64, rule: RuleIx) -> Result<f64, Halt> {
        self.take_as(from, to, m, kg, rule, false)
    }

    fn take_as(
        &mut self,
        from: Place,
        to: Place,
        m: Material,
        kg: f64,
        rule: RuleIx,
        measured: bool,
    ) -> Result<f64, Halt> {
        if !(kg >= 0.0 && kg.is_finite()) {
            return Err(Halt::NotANumber { rule });
        }
        let there_kg = self.there(from, m);
        // A rounding in the last places is not a shortage.
        if kg > there_kg * (1.0 + 1e-12) {
            return Err(Halt::Short { rule, place: from, material: m, wanted_kg: kg, there_kg });
        }
        let kg = if kg > there_kg { there_kg } else { kg };
        self.post(from, to, m, kg, rule, measured);
        Ok(kg)
    }

    /// Moves up to this mass of one material: saturation is the physics, so that less is no shortage.
    ///
    /// # Errors
    /// [`Halt::NotANumber`] for a mass that is negative or not finite.
    pub fn up_to(&mut self, from: Place, to: Place, m: Material, kg: f64, rule: RuleIx) -> Result<f64, Halt> {
        let there_kg = self.there(from, m);
        self.take_as(from, to, m, if kg > there_kg { there_kg } else { kg }, rule, false)
    }

    /// Moves a share of one material.
    ///
    /// # Errors
    /// [`Halt::Short`] for a share above one, [`Halt::NotANumber`] for one that is negative or not finite.
    pub fn share(
        &mut self,
        from: Place,
        to: Place,
        m: Material,
        share: f64,
        rule: RuleIx,
    ) -> Result<f64, Halt> {
        let kg = self.there(from, m) * share;
        self.take(from, to, m, kg, rule)
    }

    /// Moves everything of one material; exactly 0 is left.
    pub fn all(&mut self, from: Place, to: Place, m: Material, rule: RuleIx) -> f64 {
        let kg = self.there(from, m);
        self.post(from, to, m, kg, rule, false);
        kg
    }

    /// Moves everything of every material; exactly 0 is left. Returns the mass moved; kg.
    pub fn sweep(&mut self, from: Place, to: Place, rule: RuleIx) -> f64 {
        if self.trace.is_none() {
            return self.cells.move_all(from, to, self.runs_a_year);
        }
        let mut sum = 0.0;
        for i in 0..self.natures.len() {
            sum += self.all(from, to, Material(index(i)), rule);
        }
        sum
    }

    /// Moves the computed masses of several materials, or the measured figure in their place.
    ///
    /// A measured mass is split in the computed proportions; where the computed total is zero, by what is there. A measured
    /// share applies to each listed material. Returns the mass moved; kg.
    ///
    /// # Errors
    /// As [`Bench::take`]; [`Halt::NothingToMeasure`] where a measured mass finds nothing, [`Halt::MeasuredTooMuch`]
    /// where it is more than there is.
    pub fn split(
        &mut self,
        from: Place,
        to: Place,
        parts: &[(Material, f64)],
        rule: RuleIx,
    ) -> Result<f64, Halt> {
        let (mut computed_kg, mut there_kg) = (0.0, 0.0);
        for &(m, kg) in parts {
            computed_kg += kg;
            there_kg += self.there(from, m);
        }
        let mut sum = 0.0;
        match self.measured_for(rule) {
            None | Some(Measured::Energy(_)) => {
                for &(m, kg) in parts {
                    sum += self.take_as(from, to, m, kg, rule, false)?;
                }
            }
            Some(Measured::Share(slot)) => {
                let share = self.draw.get(slot);
                self.note_computed(rule, computed_kg);
                measurable(rule, from, share * there_kg, there_kg)?;
                for &(m, _) in parts {
                    sum += self.take_as(from, to, m, self.there(from, m) * share, rule, true)?;
                }
            }
            Some(Measured::Mass(slot)) => {
                let total_kg = self.draw.get(slot);
                self.note_computed(rule, computed_kg);
                if total_kg > 0.0 && there_kg <= 0.0 {
                    return Err(Halt::NothingToMeasure { rule, place: from });
                }
                measurable(rule, from, total_kg, there_kg)?;
                for &(m, kg) in parts {
                    let kg = if computed_kg > 0.0 {
                        total_kg * (kg / computed_kg)
                    } else if there_kg > 0.0 {
                        total_kg * (self.there(from, m) / there_kg)
                    } else {
                        0.0
                    };
                    sum += self.take_as(from, to, m, kg, rule, true)?;
                }
            }
        }
        Ok(sum)
    }

    /// Moves a share of everything in a place that can evaporate, or the measured figure in its place. Returns the mass; kg.
    ///
    /// # Errors
    /// As [`Bench::split`].
    pub fn share_volatile(&mut self, from: Place, to: Place, share: f64, rule: RuleIx) -> Result<f64, Halt> {
        self.share_where(from, to, share, rule, true)
    }

    /// Moves a share of everything in a place, or the measured figure in its place. Returns the mass moved; kg.
    ///
    /// # Errors
    /// As [`Bench::split`].
    pub fn share_all(&mut self, from: Place, to: Place, share: f64, rule: RuleIx) -> Result<f64, Halt> {
        self.share_where(from, to, share, rule, false)
    }

    fn share_where(
        &mut self,
        from: Place,
        to: Place,
        share: f64,
        rule: RuleIx,
        only_volatile: bool,
    ) -> Result<f64, Halt> {
        let mut there_kg = 0.0;
        for (kg, nature) in self.cells.lying(from).iter().zip(self.natures) {
            if nature.volatile || !only_volatile {
                there_kg += kg;
            }
        }
        let (share, measured) = match self.measured_for(rule) {
            None => (share, false),
            Some(which) => {
                self.note_computed(rule, there_kg * share);
                match which {
                    Measured::Energy(_) => (share, false),
                    Measured::Share(slot) => {
                        let share = self.draw.get(slot);
                        measurable(rule, from, share * there_kg, there_kg)?;
                        (share, true)
                    }
                    Measured::Mass(slot) => {
                        let total_kg = self.draw.get(slot);
                        if there_kg > 0.0 {
                            measurable(rule, from, total_kg, there_kg)?;
                            (total_kg / there_kg, true)
                        } else if total_kg > 0.0 {
                            return Err(Halt::NothingToMeasure { rule, place: from });
                        } else {
                            (0.0, true)
                        }
                    }
                }
            }
        };
        // The same moves without a trace to write and without a share that could overdraw.
        if self.trace.is_none() && (0.0..=1.0).contains(&share) {
            let moves = self.natures.iter().map(|n| n.volatile || !only_volatile);
            return Ok(self.cells.move_share(from, to, share, moves, self.runs_a_year));
        }
        let mut sum = 0.0;
        for i in 0..self.natures.len() {
            if self.natures[i].volatile || !only_volatile {
                let m = Material(index(i));
                sum += self.take_as(from, to, m, self.there(from, m) * share, rule, measured)?;
            }
        }
        Ok(sum)
    }

    fn measured_for(&self, rule: RuleIx) -> Option<Measured> {
        self.measured.get(rule.0 as usize).copied().flatten()
    }

    fn note_computed(&mut self, rule: RuleIx, kg: f64) {
        self.note(rule, "computed in its place", kg, Kind::Mass);
    }

    /// Asks that something lies in a place.
    ///
    /// # Errors
    /// [`Halt::Empty`] when nothing does.
    pub fn need(&self, place: Place) -> Result<f64, Halt> {
        let kg = self.mass_kg(place);
        if kg > 0.0 { Ok(kg) } else { Err(Halt::Empty { place }) }
    }

    /// Asks that nothing lies in a place.
    ///
    /// # Errors
    /// [`Halt::Occupied`] when something does.
    pub fn need_empty(&self, place: Place) -> Result<(), Halt> {
        let left_kg = self.mass_kg(place);
        if left_kg > 0.0 { Err(Halt::Occupied { place, left_kg }) } else { Ok(()) }
    }

    /// Spends a utility; SI amount in this run.
    pub fn spend(&mut self, utility: Utility, amount_si: f64, rule: RuleIx) {
        self.spent[utility as usize] += amount_si * self.runs_a_year;
        if let Some(trace) = self.trace.as_deref_mut() {
            let (step, runs_a_year) = (self.step, self.runs_a_year);
            trace.spendings.push(Spending { step, rule, utility, amount_si, runs_a_year });
        }
    }

    /// Spends heat into a stream, or the heat taken out of it where the amount is negative; J in this run.
    ///
    /// Both are posted, one of them as zero, so that the sequence is the same in every draw.
    pub fn spend_heat(&mut self, heat_j: f64, rule: RuleIx) {
        let (into_j, out_j) = if heat_j < 0.0 { (0.0, -heat_j) } else { (heat_j, 0.0) };
        self.spend(Utility::Heat, into_j, rule);
        self.spend(Utility::Cooling, out_j, rule);
    }

    /// Spends the electricity of one apparatus, J in this run: what counts, and beside it all that is known.
    pub fn spend_electricity(&mut self, counted_j: f64, demand: &Demand, rule: RuleIx) {
        self.spend(Utility::Electricity, counted_j, rule);
        self.spend(Utility::NominalElectricity, demand.nominal_j, rule);
        self.spend(Utility::ComputedElectricity, demand.computed_j.unwrap_or(0.0), rule);
        self.spend(Utility::MeasuredElectricity, demand.measured_j.unwrap_or(0.0), rule);
    }

    /// States of carbon dioxide that this route has met.
    pub fn states(&mut self) -> &mut Memo {
        &mut self.co2.states
    }

    /// States met, and room for a loop.
    pub fn co2(&mut self) -> &mut Scratch {
        self.co2
    }

    /// A meter's reading for a rule, where the plan gives one; J in this run.
    pub fn metered_j(&self, rule: RuleIx) -> Option<f64> {
        match self.measured_for(rule) {
            Some(Measured::Energy(slot)) => Some(self.draw.get(slot)),
            _ => None,
        }
    }

    /// Spends electricity: a meter's reading where the plan gives one, else nominal power by time unless the floor of
    /// thermodynamics lies above it. A floor alone is noted and not spent. `nominal_j` and `floor_j` in J a run.
    ///
    /// What lies below the floor is told as a doubt.
    pub fn electricity(&mut self, nominal_j: Option<f64>, floor_j: Option<f64>, rule: RuleIx) {
        let metered_j = self.metered_j(rule);
        if let Some(floor_j) = floor_j {
            self.note(rule, "least that physics asks for", floor_j, Kind::Energy);
        }
        if let (Some(metered_j), Some(nominal_j)) = (metered_j, nominal_j) {
            self.note(rule, "computed in its place", nominal_j, Kind::Energy);
            self.note(rule, "meter", metered_j, Kind::Energy);
        }
        let demand =
            Demand { nominal_j: nominal_j.unwrap_or(0.0), computed_j: floor_j, measured_j: metered_j };
        let stated = nominal_j.is_some() || metered_j.is_some();
        if stated || floor_j.is_some() {
            // A floor alone is told and not counted: nobody says what the step draws.
            let counted_j = if stated { demand.chosen().0 } else { 0.0 };
            self.spend_electricity(counted_j, &demand, rule);
        }
        if let (Some(stated_j), Some(floor_j)) = (metered_j.or(nominal_j), floor_j)
            && stated_j < floor_j
        {
            let found = if metered_j.is_some() {
                "the meter reads less than physics asks for, which is"
            } else {
                "power by time is less than physics asks for, which is counted in its place:"
            };
            self.doubt(rule, found, floor_j, Kind::Energy, "check power, time and amounts of the step");
        }
    }

    /// Notes a number put into a rule; does nothing unless the run is traced.
    #[inline]
    pub fn note(&mut self, rule: RuleIx, symbol: &'static str, value_si: f64, kind: Kind) {
        if let Some(trace) = self.trace.as_deref_mut() {
            trace.notes.push(Note { step: self.step, rule, symbol, value_si, kind });
        }
    }

    /// Whether the run is traced: what only a reader wants need not be computed in a draw.
    #[inline]
    #[must_use]
    pub fn traced(&self) -> bool {
        self.trace.is_some()
    }

    /// Records a mixture that is taken down; does nothing unless the run is traced.
    pub(crate) fn takes_down(&mut self, make: impl FnOnce(u16) -> Batch) {
        if let (StepIx::Step(step), Some(trace)) = (self.step, self.trace.as_deref_mut()) {
            trace.batches.push(make(step));
        }
    }

    /// Tells the reader of something odd that does not stop the run: `found` with the value behind it, and what would do. Does
    /// nothing unless the run is traced.
    pub fn doubt(
        &mut self,
        rule: RuleIx,
        found: &'static str,
        value_si: f64,
        kind: Kind,
        need: &'static str,
    ) {
        if let Some(trace) = self.trace.as_deref_mut() {
            trace.doubts.push(Doubt { step: self.step, rule, found, value_si, kind, need });
        }
    }
}

/// A measured mass that is no more than there is; a rounding in the last places is not more.
fn measurable(rule: RuleIx, place: Place, measured_kg: f64, there_kg: f64) -> Result<(), Halt> {
    if measured_kg > there_kg * (1.0 + 1e-12) {
        return Err(Halt::MeasuredTooMuch { rule, place, measured_kg, there_kg });
    }
    Ok(())
}

/// A route never holds more materials than fit; the resolver sees to it.
fn index(i: usize) -> u16 {
    u16::try_from(i).unwrap_or(u16::MAX)
}
