//! Money: exact decimals, rounded to minor units only where a line is printed.

use std::fmt;
use std::iter::Sum;
use std::ops::{Add, AddAssign, Sub};

use rust_decimal::{Decimal, RoundingStrategy};

/// An ISO 4217 currency code such as EUR.
#[derive(Clone, Debug, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub struct Currency {
    code: String,
}

impl Currency {
    /// Three capital letters, or `None`.
    pub fn new(code: &str) -> Option<Self> {
        let legal = code.len() == 3 && code.bytes().all(|b| b.is_ascii_uppercase());
        legal.then(|| Self { code: code.to_owned() })
    }

    /// The three letters.
    pub fn code(&self) -> &str {
        &self.code
    }

    /// How many decimals its minor unit has (ISO 4217: none for JPY, KRW and the like, three for a few, else two).
    pub fn decimals(&self) -> u32 {
        match self.code.as_str() {
            "JPY" | "KRW" | "CLP" | "ISK" | "VND" | "XAF" | "XOF" | "XPF" | "PYG" | "UGX" | "RWF" => 0,
            "KWD" | "BHD" | "OMR" | "JOD" | "TND" | "IQD" | "LYD" => 3,
            _ => 2,
        }
    }
}

impl fmt::Display for Currency {
    fn fmt(&self, out: &mut fmt::Formatter<'_>) -> fmt::Result {
        out.write_str(&self.code)
    }
}

/// An amount of money in the project's currency.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq, PartialOrd, Ord)]
pub struct Money {
    amount: Decimal,
}

impl Money {
    /// Nothing.
    pub const ZERO: Self = Self { amount: Decimal::ZERO };

    /// An exact amount.
    pub const fn new(amount: Decimal) -> Self {
        Self { amount }
    }

    /// The exact amount.
    pub const fn amount(self) -> Decimal {
        self.amount
    }

    /// Rounded to the currency's minor unit, half away from zero, and padded to its decimals.
    #[must_use]
    pub fn rounded(self, currency: &Currency) -> Self {
        let places = currency.decimals();
        let mut amount = self.amount.round_dp_with_strategy(places, RoundingStrategy::MidpointAwayFromZero);
        amount.rescale(places);
        Self { amount }
    }

    /// This amount times an exact ratio, not rounded.
    #[must_use]
    pub fn times(self, ratio: Decimal) -> Self {
        Self { amount: self.amount * ratio }
    }
}

impl Add for Money {
    type Output = Self;
    fn add(self, other: Self) -> Self {
        Self { amount: self.amount + other.amount }
    }
}

impl AddAssign for Money {
    fn add_assign(&mut self, other: Self) {
        self.amount += other.amount;
    }
}

impl Sub for Money {
    type Output = Self;
    fn sub(self, other: Self) -> Self {
        Self { amount: self.amount - other.amount }
    }
}

impl Sum for Money {
    fn sum<I: Iterator<Item = Self>>(items: I) -> Self {
        items.fold(Self::ZERO, Add::add)
    }
}

impl fmt::Display for Money {
    fn fmt(&self, out: &mut fmt::Formatter<'_>) -> fmt::Result {
        write!(out, "{}", self.amount)
    }
}
