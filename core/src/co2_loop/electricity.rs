//! What drives, coolers and heaters draw from the mains for a kilogram passed through.
use super::error::{efficiency, within};
use super::{Kind, Loop, LoopError};

/// Where heat comes from.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Heating {
    /// Electric: heat delivered over electricity drawn. 1 for a resistance heater without loss; above 1 for a heat pump.
    Electric {
        /// Heat over electricity, above 0 to 10.
        ratio: f64,
    },
    /// Steam, hot water, the room: no electricity.
    NotElectric,
}

/// Machines around a loop.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Utilities {
    /// Work at the shaft over electricity drawn, above 0 to 1: motor, converter, gear.
    pub drive_efficiency: f64,
    /// Heat taken from the stream over electricity drawn by the cooling machine (coefficient of performance, COP), above
    /// 0 to 50.
    pub cooling_cop: f64,
    /// Where heat comes from.
    pub heating: Heating,
}

/// What a loop draws, J per kg passed through.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Electricity {
    /// Electricity of pumps and compressors, J/kg.
    pub drives_j_kg: f64,
    /// Electricity of chillers and condensers, J/kg.
    pub coolers_j_kg: f64,
    /// Electricity of heaters, J/kg.
    pub heaters_j_kg: f64,
    /// Heat that is not electric, J/kg.
    pub other_heat_j_kg: f64,
}

impl Electricity {
    /// All electricity, J/kg.
    ///
    /// ```
    /// use thimbleworth::co2_loop::{ClosedLoop, Heating, Utilities};
    /// let machines = Utilities { drive_efficiency: 1.0, cooling_cop: 3.0, heating: Heating::NotElectric };
    /// let drawn = machines.drawn(&ClosedLoop::default().energies().unwrap()).unwrap();
    /// assert!((drawn.total_j_kg() - (37_859.0 + 231_516.0 / 3.0)).abs() < 2.0);
    /// ```
    #[must_use]
    pub fn total_j_kg(&self) -> f64 {
        self.drives_j_kg + self.coolers_j_kg + self.heaters_j_kg
    }
}

impl Utilities {
    /// What these machines draw for a loop.
    ///
    /// Cooling at −10 °C and cooling by tap water are not the same: one COP for all coolers is a simplification, and the
    /// figure to state is that at the coldest of them. Standby, heat losses of vessels and controls are not in it; a
    /// reading of the meter overrides it.
    ///
    /// # Errors
    /// [`LoopError::OutOfRange`].
    ///
    /// ```
    /// use thimbleworth::co2_loop::{Heating, OpenLoop, Utilities};
    /// let machines =
    ///     Utilities { drive_efficiency: 0.9, cooling_cop: 2.5, heating: Heating::Electric { ratio: 1.0 } };
    /// let drawn = machines.drawn(&OpenLoop::default().energies().unwrap()).unwrap();
    /// assert!((drawn.drives_j_kg - 36_089.0 / 0.9).abs() < 1.0);
    /// assert!((drawn.coolers_j_kg - 44_439.0 / 2.5).abs() < 1.0);
    /// assert!((drawn.heaters_j_kg - (63_930.0 + 191_741.0)).abs() < 1.0);
    /// ```
    pub fn drawn(&self, energies: &Loop) -> Result<Electricity, LoopError> {
        let drive = efficiency("efficiency of the drive", self.drive_efficiency)?;
        let cop = self.cooling_cop;
        within("COP of the cooling machine", cop, cop > 0.0 && cop <= 50.0, "a number above 0 and up to 50")?;
        let heat_j_kg = energies.sum_j_kg(Kind::Heat);
        let (heaters_j_kg, other_heat_j_kg) = match self.heating {
            Heating::Electric { ratio } => {
                let allowed = "a number above 0 and up to 10";
                within("heat per electricity of the heaters", ratio, ratio > 0.0 && ratio <= 10.0, allowed)?;
                (heat_j_kg / ratio, 0.0)
            }
            Heating::NotElectric => (0.0, heat_j_kg),
        };
        Ok(Electricity {
            // E = Σ w/η
            drives_j_kg: energies.sum_j_kg(Kind::Work) / drive,
            // E = Σ |q|/COP
            coolers_j_kg: energies.sum_j_kg(Kind::Cooling).abs() / cop,
            heaters_j_kg,
            other_heat_j_kg,
        })
    }
}
