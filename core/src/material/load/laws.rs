//! The tables of density, vapour pressure and heat of vaporisation: coefficients of published equations.
use super::super::table::Table;
use super::super::{Equation, Form, Law, WagnerPowers};
use super::Shelf;

tables! {
    DENSITY_EOS "density_eos.csv"
    DENSITY_VDI "density_vdi.csv"
    DENSITY_PERRY "density_perry.csv"
    DENSITY_SINGLE "density_single.csv"
    VAPOUR_EOS "vapour_pressure_eos.csv"
    VAPOUR_VDI "vapour_pressure_vdi.csv"
    VAPOUR_MCGARRY "vapour_pressure_mcgarry.csv"
    VAPOUR_POLING "vapour_pressure_poling.csv"
    VAPOUR_ANTOINE "vapour_pressure_antoine.csv"
    VAPOUR_PERRY "vapour_pressure_perry.csv"
    HEAT_EOS "heat_eos.csv"
    HEAT_VDI "heat_vdi.csv"
    HEAT_PERRY "heat_perry.csv"
    HEAT_WATSON "heat_watson.csv"
}

/// An equation of the tables: its range in K, then how far other sources lie below and above it in per cent.
fn equation(form: Form, [low_k, high_k, below_pct, above_pct]: [f64; 4], source: &'static str) -> Law {
    Law::Equation(Equation {
        form,
        low_k,
        high_k,
        below: below_pct / 100.0,
        above: above_pct / 100.0,
        source: source.into(),
    })
}

impl Shelf {
    pub(super) fn density(&mut self) {
        for table in [DENSITY_EOS, DENSITY_VDI] {
            let columns = [
                "name",
                "tc_k",
                "rho_c_kg_m3",
                "a",
                "b",
                "c",
                "d",
                "low_k",
                "high_k",
                "below_pct",
                "above_pct",
                "source",
            ];
            self.each(
                table,
                columns,
                |shelf, index, [name, tc, rho, a, b, c, d, low, high, below, above, source]| {
                    let [tc_k, rho_c_kg_m3] = shelf.numbers(table, name, [tc, rho]);
                    let terms = shelf.numbers(table, name, [a, b, c, d]);
                    let spread = shelf.numbers(table, name, [low, high, below, above]);
                    let form = Form::DensityVdi { tc_k, rho_c_kg_m3, terms };
                    shelf.set(index, |s| s.density = equation(form, spread, source));
                },
            );
        }
        let columns =
            ["name", "c1_mol_m3", "c2", "c3", "c4", "low_k", "high_k", "below_pct", "above_pct", "source"];
        self.each(
            DENSITY_PERRY,
            columns,
            |shelf, index, [name, c1, c2, c3, c4, low, high, below, above, source]| {
                let c = shelf.numbers(DENSITY_PERRY, name, [c1, c2, c3, c4]);
                let spread = shelf.numbers(DENSITY_PERRY, name, [low, high, below, above]);
                let form = Form::DensityPerry { molar_mass_kg_mol: shelf.molar_mass(index), c };
                shelf.set(index, |s| s.density = equation(form, spread, source));
            },
        );
        let columns = [
            "name",
            "density_kg_m3",
            "at_c",
            "expansion_per_kk",
            "low_c",
            "high_c",
            "below_pct",
            "above_pct",
            "source",
        ];
        self.each(
            DENSITY_SINGLE,
            columns,
            |shelf, index, [name, rho, at, beta, low, high, below, above, source]| {
                let [density_kg_m3, at_c, beta] = shelf.numbers(DENSITY_SINGLE, name, [rho, at, beta]);
                let [low, high, below, above] =
                    shelf.numbers(DENSITY_SINGLE, name, [low, high, below, above]);
                let form = Form::DensityLinear {
                    density_kg_m3,
                    at_k: at_c + 273.15,
                    expansion_per_k: beta / 1000.0,
                };
                shelf.set(index, |s| {
                    s.density = equation(form, [low + 273.15, high + 273.15, below, above], source);
                });
            },
        );
    }

