//! The core against itself: derivatives a second way, folded against term by term.
use super::naive::{self, Equation};
use super::table::{assert_close, number, rows};
use thimbleworth::co2::{self, State};

/// States all over the range, none within 2 % of the saturation pressure.
fn grid() -> Vec<State> {
    let mut states = Vec::new();
    for temperature_k in [
        220.0, 235.0, 250.0, 262.0, 275.0, 288.0, 298.0, 303.0, 304.5, 306.0, 310.0, 318.0, 330.0, 350.0,
        380.0, 420.0, 500.0, 650.0, 850.0, 1090.0,
    ] {
        for pressure_bar in [
            0.01, 0.3, 3.0, 12.0, 30.0, 50.0, 62.0, 70.0, 76.0, 82.0, 95.0, 120.0, 180.0, 300.0, 600.0,
            1500.0, 3000.0, 7900.0,
        ] {
            let pressure_pa = pressure_bar * 1e5;
            if let Ok(saturation_pa) = co2::saturation_pressure_pa(temperature_k)
                && (pressure_pa / saturation_pa - 1.0).abs() < 0.02
            {
                continue;
            }
            if let Ok(melting_pa) = co2::melting_pressure_pa(temperature_k)
                && pressure_pa > 0.99 * melting_pa
            {
                continue;
            }
            states.push(co2::state(temperature_k, pressure_pa).unwrap());
        }
    }
    assert!(states.len() > 300, "{}", states.len());
    states
}

/// Central difference with one step of Richardson's extrapolation.
fn slope(f: impl Fn(f64) -> f64, x: f64, step: f64) -> f64 {
    let wide = (f(x + step) - f(x - step)) / (2.0 * step);
    let narrow = (f(x + 0.5 * step) - f(x - 0.5 * step)) / step;
    (4.0 * narrow - wide) / 3.0
}

#[test]
fn folded_and_term_by_term_give_one_pressure() {
    let equation = Equation::read();
    for state in grid() {
        let (t, density) = (state.temperature_k, state.density_kg_m3);
        // Large terms cancel: what counts is the difference against ρRT.
        let ideal = density / naive::MOLAR_MASS_KG_MOL * naive::GAS_CONSTANT_J_MOL_K * t;
        let off = (equation.pressure_pa(t, density) - state.pressure_pa) / (ideal + state.pressure_pa);
        assert!(off.abs() < 2e-12, "{t} K, {density} kg/m3: {off:e}");
    }
}

#[test]
fn enthalpy_and_entropy_by_differences_of_the_helmholtz_energy() {
    let equation = Equation::read();
    let gas_constant = naive::GAS_CONSTANT_J_MOL_K / naive::MOLAR_MASS_KG_MOL;
    for state in grid() {
        let (t, density) = (state.temperature_k, state.density_kg_m3);
        let helmholtz = |t: f64| {
            let (tau, delta) = naive::reduced(t, density);
            gas_constant * t * (equation.ideal(tau, delta) + equation.residual(tau, delta))
        };
        // s = −(∂a/∂T)_ρ, h = a + T s + p/ρ, c_v = T (∂s/∂T)_ρ
        let entropy = -slope(helmholtz, t, 1e-3 * t);
        let enthalpy = helmholtz(t) + t * entropy + state.pressure_pa / density;
        let what = format!("{t} K, {} Pa", state.pressure_pa);
        // 10 J/(kg K) and 2 kJ/kg stand for the size of terms that cancel near the zero point.
        assert!((state.entropy_j_kg_k - entropy).abs() < 1e-7 * (entropy.abs() + 10.0), "entropy, {what}");
        assert!((state.enthalpy_j_kg - enthalpy).abs() < 1e-7 * (enthalpy.abs() + 2e3), "enthalpy, {what}");
    }
}

#[test]
fn heat_capacities_and_speed_of_sound_by_differences_of_states() {
    for state in grid() {
        let (t, p) = (state.temperature_k, state.pressure_pa);
        let critical = (t - 304.1282).abs() < 8.0 && (p / 7.3773e6 - 1.0).abs() < 0.3;
        let step = if critical { 2e-5 } else { 2e-4 };
        let allowed = if critical { 1e-7 } else { 1e-8 };
        let what = format!("{t} K, {p} Pa");
        let at = |t: f64, p: f64| co2::state(t, p).unwrap();

        // c_p = (∂h/∂T)_p = T (∂s/∂T)_p
        let from_enthalpy = slope(|x| at(x, p).enthalpy_j_kg, t, step * t);
        let from_entropy = t * slope(|x| at(x, p).entropy_j_kg_k, t, step * t);
        assert_close(from_enthalpy, state.heat_capacity_j_kg_k, allowed, &format!("cp from h, {what}"));
        assert_close(from_entropy, state.heat_capacity_j_kg_k, allowed, &format!("cp from s, {what}"));

        // (∂s/∂p)_T = −(∂v/∂T)_p, Maxwell
        let by_pressure = slope(|x| at(t, x).entropy_j_kg_k, p, step * p);
        let by_temperature = -slope(|x| 1.0 / at(x, p).density_kg_m3, t, step * t);
        assert_close(by_pressure, by_temperature, 3.0 * allowed, &format!("Maxwell, {what}"));

        // c_v = c_p − T (∂v/∂T)_p² / −(∂v/∂p)_T; w² = −v² (c_p/c_v)/(∂v/∂p)_T
        let compression = -slope(|x| 1.0 / at(t, x).density_kg_m3, p, step * p);
        let isochoric = state.heat_capacity_j_kg_k - t * by_temperature * by_temperature / compression;
        let ratio = state.heat_capacity_j_kg_k / state.isochoric_heat_capacity_j_kg_k;
        assert_close(isochoric, state.isochoric_heat_capacity_j_kg_k, 3.0 * allowed, &format!("cv, {what}"));
        let sound = (ratio / compression).sqrt() / state.density_kg_m3;
        assert_close(sound, state.sound_speed_m_s, 3.0 * allowed, &format!("speed of sound, {what}"));
    }
}

