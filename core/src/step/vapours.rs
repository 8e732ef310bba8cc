//! What can evaporate on a route, as a liquid mixture: partial pressures over what lies in a place, the way down to a volume,
//! the heat that evaporation takes.

use crate::chance::{Draw, In};
use crate::emission::{OpenSurface, Vapour, open_surface_kg_s, sweep};
use crate::ledger::{Batch, Bench, Halt, Material, Place, RuleIx};
use crate::material::{Class, Law, Solubility, Substance};
use crate::mixture::{Held, LARGEST, Lambda, PairLaw, Pairs, PerComponent, find_pair, ideal_error};
use crate::program::Reader;
use crate::quantity::Kind;
use std::sync::Arc;

/// The pressure of the air; Pa.
pub(super) const AIR_PA: f64 = 101_325.0;

struct Row {
    material: Material,
    substance: Arc<Substance>,
    molar_mass_kg_mol: f64,
    /// A factor on the vapour pressure, drawn within what its sources differ by.
    factor: In,
    density: In,
}

/// The volatile materials that a route has met up to a step, with what holds between each two of them.
pub(super) struct Vapours {
    rows: Vec<Row>,
    /// `None` where nothing evaporates.
    pairs: Option<Pairs>,
    /// Rows that do not mix.
    splits: Vec<(usize, usize)>,
    /// Volatile materials of which too little is known to reckon with.
    unknown: Vec<Material>,
    gases: Vec<Material>,
    ready: Option<Box<Ready>>,
    volumes_at_k: f64,
}

/// What follows from the temperature alone, at the one that most draws ask for.
struct Ready {
    temperature_k: f64,
    /// Vapour pressures before their factors; Pa.
    pure_pa: PerComponent,
    /// Heats of vaporisation; NaN where one is not known; J/kg.
    heat_j_kg: PerComponent,
    lambda: Lambda,
}

impl Ready {
    fn new(rows: &[Row], pairs: &Pairs, temperature_k: f64) -> Option<Box<Self>> {
        let (mut pure_pa, mut heat_j_kg) = ([0.0; LARGEST], [f64::NAN; LARGEST]);
        for ((pure, heat), row) in pure_pa.iter_mut().zip(&mut heat_j_kg).zip(rows) {
            let s = &row.substance;
            *pure = s.vapour_pressure.value(temperature_k, &s.name, "").ok()?;
            *heat = s.heat_of_vaporisation.value(temperature_k, &s.name, "").unwrap_or(f64::NAN);
        }
        Some(Box::new(Self { temperature_k, pure_pa, heat_j_kg, lambda: Lambda::at(pairs, temperature_k) }))
    }
}

/// Masses in the order of the rows; kg.
pub(super) type Masses = PerComponent;

impl Vapours {
    /// All that can evaporate of what the route has met so far: what later steps bring cannot lie there yet. `at_k` is the temperature
    /// at which it will be asked for, as a rule the same one in every draw; K.
    pub(super) fn read(r: &mut Reader<'_, '_>, at_k: Option<f64>) -> Self {
        let (mut rows, mut unknown, mut gases): (Vec<Row>, Vec<Material>, Vec<Material>) = Default::default();
        for i in 0..r.materials_so_far() {
            let Ok(i) = u16::try_from(i) else { break };
            let material = Material(i);
            let Some(substance) = r.shared_substance(material) else { continue };
            match substance.class {
                Class::Gas => gases.push(material),
                Class::Solvent | Class::Water => {
                    let mass = substance.molar_mass_kg_mol.as_ref().map(|f| f.value);
                    let factor = r.property(material, "vapour pressure factor", Kind::Number, |s| {
                        match &s.vapour_pressure {
                            Law::NotKnown => None,
                            Law::Constant(f) => Some((1.0, f.low / f.value, f.high / f.value)),
                            Law::Equation(e) => Some((1.0, 1.0 - e.below, 1.0 + e.above)),
                        }
                    });
                    match (mass, factor, r.density_of(material)) {
                        (Some(molar_mass_kg_mol), Some(factor), Some(density)) if rows.len() < LARGEST => {
                            rows.push(Row { material, substance, molar_mass_kg_mol, factor, density });
                        }
                        _ => unknown.push(material),
                    }
                }
                _ => {}
            }
        }
        let mut splits = Vec::new();
        let mut pairs = Pairs::ideal(rows.len()).ok();
        for j in 0..rows.len() {
            for i in 0..j {
                let two = [&*rows[i].substance, &*rows[j].substance];
                match find_pair(&two[0].name, &two[1].name).map(|p| p.law) {
                    Some(PairLaw::Wilson(wilson))
                        if pairs.as_mut().is_some_and(|p| p.set(i, j, wilson).is_ok()) => {}
                    Some(PairLaw::Wilson(_)) => unknown.push(rows[j].material),
                    Some(PairLaw::Splits) => splits.push((i, j)),
                    None if Pairs::between(&two).is_err() => splits.push((i, j)),
                    None => {}
                }
            }
        }
        let ready = at_k.zip(pairs.as_ref()).and_then(|(at_k, pairs)| Ready::new(&rows, pairs, at_k));
        Self { rows, pairs, splits, unknown, gases, ready, volumes_at_k: r.bench_temperature_k() }
    }

