//! Numbers in scenario files: finite when read, and written so that unit conversion never shows.

use serde::de::{Deserialize, Deserializer, Error};

/// A number of a file, in the file's unit; finite.
#[derive(Clone, Copy, Debug, Default)]
pub(super) struct Num(f64);

impl Num {
    /// As it stands: the file's unit is SI.
    pub fn si(self) -> f64 {
        self.0
    }

    /// Millimetres to m.
    pub fn mm(self) -> f64 {
        self.0 / 1e3
    }

    /// kPa to Pa.
    pub fn kpa(self) -> f64 {
        self.0 * 1e3
    }

    /// MPa to Pa.
    pub fn mpa(self) -> f64 {
        self.0 * 1e6
    }

    /// GPa to Pa.
    pub fn gpa(self) -> f64 {
        self.0 * 1e9
    }

    /// Percent to a share.
    pub fn percent(self) -> f64 {
        self.0 / 100.0
    }

    /// Degrees to radians.
    pub fn deg(self) -> f64 {
        self.0 * RAD_PER_DEG
    }
}

impl<'de> Deserialize<'de> for Num {
    fn deserialize<D: Deserializer<'de>>(deserializer: D) -> Result<Num, D::Error> {
        let value = f64::deserialize(deserializer)?;
        if value.is_finite() {
            Ok(Num(value))
        } else {
            Err(D::Error::custom("the number is not finite\nwrite a plain number, such as 1250 or 2.5e3"))
        }
    }
}

/// A count of a file. Read as a number, so that 2.5 is called no whole number rather than a missing comma.
#[derive(Clone, Copy, Debug)]
pub(super) struct Count(pub u32);

impl<'de> Deserialize<'de> for Count {
    fn deserialize<D: Deserializer<'de>>(deserializer: D) -> Result<Count, D::Error> {
        let value = f64::deserialize(deserializer)?;
        if value.fract() == 0.0 && (0.0..=f64::from(u32::MAX)).contains(&value) {
            Ok(Count(value as u32))
        } else {
            Err(D::Error::custom("this is no count\nwrite a whole number of zero or more"))
        }
    }
}

/// One factor for both ways, so that a degree comes back as it went.
const RAD_PER_DEG: f64 = std::f64::consts::PI / 180.0;

/// A value in m, written in mm.
pub(super) fn mm(m: f64) -> String {
    number(m * 1e3)
}

/// A value in Pa, written in kPa.
pub(super) fn kpa(pa: f64) -> String {
    number(pa / 1e3)
}

/// A value in Pa, written in MPa.
pub(super) fn mpa(pa: f64) -> String {
    number(pa / 1e6)
}

/// A value in Pa, written in GPa.
pub(super) fn gpa(pa: f64) -> String {
    number(pa / 1e9)
}

/// A share, written in percent.
pub(super) fn percent(share: f64) -> String {
    number(share * 100.0)
}

/// A value in radians, written in degrees.
pub(super) fn deg(rad: f64) -> String {
    number(rad / RAD_PER_DEG)
}

/// The shortest text of `value` rounded to 15 significant digits. Converting to a file's unit and back costs at
/// most three roundings of 1.1e-16 each, less than half a unit of the fifteenth digit (5e-16), so the text is stable.
pub(super) fn number(value: f64) -> String {
    let rounded: f64 = format!("{value:.14e}").parse().unwrap_or(value);
    // Adding zero turns -0 into 0.
    let text = format!("{:?}", rounded + 0.0);
    text.strip_suffix(".0").map_or(text.clone(), str::to_owned)
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn conversion_noise_never_shows() {
        for (got, want) in [
            (mm(0.1), "100"),
            (mm(0.1 + 0.2), "300"),
            (mm(-0.0), "0"),
            (mm(1.0 / 3.0), "333.333333333333"),
            (kpa(101_325.0), "101.325"),
            (mpa(235e6), "235"),
            (gpa(1.4e9), "1.4"),
            (percent(0.55), "55"),
            (percent(0.07), "7"),
            (deg(std::f64::consts::FRAC_PI_3), "60"),
            (deg(-std::f64::consts::PI), "-180"),
            (number(9.80665), "9.80665"),
            (number(1e21), "1e21"),
            (number(2.5e-9), "2.5e-9"),
        ] {
            assert_eq!(got, want);
        }
    }

    #[test]
    fn fifteen_digits_survive_every_conversion() {
        // Digits just under a power of ten have the coarsest relative spacing: the hardest for rounding.
        let mut digits = 999_999_999_999_999_u64;
        for i in 0..20_000_u64 {
            digits -= 1 + (i * i) % 40_009;
            for exponent in [-18, -13, -11, -9, 0] {
                let text = number(format!("{digits}e{exponent}").parse().unwrap());
                let read = Num(text.parse().unwrap());
                let again = [
                    mm(read.mm()),
                    kpa(read.kpa()),
                    mpa(read.mpa()),
                    gpa(read.gpa()),
                    percent(read.percent()),
                    deg(read.deg()),
                    number(read.si()),
                ];
                assert!(again.iter().all(|a| *a == text), "{text} came back as {again:?}");
            }
        }
    }
}