/// Uniform numbers from 0 to 1, the same on every run (xorshift).
fn uniform() -> impl FnMut() -> f64 {
    let mut x = 0x1234_5678_9abc_def1_u64;
    move || {
        x ^= x << 13;
        x ^= x >> 7;
        x ^= x << 17;
        f64::from(u32::try_from(x >> 32).unwrap()) / f64::from(u32::MAX)
    }
}

#[test]
fn pressure_and_density_invert_each_other() {
    let mut r = uniform();
    let mut checked = 0;
    for n in 0..120_000 {
        // The whole range, the range of extraction, and ever closer around the critical point.
        let (t, p) = match n % 3 {
            0 => (216.6 + 883.0 * r(), 10_f64.powf(8.9 * r())),
            1 => (273.15 + 120.0 * r(), 1e5 + 6e7 * r()),
            _ => {
                let away = 10_f64.powf(-2.9 + 3.0 * r()) * if r() < 0.5 { -1.0 } else { 1.0 };
                let off = 10_f64.powf(-8.0 + 7.0 * r()) * if r() < 0.5 { -1.0 } else { 1.0 };
                (304.1282 + away, 7.3773e6 * (1.0 + 7.0 * away / 304.1282 + off))
            }
        };
        let Ok(density) = co2::density_kg_m3(t, p) else { continue };
        let again = co2::pressure_pa(t, density).unwrap();
        let what = format!("{t} K, {p} Pa, {density} kg/m3");
        // In a stiff liquid the rounding of the density alone moves the pressure: measure the error in density.
        let (Ok(above), Ok(below)) =
            (co2::pressure_pa(t, density * (1.0 + 1e-6)), co2::pressure_pa(t, density * (1.0 - 1e-6)))
        else {
            continue;
        };
        let stiffness = (above - below) / (2e-6 * p);
        assert!(stiffness > 0.0, "{what}");
        let error = ((again / p - 1.0) / stiffness).abs();
        assert!(error < 3e-13 * (1.0 + 1.0 / stiffness), "{what}: {error:e}");
        checked += 1;
    }
    assert!(checked > 110_000, "{checked}");
}

#[test]
fn an_ideal_gas_at_low_pressure() {
    // Law of ideal gases, and c_p − c_v = R.
    let gas_constant = naive::GAS_CONSTANT_J_MOL_K / naive::MOLAR_MASS_KG_MOL;
    for temperature_k in [217.0, 250.0, 300.0, 304.1282, 500.0, 1100.0] {
        let state = co2::state(temperature_k, 0.01).unwrap();
        assert_close(state.density_kg_m3, 0.01 / (gas_constant * temperature_k), 1e-8, "density");
        let difference = state.heat_capacity_j_kg_k - state.isochoric_heat_capacity_j_kg_k;
        assert_close(difference, gas_constant, 1e-7, "cp - cv");
    }
}

#[test]
fn density_rises_with_pressure_and_falls_with_temperature() {
    // A solver that stops early or jumps to another root breaks the order.
    for n in 0..300 {
        let temperature_k = 217.0 + 0.55 * f64::from(n);
        let mut last = 0.0;
        for m in 0..400 {
            let pressure_pa = 1e3 * 10_f64.powf(5.3 * f64::from(m) / 399.0);
            let Ok(density) = co2::density_kg_m3(temperature_k, pressure_pa) else { break };
            assert!(density > last, "{temperature_k} K, {pressure_pa} Pa: {density} after {last}");
            last = density;
            if let Ok(warmer) = co2::density_kg_m3(temperature_k + 0.1, pressure_pa) {
                assert!(warmer < density, "{temperature_k} K, {pressure_pa} Pa");
            }
        }
        assert!(last > 100.0, "{temperature_k} K: the sweep ended at {last} kg/m3");
    }
}

#[test]
fn the_factors_agree_with_a_second_listing() {
    let equation = Equation::read();
    let own = equation.terms.iter().filter(|(kind, _)| matches!(*kind, "power" | "gauss" | "critical"));
    let listed = rows(include_str!("factors.csv"));
    assert_eq!(listed.len(), 42);
    let mut compared = 0;
    for ((_, c), row) in own.zip(&listed) {
        // 12 digits against 14.
        assert_close(c[0], number(row[0]), 5e-12, row[0]);
        compared += 1;
    }
    assert_eq!(compared, 42);
}