    /// Warns of what is volatile and cannot be reckoned with.
    pub(super) fn warn_unknown(&self, r: &mut Reader<'_, '_>, key: &str) {
        if !self.unknown.is_empty() {
            let names: Vec<&str> = self.unknown.iter().map(|m| r.name_of(*m)).collect();
            let found = format!(
                "no vapour pressure of {} is known: where it lies, it evaporates in the proportion in which it is there",
                names.join(", ")
            );
            r.doubt(key, found, "a material of the catalogue, or a measured share");
        }
    }

    /// The volume in a place of what evaporates and cannot be reckoned with, as far as it has a density; m³.
    pub(super) fn other_m3(&self, b: &Bench<'_>, place: Place) -> f64 {
        if self.unknown.is_empty() { 0.0 } else { b.liquid_volume_of_m3(place, &self.unknown) }
    }

    /// Moves what evaporates from the liquor to the vapour place, down to what is left of the rows. What cannot be reckoned with is left by the stated
    /// share; gases leave whole, to air. Returns what has gone of the rows; kg.
    pub(super) fn evaporate(
        &self,
        b: &mut Bench<'_>,
        there: &Masses,
        left: &Masses,
        (share_left, air): (f64, Place),
        rule: RuleIx,
    ) -> Result<Masses, Halt> {
        let mut gone = [0.0; LARGEST];
        for (((gone, row), there), left) in gone.iter_mut().zip(&self.rows).zip(there).zip(left) {
            // A rounding is no loss.
            *gone = if there > left { there - left } else { 0.0 };
            b.take(Place::LIQUOR, Place::VAPOUR, row.material, *gone, rule)?;
        }
        for m in &self.unknown {
            b.share(Place::LIQUOR, Place::VAPOUR, *m, 1.0 - share_left, rule)?;
        }
        for m in &self.gases {
            b.all(Place::LIQUOR, air, *m, rule);
        }
        Ok(gone)
    }

    /// What evaporates from an open surface in still air in a time, no more than is there; kg. With it the pressure over the liquid; Pa.
    /// `area_m2` in m², `time_s` in s.
    pub(super) fn off_a_surface(
        &self,
        x: Draw<'_>,
        kg: &Masses,
        (area_m2, temperature_k, time_s): (f64, f64, f64),
    ) -> Result<(Masses, f64), Halt> {
        let mut out = [0.0; LARGEST];
        let vapours = self.over(x, kg, temperature_k)?;
        for ((out, vapour), kg) in out.iter_mut().zip(&vapours).zip(kg) {
            if vapour.partial_pressure_pa > 0.0 {
                let surface = OpenSurface {
                    area_m2,
                    temperature_k,
                    vapour_pa: vapour.partial_pressure_pa,
                    bulk_pa: 0.0,
                    molar_mass_kg_mol: vapour.molar_mass_kg_mol,
                };
                // mᵢ = Mᵢ Kᵢ A pᵢ t/(R T)
                let gone = open_surface_kg_s(&surface)? * time_s;
                *out = if gone < *kg { gone } else { *kg };
            }
        }
        Ok((out, Self::sum_pa(&vapours)))
    }

