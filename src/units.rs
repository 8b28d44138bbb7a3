//! Quantities, their units and how a number is shown. SI inside; the unit system only changes what is shown.

use std::fmt::Write as _;

/// Standard gravity, m/s2. Source: BIPM, 3rd CGPM (1901).
pub const STANDARD_GRAVITY_M_PER_S2: f64 = 9.80665;

/// Standard atmosphere, Pa. Source: BIPM, 10th CGPM (1954), resolution 4.
pub const STANDARD_ATMOSPHERE_PA: f64 = 101_325.0;

/// What kind of thing a number measures. Gage and absolute pressure are different quantities.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
pub enum Quantity {
    /// A length on the section: mm, in.
    Length,
    /// A length along a ruler or a wall: m, ft.
    Distance,
    /// m2, ft2.
    Area,
    /// m3, US gal.
    Volume,
    /// m/s2, ft/s2.
    Acceleration,
    /// Radians inside, degrees shown.
    Angle,
    /// Pressure above the outside air: kPa, psi.
    GagePressure,
    /// Pressure above vacuum: kPa, psi.
    AbsolutePressure,
    /// kN, lbf.
    Force,
    /// kN m, lbf ft.
    Moment,
    /// kg/m3, lb/ft3.
    Density,
    /// kg, lb.
    Mass,
    /// mN/m in both systems.
    SurfaceTension,
    /// s in both systems.
    Time,
    /// A share of a whole, shown in percent.
    Share,
    /// A plain number.
    Ratio,
    /// How many.
    Count,
    /// Force per length of an edge or a weld: kN/m, lbf/ft.
    ForcePerLength,
    /// Moment per length: kN m/m, lbf ft/ft.
    MomentPerLength,
    /// Stress in a plate: MPa, ksi.
    Stress,
    /// Volume flow: L/s, gal/min.
    Flow,
}

/// Which units are shown. The file keeps its own.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq, Hash, serde::Serialize, serde::Deserialize)]
pub enum UnitSystem {
    /// International System.
    #[default]
    Si,
    /// US customary units.
    UsCustomary,
}

/// A unit: its symbol and how many SI units it is.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Unit {
    /// As shown beside a number.
    pub symbol: &'static str,
    /// One of this unit in SI units.
    pub in_si: f64,
}

impl Unit {
    /// A value in SI units, expressed in this unit.
    pub fn from_si(self, si: f64) -> f64 {
        si / self.in_si
    }

    /// A value in this unit, expressed in SI units.
    pub fn to_si(self, value: f64) -> f64 {
        value * self.in_si
    }
}

const INCH: f64 = 0.0254;
const FOOT: f64 = 0.3048;
const POUND: f64 = 0.453_592_37;
const POUND_FORCE: f64 = POUND * STANDARD_GRAVITY_M_PER_S2;

impl Quantity {
    /// The unit in which this quantity is shown.
    ///
    /// Source: NIST SP 811 (2008), appendix B.8, for the US customary factors (value from memory, exact by
    /// definition of the international foot, the avoirdupois pound and the US gallon of 231 cubic inches).
    pub fn unit(self, system: UnitSystem) -> Unit {
        use Quantity::*;
        let (si, us) = match self {
            Length => (("mm", 1e-3), ("in", INCH)),
            Distance => (("m", 1.0), ("ft", FOOT)),
            Area => (("m²", 1.0), ("ft²", FOOT * FOOT)),
            Volume => (("m³", 1.0), ("gal", 231.0 * INCH * INCH * INCH)),
            Acceleration => (("m/s²", 1.0), ("ft/s²", FOOT)),
            Angle => (("°", std::f64::consts::PI / 180.0), ("°", std::f64::consts::PI / 180.0)),
            GagePressure => (("kPa", 1e3), ("psi", POUND_FORCE / (INCH * INCH))),
            AbsolutePressure => (("kPa abs", 1e3), ("psia", POUND_FORCE / (INCH * INCH))),
            Force => (("kN", 1e3), ("lbf", POUND_FORCE)),
            Moment => (("kN m", 1e3), ("lbf ft", POUND_FORCE * FOOT)),
            Density => (("kg/m³", 1.0), ("lb/ft³", POUND / (FOOT * FOOT * FOOT))),
            Mass => (("kg", 1.0), ("lb", POUND)),
            SurfaceTension => (("mN/m", 1e-3), ("mN/m", 1e-3)),
            Time => (("s", 1.0), ("s", 1.0)),
            Share => (("%", 0.01), ("%", 0.01)),
            Ratio | Count => (("", 1.0), ("", 1.0)),
            ForcePerLength => (("kN/m", 1e3), ("lbf/ft", POUND_FORCE / FOOT)),
            MomentPerLength => (("kN m/m", 1e3), ("lbf ft/ft", POUND_FORCE)),
            Stress => (("MPa", 1e6), ("ksi", 1e3 * POUND_FORCE / (INCH * INCH))),
            Flow => (("L/s", 1e-3), ("gal/min", 231.0 * INCH * INCH * INCH / 60.0)),
        };
        let (symbol, in_si) = if system == UnitSystem::Si { si } else { us };
        Unit { symbol, in_si }
    }

