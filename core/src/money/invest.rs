//! An investment: what is paid at once, what it brings each year, and when that pays.

/// Money paid now for money saved later.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Investment {
    /// Paid at once; below zero where switching frees money at once.
    pub paid: f64,
    /// Saved at the end of each year; below zero where it costs more.
    pub saved_a_year: f64,
    /// How many years it is looked at for.
    pub years: u32,
    /// Come back at the end of the last year.
    pub residual: f64,
    /// The rate at which money of a year later counts less, 0.08 for 8 %.
    pub discount: f64,
}

/// When what was paid has come back.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Payback {
    /// Nothing is paid, or less than nothing; and where it is nothing, nothing is lost each year.
    AtOnce,
    /// After so many years.
    After(f64),
    /// Not within the years looked at: what it saves is too little.
    NotWithin(u32),
    /// Never: it saves nothing.
    Never,
}

/// The rate at which the present value is nothing.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Rate {
    /// A rate, 0.2 for 20 % a year.
    Of(f64),
    /// The money never comes back, at whatever rate.
    None,
    /// Nothing is paid, so there is no rate of return on it.
    NothingPaid,
}

/// Above this rate, 100,000 % a year, a rate says nothing.
const HIGHEST_RATE: f64 = 1000.0;

impl Investment {
    /// The present value at a rate: −I + Σ CF/(1 + r)^k + S/(1 + r)^n.
    #[must_use]
    pub fn value_at(&self, rate: f64) -> f64 {
        let mut value = -self.paid;
        let mut weight = 1.0;
        for _ in 0..self.years {
            weight /= 1.0 + rate;
            value += self.saved_a_year * weight;
        }
        value + self.residual * weight
    }

    /// The net present value.
    ///
    /// ```
    /// use thimbleworth::money::{Investment, Payback, Rate};
    /// // 60,000 that saves 15,000 a year for ten years at 8 % (recomputed)
    /// let case = Investment { paid: 60e3, saved_a_year: 15e3, years: 10, residual: 0.0, discount: 0.08 };
    /// assert!((case.net_present_value() - 40_651.22).abs() < 0.005);
    /// assert_eq!(case.simple_payback(), Payback::After(4.0));
    /// let Payback::After(years) = case.discounted_payback() else { panic!() };
    /// assert!((years - 5.0116).abs() < 5e-5);
    /// let Rate::Of(rate) = case.internal_rate() else { panic!() };
    /// assert!((rate - 0.214_06).abs() < 5e-6);
    /// ```
    #[must_use]
    pub fn net_present_value(&self) -> f64 {
        self.value_at(self.discount)
    }

    /// Money at the end of each year since the beginning, not discounted: what was paid, then year by year.
    #[must_use]
    pub fn cash_flow(&self) -> Vec<f64> {
        let mut sum = -self.paid;
        let mut out = vec![sum];
        for year in 1..=self.years {
            sum += self.saved_a_year;
            if year == self.years {
                sum += self.residual;
            }
            out.push(sum);
        }
        out
    }

    /// When it pays, without discounting: I/CF.
    #[must_use]
    pub fn simple_payback(&self) -> Payback {
        self.payback_at(0.0)
    }

    /// When it pays, later money counting less; within a year in proportion.
    #[must_use]
    pub fn discounted_payback(&self) -> Payback {
        self.payback_at(self.discount)
    }

    fn payback_at(&self, rate: f64) -> Payback {
        // What costs nothing at once and more each year never pays either.
        if self.paid < 0.0 || (self.paid == 0.0 && self.saved_a_year >= 0.0) {
            return Payback::AtOnce;
        }
        if self.saved_a_year <= 0.0 {
            return Payback::Never;
        }
        let (mut left, mut weight) = (self.paid, 1.0);
        for year in 0..self.years {
            weight /= 1.0 + rate;
            let comes = self.saved_a_year * weight;
            if comes >= left {
                return Payback::After(f64::from(year) + left / comes);
            }
            left -= comes;
        }
        Payback::NotWithin(self.years)
    }

    /// The internal rate of return, found by halving: the value falls with the rate.
    #[must_use]
    pub fn internal_rate(&self) -> Rate {
        if self.paid <= 0.0 {
            return Rate::NothingPaid;
        }
        let (mut low, mut high) = (-0.99, HIGHEST_RATE);
        if self.saved_a_year < 0.0 || self.residual < 0.0 || self.value_at(low) <= 0.0 {
            return Rate::None;
        }
        if self.value_at(high) > 0.0 {
            return Rate::Of(high);
        }
        for _ in 0..200 {
            let middle = 0.5 * (low + high);
            if self.value_at(middle) > 0.0 {
                low = middle;
            } else {
                high = middle;
            }
        }
        Rate::Of(0.5 * (low + high))
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    const CASE: Investment =
        Investment { paid: 60e3, saved_a_year: 15e3, years: 10, residual: 0.0, discount: 0.08 };

    /// Second way: the closed form of an annuity, I = CF (1 − (1 + r)^−n)/r, and the rate that makes it nothing.
    #[test]
    fn an_annuity_has_a_closed_form() {
        let annuity = 15e3 * (1.0 - libm::pow(1.08, -10.0)) / 0.08;
        assert!((CASE.net_present_value() - (annuity - 60e3)).abs() < 1e-7);
        let Rate::Of(rate) = CASE.internal_rate() else { panic!() };
        assert!(CASE.value_at(rate).abs() < 1e-6);
        // One year: the rate is what comes back over what was paid, less one.
        let year = Investment { paid: 100.0, saved_a_year: 90.0, years: 1, residual: 30.0, discount: 0.1 };
        let Rate::Of(rate) = year.internal_rate() else { panic!() };
        assert!((rate - 0.2).abs() < 1e-12);
        assert!((year.net_present_value() - (120.0 / 1.1 - 100.0)).abs() < 1e-12);
        assert_eq!(year.simple_payback(), Payback::NotWithin(1));
        assert_eq!(year.cash_flow(), [-100.0, 20.0]);
    }

    #[test]
    fn money_that_never_comes_back_is_said() {
        for saved_a_year in [0.0, -5.0] {
            let none = Investment { saved_a_year, ..CASE };
            assert_eq!((none.simple_payback(), none.discounted_payback()), (Payback::Never, Payback::Never));
            assert_eq!(none.internal_rate(), Rate::None);
            assert!(none.net_present_value() <= -60e3);
        }
        let slow = Investment { saved_a_year: 6.5e3, ..CASE };
        let Payback::After(years) = slow.simple_payback() else { panic!() };
        assert!((years - 60.0 / 6.5).abs() < 1e-12);
        assert_eq!(slow.discounted_payback(), Payback::NotWithin(10));
        let free = Investment { paid: 0.0, ..CASE };
        assert_eq!((free.simple_payback(), free.internal_rate()), (Payback::AtOnce, Rate::NothingPaid));
        let dearer = Investment { paid: 0.0, saved_a_year: -1.0, ..CASE };
        assert_eq!((dearer.simple_payback(), dearer.discounted_payback()), (Payback::Never, Payback::Never));
        let lossy = Investment { saved_a_year: 1e3, ..CASE };
        let Rate::Of(rate) = lossy.internal_rate() else { panic!() };
        assert!(rate < 0.0 && lossy.value_at(rate).abs() < 1e-6);
    }
}