    /// What a gas carries off when it leaves saturated, no more than is there; kg. `gas_m3` at the temperature and the pressure of the air.
    pub(super) fn carried_off(
        &self,
        x: Draw<'_>,
        kg: &Masses,
        gas_m3: f64,
        temperature_k: f64,
    ) -> Result<(Masses, f64), Halt> {
        let vapours = self.over(x, kg, temperature_k)?;
        // mᵢ = pᵢ Mᵢ F t/(R T) · P/(P − Σp)
        let mut out = sweep(gas_m3, 1.0, temperature_k, AIR_PA, None, &vapours)?.emitted.kg;
        for (out, kg) in out.iter_mut().zip(kg) {
            if *out > *kg {
                *out = *kg;
            }
        }
        Ok((out, Self::sum_pa(&vapours)))
    }

    /// Sum of the partial pressures; Pa.
    pub(super) fn sum_pa(vapours: &[Vapour; LARGEST]) -> f64 {
        vapours.iter().fold(0.0, |sum, v| sum + v.partial_pressure_pa)
    }

    /// Adds a mass of a material to masses, where it is a row.
    pub(super) fn add(&self, kg: &mut Masses, material: Material, more_kg: f64) {
        if let Some(i) = self.rows.iter().position(|r| r.material == material) {
            kg[i] += more_kg;
        }
    }

    /// The mass of one material among masses; kg.
    pub(super) fn of(&self, kg: &Masses, material: Material) -> f64 {
        self.rows.iter().position(|r| r.material == material).map_or(0.0, |i| kg[i])
    }

    /// What of them lies in a place; kg.
    pub(super) fn lying(&self, b: &Bench<'_>, place: Place) -> Masses {
        let mut kg = [0.0; LARGEST];
        for (kg, row) in kg.iter_mut().zip(&self.rows) {
            *kg = b.there(place, row.material);
        }
        kg
    }

    /// What of them a year has brought into a stream, in a run of the present basis; kg.
    pub(super) fn poured(&self, b: &Bench<'_>, stream: Place) -> Masses {
        let mut kg = [0.0; LARGEST];
        for (kg, row) in kg.iter_mut().zip(&self.rows) {
            *kg = b.poured_kg(stream, row.material);
        }
        kg
    }

    /// The masses as a mixture at a temperature: which rows are there, their amounts in mol, and the mixture.
    fn held(&self, x: Draw<'_>, kg: &Masses, temperature_k: f64) -> Result<Option<Warm>, Halt> {
        let (mut which, mut count) = ([0; LARGEST], 0);
        let (mut n, mut pressures, mut volumes) = ([0.0; LARGEST], [0.0; LARGEST], [0.0; LARGEST]);
        let ready = self.ready_at(temperature_k);
        for (i, (row, kg)) in self.rows.iter().zip(kg).enumerate() {
            if *kg > 0.0 {
                let pure = match ready {
                    Some(ready) => ready.pure_pa[i],
                    None => {
                        let s = &row.substance;
                        let pure = s.vapour_pressure.value(temperature_k, &s.name, "vapour pressure");
                        pure.map_err(crate::mixture::MixtureError::from)?
                    }
                };
                which[count] = i;
                n[count] = kg / row.molar_mass_kg_mol;
                pressures[count] = pure * x.get(row.factor);
                // v = M/ρ
                volumes[count] = row.molar_mass_kg_mol / x.get(row.density);
                count += 1;
            }
        }
        let Some(pairs) = self.pairs.as_ref().filter(|_| count > 0) else { return Ok(None) };
        let known = ready.map(|r| &r.lambda);
        let (which_ones, pressures, volumes) = (&which[..count], &pressures[..count], &volumes[..count]);
        let held = Held::with(pairs, known, which_ones, temperature_k, pressures, volumes)?;
        Ok(Some(Warm { which, count, n, held }))
    }

    fn ready_at(&self, temperature_k: f64) -> Option<&Ready> {
        self.ready.as_deref().filter(|r| r.temperature_k.to_bits() == temperature_k.to_bits())
    }

