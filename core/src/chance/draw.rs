//! Numbers from nothing but a key and a count.

/// Bits of draw number `draw` of the input with this key: a SplitMix64 finaliser over a counter (Steele, Lea and
/// Flood, OOPSLA 2014; constants from memory, distribution tested).
#[inline]
#[must_use]
pub fn keyed_bits(key: u64, draw: u64) -> u64 {
    let mut z = key.wrapping_add(draw.wrapping_add(1).wrapping_mul(0x9E37_79B9_7F4A_7C15));
    z = (z ^ (z >> 30)).wrapping_mul(0xBF58_476D_1CE4_E5B9);
    z = (z ^ (z >> 27)).wrapping_mul(0x94D0_49BB_1331_11EB);
    z ^ (z >> 31)
}

/// The middle of one of 2⁵² equal cells of the open interval (0, 1).
#[inline]
#[must_use]
#[expect(clippy::cast_precision_loss, reason = "52 bits fit")]
pub fn unit_interval(bits: u64) -> f64 {
    ((bits >> 12) as f64 + 0.5) * (1.0 / 4_503_599_627_370_496.0)
}

/// The quantile of the standard normal distribution at `p` in (0, 1), to about 1e-16 relative (Wichura 1988, Applied
/// Statistics 37, 477, algorithm AS 241, PPND16; coefficients from memory, tested against Φ(x) = erfc(−x/√2)/2).
///
/// ```
/// // Φ⁻¹(0.975) = 1.959963984540054 (JCGM 101:2008 uses 1.96)
/// assert!((thimbleworth::chance::normal_quantile(0.975) - 1.959963984540054).abs() < 1e-15);
/// ```
#[must_use]
pub fn normal_quantile(p: f64) -> f64 {
    const A: [f64; 8] = [
        3.387_132_872_796_366_5,
        133.141_667_891_784_38,
        1_971.590_950_306_551_3,
        13_731.693_765_509_46,
        45_921.953_931_549_87,
        67_265.770_927_008_7,
        33_430.575_583_588_13,
        2_509.080_928_730_122_7,
    ];
    const B: [f64; 8] = [
        1.0,
        42.313_330_701_600_91,
        687.187_007_492_057_9,
        5_394.196_021_424_751,
        21_213.794_301_586_597,
        39_307.895_800_092_71,
        28_729.085_735_721_943,
        5_226.495_278_852_854,
    ];
    const C: [f64; 8] = [
        1.423_437_110_749_683_5,
        4.630_337_846_156_546,
        5.769_497_221_460_691,
        3.647_848_324_763_204_5,
        1.270_458_252_452_368_4,
        0.241_780_725_177_450_6,
        0.022_723_844_989_269_184,
        7.745_450_142_783_414e-4,
    ];
    const D: [f64; 8] = [
        1.0,
        2.053_191_626_637_759,
        1.676_384_830_183_803_8,
        0.689_767_334_985_1,
        0.148_103_976_427_480_08,
        0.015_198_666_563_616_457,
        5.475_938_084_995_345e-4,
        1.050_750_071_644_416_9e-9,
    ];
    const E: [f64; 8] = [
        6.657_904_643_501_103,
        5.463_784_911_164_114,
        1.784_826_539_917_291_3,
        0.296_560_571_828_504_87,
        0.026_532_189_526_576_124,
        0.001_242_660_947_388_078_4,
        2.711_555_568_743_487_6e-5,
        2.010_334_399_292_288_1e-7,
    ];
    const F: [f64; 8] = [
        1.0,
        0.599_832_206_555_888,
        0.136_929_880_922_735_8,
        0.014_875_361_290_850_615,
        7.868_691_311_456_133e-4,
        1.846_318_317_510_054_8e-5,
        1.421_511_758_316_446e-7,
        2.044_263_103_389_939_8e-15,
    ];
    let q = p - 0.5;
    if q.abs() <= 0.425 {
        let r = 0.180_625 - q * q;
        return q * horner(&A, r) / horner(&B, r);
    }
    let tail = if q < 0.0 { p } else { 1.0 - p };
    let r = (-libm::log(tail)).sqrt();
    let x = if r <= 5.0 {
        horner(&C, r - 1.6) / horner(&D, r - 1.6)
    } else {
        horner(&E, r - 5.0) / horner(&F, r - 5.0)
    };
    if q < 0.0 { -x } else { x }
}

fn horner(c: &[f64; 8], x: f64) -> f64 {
    let mut sum = 0.0;
    for k in c.iter().rev() {
        sum = sum * x + k;
    }
    sum
}

#[cfg(test)]
mod tests {
    use super::*;

    /// Second way: Φ(Φ⁻¹(p)) = p with Φ(x) = erfc(−x/√2)/2 from `libm`.
    #[test]
    fn the_normal_quantile_inverts_the_error_function() {
        for i in 1..4000_u32 {
            let p = f64::from(i) / 4000.0;
            let x = normal_quantile(p);
            let back = 0.5 * libm::erfc(-x / core::f64::consts::SQRT_2);
            assert!((back - p).abs() < 4e-16 * (1.0 + p.recip()), "{p} {back}");
        }
        for e in 2..300 {
            let p = libm::pow(10.0, -f64::from(e));
            let back = 0.5 * libm::erfc(-normal_quantile(p) / core::f64::consts::SQRT_2);
            assert!((back / p - 1.0).abs() < 1e-11, "{p:e} {back:e}");
        }
    }

    /// The mean of n uniform numbers is 1/2 within 5/√(12 n), and sixteen equal classes hold n/16 each (χ², 15 degrees
    /// of freedom: 37.7 at 0.1 %, from memory).
    #[test]
    fn keyed_numbers_are_even() {
        for key in [0, 1, 2, u64::MAX, 0xABCD] {
            let n = 100_000_u32;
            let (mut sum, mut classes) = (0.0, [0_u32; 16]);
            for i in 0..n {
                let u = unit_interval(keyed_bits(key, u64::from(i)));
                sum += u;
                classes[(u * 16.0) as usize] += 1;
            }
            assert!((sum / f64::from(n) - 0.5).abs() < 5.0 / (12.0 * f64::from(n)).sqrt());
            let expected = f64::from(n) / 16.0;
            let mut chi = 0.0;
            for c in classes {
                chi += (f64::from(c) - expected) * (f64::from(c) - expected) / expected;
            }
            assert!(chi < 37.7, "{key} {chi}");
        }
    }
}
