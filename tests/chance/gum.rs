//! JCGM 100:2008, annex H: propagation to first order with correlated quantities.

use super::near;
use thimbleworth::chance::{combined_uncertainty, contribution, mean_and_deviation};

/// The correlation coefficient of two means from simultaneous observations.
fn correlation(a: &[f64], b: &[f64]) -> f64 {
    let ((ma, sa), (mb, sb)) = (mean_and_deviation(a), mean_and_deviation(b));
    let mut sum = 0.0;
    for (a, b) in a.iter().zip(b) {
        sum += (a - ma) * (b - mb);
    }
    sum / ((a.len() - 1) as f64 * sa * sb)
}

/// H.2, resistance and reactance from five simultaneous observations of voltage, current and phase (observations from
/// memory; means, u and coefficients as seen in a secondary source: 4.999 V u 3.2 mV, 19.661 mA u 9.5 µA, 1.04446 rad
/// u 7.5e-4, r −0.36, 0.86, −0.65). Results: R 127.732 u 0.071, X 219.847 u 0.295, Z 254.260 u 0.236 Ω, r(R, X) −0.588.
#[test]
fn resistance_and_reactance() {
    let v = [5.007, 4.994, 5.005, 4.990, 4.999];
    let i = [19.663e-3, 19.639e-3, 19.640e-3, 19.685e-3, 19.678e-3];
    let phi = [1.0456, 1.0438, 1.0468, 1.0428, 1.0433];
    let means = [v, i, phi].map(|o| mean_and_deviation(&o).0);
    let u = [v, i, phi].map(|o| mean_and_deviation(&o).1 / 5.0_f64.sqrt());
    for (found, printed) in means.iter().zip([4.999, 19.661e-3, 1.04446]) {
        near(*found, printed, 1e-9);
    }
    for (found, printed, within) in [(u[0], 3.2e-3, 5e-5), (u[1], 9.5e-6, 5e-8), (u[2], 7.5e-4, 5e-6)] {
        near(found, printed, within);
    }
    let r = [(0, 1, correlation(&v, &i)), (0, 2, correlation(&v, &phi)), (1, 2, correlation(&i, &phi))];
    for ((_, _, found), printed) in r.iter().zip([-0.36, 0.86, -0.65]) {
        near(*found, printed, 0.005);
    }
    type Model = fn(&[f64; 3]) -> f64;
    let models: [Model; 3] = [|x| x[0] / x[1] * x[2].cos(), |x| x[0] / x[1] * x[2].sin(), |x| x[0] / x[1]];
    let parts = models.map(|model| {
        [0, 1, 2].map(|k| {
            let at = |sign: f64| {
                let mut x = means;
                x[k] += sign * u[k];
                model(&x)
            };
            contribution(at(1.0), at(-1.0))
        })
    });
    // u(X) is printed 0.295; with unrounded means it is 0.2956.
    for ((model, part), (value, printed)) in
        models.iter().zip(&parts).zip([(127.732, 0.071), (219.847, 0.2956), (254.260, 0.236)])
    {
        near(model(&means), value, 5e-4);
        near(combined_uncertainty(part, &r), printed, 5e-4);
    }
    // The covariance of R and X by the same law: (u²(R + X) − u²(R) − u²(X)) / 2.
    let sum: Vec<f64> = parts[0].iter().zip(&parts[1]).map(|(a, b)| a + b).collect();
    let [ur, ux, us] = [&parts[0][..], &parts[1][..], &sum].map(|p| combined_uncertainty(p, &r));
    near((us * us - ur * ur - ux * ux) / (2.0 * ur * ux), -0.588, 5e-4);
}

/// H.3, the calibration line of a thermometer: y1 −0.1712 u 0.0029, y2 0.002 18 u 0.000 67, r −0.930, s 0.0035 °C; the
/// correction at 30 °C is −0.1494 u 0.0041 with the correlation (data and results from memory).
#[test]
fn calibration_line() {
    let t = [21.521, 22.012, 22.512, 23.003, 23.507, 23.999, 24.513, 25.002, 25.503, 26.010, 26.511];
    let b = [-0.171, -0.169, -0.166, -0.159, -0.164, -0.165, -0.156, -0.157, -0.159, -0.161, -0.160];
    let (n, t0) = (t.len() as f64, 20.0);
    let (mut st, mut stt, mut sb, mut stb) = (0.0, 0.0, 0.0, 0.0);
    for (t, b) in t.iter().zip(b) {
        let x = t - t0;
        st += x;
        stt += x * x;
        sb += b;
        stb += x * b;
    }
    let d = n * stt - st * st;
    let (y1, y2) = ((sb * stt - stb * st) / d, (n * stb - sb * st) / d);
    let mut squares = 0.0;
    for (t, b) in t.iter().zip(b) {
        let rest = b - (y1 + y2 * (t - t0));
        squares += rest * rest;
    }
    let s = (squares / (n - 2.0)).sqrt();
    let (u1, u2, r) = (s * (stt / d).sqrt(), s * (n / d).sqrt(), -st / (n * stt).sqrt());
    for (found, printed, within) in [
        (y1, -0.1712, 5e-5),
        (u1, 0.0029, 5e-5),
        (y2, 0.002_18, 5e-6),
        (u2, 0.000_67, 5e-6),
        (r, -0.930, 5e-4),
        (s, 0.0035, 5e-5),
    ] {
        near(found, printed, within);
    }
    near(y1 + 10.0 * y2, -0.1494, 5e-5);
    near(combined_uncertainty(&[u1, 10.0 * u2], &[(0, 1, r)]), 0.0041, 5e-5);
    // Without the correlation it would come out more than twice as large.
    assert!(combined_uncertainty(&[u1, 10.0 * u2], &[]) > 0.007);
}