    /// The vapours over masses at a temperature, in the order of the rows; all zero over nothing.
    pub(super) fn over(
        &self,
        x: Draw<'_>,
        kg: &Masses,
        temperature_k: f64,
    ) -> Result<[Vapour; LARGEST], Halt> {
        let none = Vapour { partial_pressure_pa: 0.0, molar_mass_kg_mol: 1.0 };
        let mut out = [none; LARGEST];
        for (out, row) in out.iter_mut().zip(&self.rows) {
            out.molar_mass_kg_mol = row.molar_mass_kg_mol;
        }
        if let Some(warm) = self.held(x, kg, temperature_k)? {
            let pressures = warm.held.partial_pressures_pa(&warm.n[..warm.count]);
            for (i, pressure) in warm.which.iter().zip(pressures).take(warm.count) {
                out[*i].partial_pressure_pa = pressure;
            }
        }
        Ok(out)
    }

    /// How far water is saturated with another liquid, 0 to 1; 1 where its solubility is not known.
    fn saturated(&self, kg: &Masses, other: usize, water: usize) -> f64 {
        let (other_row, water_row) = (&self.rows[other], &self.rows[water]);
        match (&other_row.substance.solubility_in_water, water_row.substance.class) {
            (Solubility::Limited(figure), Class::Water) => {
                // m/(c_sat V_water), 1000 kg in a m³ of water
                let share = kg[other] / (figure.value * kg[water] / 1000.0);
                if share < 1.0 { share } else { 1.0 }
            }
            _ => 1.0,
        }
    }

    /// As [`Vapours::over`], where liquids that do not mix lie in layers, each as if it were alone, and what is dissolved in water
    /// has its part of that pressure: an upper limit.
    pub(super) fn over_layers(
        &self,
        x: Draw<'_>,
        kg: &Masses,
        temperature_k: f64,
    ) -> Result<[Vapour; LARGEST], Halt> {
        let mut out = self.over(x, kg, temperature_k)?;
        for &(i, j) in self.splits.iter().filter(|(i, j)| kg[*i] > 0.0 && kg[*j] > 0.0) {
            for (i, beside) in [(i, j), (j, i)] {
                let mut alone = [0.0; LARGEST];
                alone[i] = kg[i];
                out[i] = self.over(x, &alone, temperature_k)?[i];
                // pᵢ = (m/m_sat) Pᵢ,sat
                out[i].partial_pressure_pa *= self.saturated(kg, i, beside);
            }
        }
        Ok(out)
    }

    /// Takes masses down to a volume at a temperature: what is left, and ∫ dN/Σp in mol/Pa with the moles that left.
    pub(super) fn take_down(
        &self,
        x: Draw<'_>,
        kg: &Masses,
        down_to_m3: f64,
        temperature_k: f64,
    ) -> Result<Down, Halt> {
        let mut down = Down { left_kg: *kg, gone_mol: 0.0, per_pressure_mol_pa: 0.0 };
        if let Some(warm) = self.held(x, kg, temperature_k)? {
            let end = warm.held.take_down(&warm.n[..warm.count], down_to_m3);
            down.per_pressure_mol_pa = end.per_pressure_mol_pa;
            for (k, &i) in warm.which.iter().enumerate().take(warm.count) {
                down.left_kg[i] = end.left_mol[k] * self.rows[i].molar_mass_kg_mol;
                down.gone_mol += warm.n[k] - end.left_mol[k];
            }
        }
        Ok(down)
    }

    /// Heat that evaporates these masses at a temperature; J. `None` where the heat of one of them is not known.
    pub(super) fn heat_j(&self, kg: &Masses, temperature_k: f64) -> Option<f64> {
        let mut heat_j = 0.0;
        let ready = self.ready_at(temperature_k);
        for (i, (row, kg)) in self.rows.iter().zip(kg).enumerate() {
            if *kg > 0.0 {
                let s = &row.substance;
                let heat_j_kg = match ready {
                    Some(ready) => ready.heat_j_kg[i],
                    None => s.heat_of_vaporisation.value(temperature_k, &s.name, "").ok()?,
                };
                // Q = Σ mᵢ Δhᵢ
                heat_j += kg * heat_j_kg;
            }
        }
        heat_j.is_finite().then_some(heat_j)
    }