    /// The unit for one value alone: a smaller one where an SI value would read as a row of zeros.
    pub fn unit_near(self, system: UnitSystem, si: f64) -> Unit {
        use Quantity::*;
        let smaller: &[(&str, f64)] = match (system, self) {
            (UnitSystem::UsCustomary, _) => &[],
            (_, Volume) => &[("L", 1e-3), ("mL", 1e-6)],
            (_, Mass) => &[("g", 1e-3), ("mg", 1e-6)],
            (_, Force) => &[("N", 1.0), ("mN", 1e-3)],
            (_, Moment) => &[("N m", 1.0), ("mN m", 1e-3)],
            (_, GagePressure) => &[("Pa", 1.0)],
            (_, ForcePerLength) => &[("N/m", 1.0)],
            (_, MomentPerLength) => &[("N m/m", 1.0)],
            _ => &[],
        };
        let usual = self.unit(system);
        // A hundredth of a unit still reads well in it.
        let fits = |unit: &Unit| si == 0.0 || si.abs() >= 0.01 * unit.in_si;
        let units = smaller.iter().map(|&(symbol, in_si)| Unit { symbol, in_si });
        let mut all = std::iter::once(usual).chain(units);
        all.find(fits).or(smaller.last().map(|&(symbol, in_si)| Unit { symbol, in_si })).unwrap_or(usual)
    }

    /// The symbol of the coherent SI unit, as the JSON uses it.
    pub fn si_symbol(self) -> &'static str {
        use Quantity::*;
        match self {
            Length | Distance => "m",
            Area => "m2",
            Volume => "m3",
            Acceleration => "m/s2",
            Angle => "rad",
            GagePressure => "Pa gage",
            AbsolutePressure => "Pa abs",
            Force => "N",
            Moment => "N m",
            Density => "kg/m3",
            Mass => "kg",
            SurfaceTension => "N/m",
            Time => "s",
            ForcePerLength => "N/m",
            MomentPerLength => "N m/m",
            Stress => "Pa",
            Flow => "m3/s",
            Share | Ratio | Count => "1",
        }
    }
}

/// A number with its quantity; the value is in SI units.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Measure {
    /// What it measures.
    pub quantity: Quantity,
    /// How much, in SI units.
    pub si: f64,
}

impl Measure {
    /// A measure from a value in SI units.
    pub fn new(quantity: Quantity, si: f64) -> Measure {
        Measure { quantity, si }
    }

    /// The number alone, rounded to `significant` figures, in the shown unit.
    pub fn number(self, system: UnitSystem, significant: usize) -> String {
        number(self.quantity.unit(system).from_si(self.si), significant)
    }

    /// Number and unit, rounded to three significant figures.
    pub fn text(self, system: UnitSystem) -> String {
        self.text_to(system, 3)
    }

    /// Number and unit, rounded to `significant` figures; SI values far below the usual unit take a smaller one.
    pub fn text_to(self, system: UnitSystem, significant: usize) -> String {
        let near = self.quantity.unit_near(system, self.si);
        // What even the smallest unit shows as a row of zeros is the rounding of a sum.
        let si = if self.si.abs() < 1e-4 * near.in_si { 0.0 } else { self.si };
        let unit = self.quantity.unit_near(system, si);
        let significant = if self.quantity == Quantity::Count { 1 } else { significant };
        let number = number(unit.from_si(si), significant);
        match unit.symbol {
            "" => number,
            "°" => format!("{number}°"),
            symbol => format!("{number} {symbol}"),
        }
    }
}

/// Words with measures in them, so that units can be switched after they are written. `{}` marks a measure.
#[derive(Clone, Debug, PartialEq)]
pub struct Phrase {
    words: String,
    measures: Vec<Measure>,
}

impl Phrase {
    /// One measure a `{}`, in order.
    pub fn new(words: impl Into<String>, measures: impl Into<Vec<Measure>>) -> Phrase {
        Phrase { words: words.into(), measures: measures.into() }
    }

    /// In the units of a system.
    pub fn text(&self, system: UnitSystem) -> String {
        let mut measures = self.measures.iter();
        let mut out = String::new();
        for (i, part) in self.words.split("{}").enumerate() {
            if i > 0 {
                out.push_str(&measures.next().map_or_else(String::new, |m| m.text(system)));
            }
            out.push_str(part);
        }
        out
    }
}

impl From<&str> for Phrase {
    fn from(words: &str) -> Phrase {
        Phrase::new(words, [])
    }
}

