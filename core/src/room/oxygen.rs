//! Oxygen that a gas pushes out of a room.
//!
//! Air holds 20.9 % by volume. Guides round: the ventilated formula of university guides starts from 21 %, and is kept as they print
//! it so that its figures can be held against theirs.
use super::error::{RoomError, fraction, not_negative, positive};

/// Oxygen in air for the formulas of displacement, fraction by volume (common practice).
pub const OXYGEN_DISPLACED: f64 = 0.209;
/// Oxygen in air for the ventilated formula, as its guides print it, fraction by volume (seen in University of Oxford S4/03).
pub const OXYGEN_VENTILATED: f64 = 0.21;
/// First alarm of oxygen monitors, fraction by volume (seen in a secondary source).
pub const OXYGEN_ALARM_FIRST: f64 = 0.195;
/// Second alarm of oxygen monitors, fraction by volume (seen in a secondary source).
pub const OXYGEN_ALARM_SECOND: f64 = 0.18;

/// Oxygen after a volume of gas has pushed out its own volume of air at once, fraction by volume: 0.209 (V_r − V_g)/V_r,
/// and none when the gas fills the room.
///
/// # Errors
/// [`RoomError`] for a room that is not positive or a negative volume of gas.
///
/// ```
/// use thimbleworth::room::oxygen_at_once;
/// assert!((oxygen_at_once(75.0, 16.3977)? - 0.16331).abs() < 1e-5);
/// assert_eq!(oxygen_at_once(10.0, 12.0)?, 0.0);
/// # Ok::<(), thimbleworth::room::RoomError>(())
/// ```
pub fn oxygen_at_once(room_m3: f64, gas_m3: f64) -> Result<f64, RoomError> {
    let (v_r, v_g) = volumes(room_m3, gas_m3)?;
    // O₂ = 0.209 (V_r − V_g)/V_r
    Ok(if v_g < v_r { OXYGEN_DISPLACED * (v_r - v_g) / v_r } else { 0.0 })
}

/// Oxygen after a volume of gas has mixed with the air while it pushed air out, fraction by volume: 0.209 e^{−V_g/V_r}.
///
/// # Errors
/// [`RoomError`] for a room that is not positive or a negative volume of gas.
///
/// ```
/// use thimbleworth::room::oxygen_mixed;
/// assert!((oxygen_mixed(75.0, 16.3977)? - 0.16796).abs() < 1e-5);
/// # Ok::<(), thimbleworth::room::RoomError>(())
/// ```
pub fn oxygen_mixed(room_m3: f64, gas_m3: f64) -> Result<f64, RoomError> {
    let (v_r, v_g) = volumes(room_m3, gas_m3)?;
    // O₂ = 0.209 e^{−V_g/V_r}
    Ok(OXYGEN_DISPLACED * libm::exp(-v_g / v_r))
}

/// Oxygen with a steady release into a ventilated room after a time, fraction by volume:
/// 0.21 (1 − (G/(N V))(1 − e^{−N t})); an infinite time gives the steady state. In a closed room G t/V takes the place of the rise.
///
/// `gas_m3_s` is G in m³/s, `air_changes_per_s` is N in 1/s.
///
/// # Errors
/// [`RoomError`] for values that cannot be, or a release that would fill the room.
///
/// ```
/// use thimbleworth::room::{oxygen_ventilated, OXYGEN_VENTILATED, HOUR_S};
/// // 0.04375 m³/h into 36 m³ at 0.4 air changes an hour: 0.064 points of per cent less
/// let o2 = oxygen_ventilated(36.0, 0.04375 / HOUR_S, 0.4 / HOUR_S, f64::INFINITY)?;
/// assert!((100.0 * (OXYGEN_VENTILATED - o2) - 0.0638).abs() < 1e-4);
/// # Ok::<(), thimbleworth::room::RoomError>(())
/// ```
pub fn oxygen_ventilated(
    room_m3: f64,
    gas_m3_s: f64,
    air_changes_per_s: f64,
    time_s: f64,
) -> Result<f64, RoomError> {
    let (v, g) = volumes(room_m3, gas_m3_s)?;
    let n = not_negative("number of air changes", air_changes_per_s)?;
    if time_s.is_nan() || time_s < 0.0 {
        return Err(RoomError::Negative { of: "time", value: time_s });
    }
    // C = (G/(N V))(1 − e^{−N t}), and G t/V without ventilation
    let rise = if n > 0.0 {
        g / (n * v) * -libm::expm1(-n * time_s)
    } else if g > 0.0 {
        g * time_s / v
    } else {
        0.0
    };
    // O₂ = 0.21 (1 − C)
    Ok(OXYGEN_VENTILATED * (1.0 - fraction("share of the room that is gas", rise)?))
}

/// Oxygen in air that holds a gas at a fraction by volume: 0.209 (1 − x).
///
/// # Errors
/// [`RoomError::NotAFraction`].
///
/// ```
/// use thimbleworth::room::oxygen_beside;
/// // At 5000 ppm of carbon dioxide, its 8-hour limit, a monitor of oxygen reads 20.8 %
/// assert!((oxygen_beside(0.005)? - 0.208).abs() < 1e-4);
/// # Ok::<(), thimbleworth::room::RoomError>(())
/// ```
pub fn oxygen_beside(gas: f64) -> Result<f64, RoomError> {
    // O₂ = 0.209 (1 − x)
    Ok(OXYGEN_DISPLACED * (1.0 - fraction("fraction of gas", gas)?))
}

/// How much gas there is when a monitor of oxygen reads a figure, fraction by volume: 1 − O₂/0.209.
///
/// # Errors
/// [`RoomError::NotAFraction`] for more oxygen than air has, or less than none.
///
/// ```
/// use thimbleworth::room::{gas_fraction_at_oxygen, OXYGEN_ALARM_FIRST};
/// // When the first alarm sounds, carbon dioxide stands at 6.7 %: beyond what is immediately dangerous (4 %)
/// assert!((gas_fraction_at_oxygen(OXYGEN_ALARM_FIRST)? - 0.067).abs() < 1e-4);
/// # Ok::<(), thimbleworth::room::RoomError>(())
/// ```
pub fn gas_fraction_at_oxygen(oxygen: f64) -> Result<f64, RoomError> {
    // x = 1 − O₂/0.209
    fraction("share of gas at this oxygen", 1.0 - oxygen / OXYGEN_DISPLACED)
}

fn volumes(room_m3: f64, gas: f64) -> Result<(f64, f64), RoomError> {
    Ok((positive("volume of the room", room_m3)?, not_negative("volume of gas", gas)?))
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn mixed_never_leaves_less_than_at_once() {
        for gas in [0.0, 0.1, 5.0, 40.0, 90.0] {
            assert!(oxygen_mixed(40.0, gas).unwrap() >= oxygen_at_once(40.0, gas).unwrap(), "{gas}");
        }
    }

    #[test]
    fn refuses_what_cannot_be() {
        assert!(gas_fraction_at_oxygen(0.25).is_err());
        assert!(oxygen_beside(1.2).is_err());
        assert!(oxygen_ventilated(30.0, 1.0, 0.01, f64::INFINITY).is_err());
        assert!(oxygen_ventilated(30.0, 1.0, 0.01, f64::NAN).is_err());
        assert_eq!(oxygen_ventilated(30.0, 0.0, 0.0, f64::INFINITY), Ok(0.21));
    }
}