    /// Density of these masses as a liquid at a temperature, as if volumes added; kg/m³. `None` over nothing or where one is not known.
    pub(super) fn density_kg_m3(&self, kg: &Masses, temperature_k: f64) -> Option<f64> {
        let (mut mass, mut volume) = (0.0, 0.0);
        for (row, kg) in self.rows.iter().zip(kg) {
            if *kg > 0.0 {
                let s = &row.substance;
                mass += kg;
                // V = Σ mᵢ / ρᵢ(T)
                volume += kg / s.density.value(temperature_k, &s.name, "").ok()?;
            }
        }
        (volume > 0.0).then(|| mass / volume)
    }

    /// The row of which most is there, and a temperature's vapour pressure of it alone, for estimates; Pa.
    pub(super) fn most(&self, kg: &Masses) -> Option<&Substance> {
        let mut most: Option<(usize, f64)> = None;
        for (i, kg) in kg.iter().enumerate().take(self.rows.len()) {
            if *kg > 0.0 && most.is_none_or(|(_, m)| *kg > m) {
                most = Some((i, *kg));
            }
        }
        most.map(|(i, _)| &*self.rows[i].substance)
    }

    /// Records that masses are taken down at a temperature, K, to a volume, m³; `boils` under a held pressure.
    pub(super) fn note_way_down(
        &self,
        b: &mut Bench<'_>,
        kg: &Masses,
        (temperature_k, down_to_m3): (f64, f64),
        boils: bool,
    ) {
        b.takes_down(|step| {
            let (parts, count) = self.parts(kg);
            let kg = parts[..count].to_vec();
            Batch { step, kg, volumes_at_k: self.volumes_at_k, temperature_k, down_to_m3, boils }
        });
    }

    /// Pairs the masses by material, for the bench.
    pub(super) fn parts(&self, kg: &Masses) -> ([(Material, f64); LARGEST], usize) {
        let mut parts = [(Material(0), 0.0); LARGEST];
        for ((part, row), kg) in parts.iter_mut().zip(&self.rows).zip(kg) {
            *part = (row.material, *kg);
        }
        (parts, self.rows.len())
    }

    /// Tells where the mixture is taken as ideal for want of constants, and where two liquids are taken as one.
    pub(super) fn tell(&self, b: &mut Bench<'_>, kg: &Masses, rule: RuleIx) {
        if !b.traced() {
            return;
        }
        let mut moles = [0.0; LARGEST];
        let mut total = 0.0;
        for ((n, kg), row) in moles.iter_mut().zip(kg).zip(&self.rows) {
            *n = kg / row.molar_mass_kg_mol;
            total += *n;
        }
        let there = |i: usize, j: usize| moles[i] > 0.01 * total && moles[j] > 0.01 * total;
        if self.splits.iter().any(|&(i, j)| there(i, j)) {
            b.doubt(
                rule,
                "two liquids that do not mix are taken as one; the pressure over them can be as many times as high as",
                2.0,
                Kind::Number,
                "part them first (a drying agent, a funnel), or your own measurement",
            );
        } else if self.pairs.iter().flat_map(Pairs::ideal_pairs).any(|p| there(p.first, p.second)) {
            b.doubt(
                rule,
                "no constants are known for a pair of these liquids, which are taken as ideal; among the pairs that are known the real pressure reaches, as a multiple of the ideal one,",
                ideal_error().highest,
                Kind::Number,
                "your own measurement of what condenses or is lost",
            );
        }
    }
}

struct Warm {
    which: [usize; LARGEST],
    count: usize,
    n: PerComponent,
    held: Held,
}

/// What [`Vapours::take_down`] comes to.
pub(super) struct Down {
    /// What is left; kg.
    pub(super) left_kg: Masses,
    /// What has gone; mol.
    pub(super) gone_mol: f64,
    /// ∫ dN/Σp; mol/Pa.
    pub(super) per_pressure_mol_pa: f64,
}

impl Down {
    /// Gas at the pressure of the air that carries the vapour away when it leaves saturated; mol. 0 where the liquid boils.
    pub(super) fn carrier_mol(&self) -> f64 {
        // n = P ∫ dN/Σp − N
        let gas = AIR_PA * self.per_pressure_mol_pa - self.gone_mol;
        if gas > 0.0 { gas } else { 0.0 }
    }
}