    pub(super) fn vapour_pressure(&mut self) {
        for (table, powers) in [
            (VAPOUR_EOS, WagnerPowers::TwoAndAHalfAndFive),
            (VAPOUR_VDI, WagnerPowers::TwoAndAHalfAndFive),
            (VAPOUR_POLING, WagnerPowers::TwoAndAHalfAndFive),
            (VAPOUR_MCGARRY, WagnerPowers::ThreeAndSix),
        ] {
            let columns = [
                "name",
                "tc_k",
                "pc_pa",
                "a",
                "b",
                "c",
                "d",
                "low_k",
                "high_k",
                "below_pct",
                "above_pct",
                "source",
            ];
            self.each(
                table,
                columns,
                |shelf, index, [name, tc, pc, a, b, c, d, low, high, below, above, source]| {
                    let [tc_k, pc_pa] = shelf.numbers(table, name, [tc, pc]);
                    let terms = shelf.numbers(table, name, [a, b, c, d]);
                    let spread = shelf.numbers(table, name, [low, high, below, above]);
                    let form = Form::Wagner { tc_k, pc_pa, terms, powers };
                    shelf.set(index, |s| s.vapour_pressure = equation(form, spread, source));
                },
            );
        }
        let columns = ["name", "a", "b", "c", "low_k", "high_k", "below_pct", "above_pct", "source"];
        self.each(
            VAPOUR_ANTOINE,
            columns,
            |shelf, index, [name, a, b, c, low, high, below, above, source]| {
                let c = shelf.numbers(VAPOUR_ANTOINE, name, [a, b, c]);
                let spread = shelf.numbers(VAPOUR_ANTOINE, name, [low, high, below, above]);
                shelf.set(index, |s| s.vapour_pressure = equation(Form::Antoine { c }, spread, source));
            },
        );
        let columns =
            ["name", "c1", "c2", "c3", "c4", "c5", "low_k", "high_k", "below_pct", "above_pct", "source"];
        self.each(
            VAPOUR_PERRY,
            columns,
            |shelf, index, [name, c1, c2, c3, c4, c5, low, high, below, above, source]| {
                let c = shelf.numbers(VAPOUR_PERRY, name, [c1, c2, c3, c4, c5]);
                let spread = shelf.numbers(VAPOUR_PERRY, name, [low, high, below, above]);
                shelf.set(index, |s| s.vapour_pressure = equation(Form::VapourPerry { c }, spread, source));
            },
        );
    }

    pub(super) fn heat(&mut self) {
        for table in [HEAT_EOS, HEAT_VDI] {
            let columns = [
                "name",
                "tc_k",
                "a",
                "b",
                "c",
                "d",
                "e",
                "low_k",
                "high_k",
                "below_pct",
                "above_pct",
                "source",
            ];
            self.each(
                table,
                columns,
                |shelf, index, [name, tc, a, b, c, d, e, low, high, below, above, source]| {
                    let tc_k = shelf.number(table, name, tc);
                    let terms = shelf.numbers(table, name, [a, b, c, d, e]);
                    let spread = shelf.numbers(table, name, [low, high, below, above]);
                    let form = Form::HeatVdi { tc_k, molar_mass_kg_mol: shelf.molar_mass(index), terms };
                    shelf.set(index, |s| s.heat_of_vaporisation = equation(form, spread, source));
                },
            );
        }
        let columns = [
            "name",
            "tc_k",
            "c1_j_mol",
            "c2",
            "c3",
            "c4",
            "low_k",
            "high_k",
            "below_pct",
            "above_pct",
            "source",
        ];
        self.each(
            HEAT_PERRY,
            columns,
            |shelf, index, [name, tc, c1, c2, c3, c4, low, high, below, above, source]| {
                let tc_k = shelf.number(HEAT_PERRY, name, tc);
                let c = shelf.numbers(HEAT_PERRY, name, [c1, c2, c3, c4]);
                let spread = shelf.numbers(HEAT_PERRY, name, [low, high, below, above]);
                let form = Form::HeatPerry { tc_k, molar_mass_kg_mol: shelf.molar_mass(index), c };
                shelf.set(index, |s| s.heat_of_vaporisation = equation(form, spread, source));
            },
        );
        let columns =
            ["name", "heat_j_kg", "at_c", "tc_k", "low_k", "high_k", "below_pct", "above_pct", "source"];
        self.each(
            HEAT_WATSON,
            columns,
            |shelf, index, [name, heat, at, tc, low, high, below, above, source]| {
                let [heat_j_kg, at_c, tc_k] = shelf.numbers(HEAT_WATSON, name, [heat, at, tc]);
                let spread = shelf.numbers(HEAT_WATSON, name, [low, high, below, above]);
                let form = Form::HeatWatson { heat_j_kg, at_k: at_c + 273.15, tc_k };
                shelf.set(index, |s| s.heat_of_vaporisation = equation(form, spread, source));
            },
        );
    }
}