/// A number for reading: `significant` figures, never fewer digits than the whole part has, thin spaces
/// between thousands, a true minus, no `-0`. `–` where the number is not finite.
pub fn number(value: f64, significant: usize) -> String {
    if !value.is_finite() {
        return "–".to_owned();
    }
    let magnitude = value.abs();
    // What nine decimals cannot show is a rounding residue, and reads as zero.
    let decimals = if magnitude < 0.5e-9 {
        significant.saturating_sub(1)
    } else {
        let rounded_exponent = format!("{:.*e}", significant.saturating_sub(1), magnitude)
            .rsplit_once('e')
            .and_then(|(_, e)| e.parse::<i32>().ok())
            .unwrap_or(0);
        (significant as i32 - 1 - rounded_exponent).clamp(0, 9) as usize
    };
    fixed(value, decimals)
}

/// A number with a fixed count of decimals, thin spaces between thousands and a true minus.
pub fn fixed(value: f64, decimals: usize) -> String {
    let plain = format!("{:.*}", decimals, value.abs());
    let (whole, fraction) = plain.split_once('.').unwrap_or((&plain, ""));
    let mut out = String::with_capacity(plain.len() + 4);
    if value < 0.0 && plain.bytes().any(|b| (b'1'..=b'9').contains(&b)) {
        out.push('\u{2212}');
    }
    for (i, digit) in whole.chars().enumerate() {
        if i > 0 && (whole.len() - i).is_multiple_of(3) && whole.len() > 3 {
            out.push('\u{2009}');
        }
        out.push(digit);
    }
    if !fraction.is_empty() {
        let _ = write!(out, ".{fraction}");
    }
    out
}

/// A utilisation for reading: two decimals, at least `1.01` when above one, so that `1.00` never hides a
/// failure; `over 99` beyond that; `–` where there is none.
pub fn utilisation_text(utilisation: Option<f64>) -> String {
    match utilisation {
        None => "–".to_owned(),
        Some(u) if u > 99.0 => "over 99".to_owned(),
        Some(u) if u > 1.0 => fixed(u.max(1.01), 2),
        Some(u) => fixed(u.min(1.0), 2),
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn numbers_are_rounded_spaced_and_signed() {
        for (value, significant, want) in [
            (1325.4, 4, "1\u{2009}325"),
            (0.0, 3, "0.00"),
            (-3.923, 3, "\u{2212}3.92"),
            (-0.0001, 1, "\u{2212}0.0001"),
            (9.999, 3, "10.0"),
            (12345.6, 3, "12\u{2009}346"),
            (f64::NAN, 3, "–"),
        ] {
            assert_eq!(number(value, significant), want, "number({value}, {significant})");
        }
        assert_eq!(fixed(-0.001, 2), "0.00", "no minus zero");
    }

    #[test]
    fn a_failure_never_reads_one() {
        assert_eq!(utilisation_text(Some(1.0001)), "1.01");
        assert_eq!(utilisation_text(Some(0.9999)), "1.00");
        assert_eq!(utilisation_text(None), "–");
    }

    #[test]
    fn small_values_take_small_units() {
        let text = |quantity, si| Measure::new(quantity, si).text(UnitSystem::Si);
        assert_eq!(text(Quantity::Volume, 6.8e-8), "0.0680 mL");
        assert_eq!(text(Quantity::Volume, 11.17), "11.2 m³");
        assert_eq!(text(Quantity::Force, 0.00067), "0.670 mN");
        assert_eq!(text(Quantity::Moment, 0.0), "0.00 kN m");
        assert_eq!(text(Quantity::Moment, -3e-12), "0.00 kN m");
        assert_eq!(text(Quantity::GagePressure, 2.5), "2.50 Pa");
        assert_eq!((text(Quantity::Count, 0.0), text(Quantity::Count, 12.0)), ("0".into(), "12".into()));
    }

    #[test]
    fn a_phrase_follows_the_units() {
        let phrase = Phrase::new("or brim {} higher", [Measure::new(Quantity::Length, 0.0381)]);
        assert_eq!(phrase.text(UnitSystem::Si), "or brim 38.1 mm higher");
        assert_eq!(phrase.text(UnitSystem::UsCustomary), "or brim 1.50 in higher");
    }

    #[test]
    fn us_units_agree_with_their_definitions() {
        // Source: NIST SP 811 (2008) appendix B.8: 1 gal = 3.785412e-3 m3, 1 psi = 6894.757 Pa (values from memory).
        let us = UnitSystem::UsCustomary;
        assert!((Quantity::Volume.unit(us).in_si - 3.785_412e-3).abs() < 1e-9);
        assert!((Quantity::GagePressure.unit(us).in_si - 6894.757).abs() < 1e-3);
    }
}
