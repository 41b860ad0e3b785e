//! Which dimensions exist, and the units they are written in.

use super::spelling;

/// What a number measures. The base unit is the SI one, but for areas (mm², which the core keeps) and absolute
/// temperatures (°C).
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash)]
pub enum Dimension {
    /// Electric potential, V.
    Voltage,
    /// Electric current, A.
    Current,
    /// Resistance, Ω.
    Resistance,
    /// Electric charge, C.
    Charge,
    /// Capacitance, F.
    Capacitance,
    /// Inductance, H.
    Inductance,
    /// Frequency, Hz.
    Frequency,
    /// Time, s.
    Time,
    /// Power, W.
    Power,
    /// Absolute temperature, °C.
    Temperature,
    /// Temperature difference, K.
    TemperatureDifference,
    /// Thermal resistance, K/W.
    ThermalResistance,
    /// Change of a voltage with temperature, V/K.
    VoltageSlope,
    /// Length, m.
    Length,
    /// Area, mm².
    Area,
    /// A share, ratio or efficiency, without a unit or in %.
    Ratio,
    /// A plain number: money, an exponent, a count.
    Plain,
}

impl Dimension {
    /// Every dimension.
    pub const ALL: [Self; 17] = [
        Self::Voltage,
        Self::Current,
        Self::Resistance,
        Self::Charge,
        Self::Capacitance,
        Self::Inductance,
        Self::Frequency,
        Self::Time,
        Self::Power,
        Self::Temperature,
        Self::TemperatureDifference,
        Self::ThermalResistance,
        Self::VoltageSlope,
        Self::Length,
        Self::Area,
        Self::Ratio,
        Self::Plain,
    ];

    /// The name in words, for messages: `resistance`.
    pub const fn name(self) -> &'static str {
        match self {
            Self::Voltage => "voltage",
            Self::Current => "current",
            Self::Resistance => "resistance",
            Self::Charge => "charge",
            Self::Capacitance => "capacitance",
            Self::Inductance => "inductance",
            Self::Frequency => "frequency",
            Self::Time => "time",
            Self::Power => "power",
            Self::Temperature => "temperature",
            Self::TemperatureDifference => "temperature difference",
            Self::ThermalResistance => "thermal resistance",
            Self::VoltageSlope => "voltage per temperature",
            Self::Length => "length",
            Self::Area => "area",
            Self::Ratio => "ratio",
            Self::Plain => "plain number",
        }
    }

    /// The unit of parsed numbers; empty for ratios and plain numbers.
    pub const fn base_unit(self) -> &'static str {
        match self {
            Self::Voltage => "V",
            Self::Current => "A",
            Self::Resistance => "Ω",
            Self::Charge => "C",
            Self::Capacitance => "F",
            Self::Inductance => "H",
            Self::Frequency => "Hz",
            Self::Time => "s",
            Self::Power => "W",
            Self::Temperature => "°C",
            Self::TemperatureDifference => "K",
            Self::ThermalResistance => "K/W",
            Self::VoltageSlope => "V/K",
            Self::Length => "m",
            Self::Area => "mm²",
            Self::Ratio | Self::Plain => "",
        }
    }

    /// Units in which numbers of this dimension are usually written, for messages.
    pub const fn usual_units(self) -> &'static str {
        match self {
            Self::Voltage => "V or mV",
            Self::Current => "A, mA or µA",
            Self::Resistance => "Ω, mΩ or kΩ",
            Self::Charge => "nC or pC",
            Self::Capacitance => "µF, nF or pF",
            Self::Inductance => "µH or nH",
            Self::Frequency => "kHz or MHz",
            Self::Time => "ns, µs or ms",
            Self::Power => "W or mW",
            Self::Temperature => "°C",
            Self::TemperatureDifference => "K or °C",
            Self::ThermalResistance => "K/W or °C/W",
            Self::VoltageSlope => "mV/K or V/K",
            Self::Length => "mm, cm or m",
            Self::Area => "mm², cm² or m²",
            Self::Ratio => "% or no unit",
            Self::Plain => "no unit",
        }
    }

    /// Whether its numbers are complete without a unit.
    pub const fn is_dimensionless(self) -> bool {
        matches!(self, Self::Ratio | Self::Plain)
    }
}

/// One spelling of a unit with its prefix: how many powers of ten lie between it and the base unit.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct Unit {
    /// What it measures.
    pub dimension: Dimension,
    /// Value in base units = number × 10^`exponent`.
    pub exponent: i32,
}

/// Why a text is not a unit of the wanted dimension.
#[derive(Debug, Clone, PartialEq, Eq, thiserror::Error)]
pub enum UnitFault {
    /// It is a unit of another dimension.
    #[error("`{text}` is a unit of {}, {}", .is.name(), not_of(*.wanted))]
    WrongDimension {
        /// The text.
        text: String,
        /// What it measures.
        is: Dimension,
        /// What was wanted.
        wanted: Dimension,
    },
    /// It is no unit at all.
    #[error("`{text}` is {}", no_unit_of(*.wanted))]
    Unknown {
        /// The text.
        text: String,
        /// What was wanted.
        wanted: Dimension,
        /// Known spellings that differ in upper and lower case only.
        near: Vec<String>,
    },
}

fn not_of(wanted: Dimension) -> String {
    match wanted {
        Dimension::Plain => "and the number takes none".to_owned(),
        other => format!("not of {}", other.name()),
    }
}

fn no_unit_of(wanted: Dimension) -> String {
    match wanted {
        Dimension::Plain => "out of place behind a number that takes no unit".to_owned(),
        other => format!("not a unit of {}", other.name()),
    }
}

impl UnitFault {
    /// What was expected instead.
    pub fn expected(&self) -> String {
        let (Self::WrongDimension { wanted, .. } | Self::Unknown { wanted, .. }) = self;
        if wanted.is_dimensionless() {
            return format!("a number with {}", wanted.usual_units());
        }
        format!("a unit of {}: {}", wanted.name(), wanted.usual_units())
    }

    /// What to do about it.
    pub fn help(&self) -> Option<String> {
        match self {
            Self::WrongDimension { is: Dimension::TemperatureDifference, wanted: Dimension::Temperature, .. } => {
                Some("write absolute temperatures in °C".to_owned())
            }
            Self::WrongDimension { .. } => None,
            Self::Unknown { near, .. } => match near.as_slice() {
                [] => None,
                [one] => {
                    Some(format!("did you mean `{one}`? Upper and lower case differ in units: m is milli, M is mega"))
                }
                many => {
                    let many: Vec<_> = many.iter().map(|spelling| format!("`{spelling}`")).collect();
                    Some(format!("did you mean {}? m is milli, M is mega", many.join(" or ")))
                }
            },
        }
    }
}

impl Unit {
    /// The unit in which parsed numbers of `dimension` are kept.
    pub const fn base(dimension: Dimension) -> Self {
        Self { dimension, exponent: 0 }
    }

    /// The unit of `dimension` that `text` spells, with or without a prefix; blanks around it are ignored, its case is not.
    ///
    /// # Errors
    /// When `text` is a unit of another dimension, or none.
    pub fn parse(text: &str, dimension: Dimension) -> Result<Self, UnitFault> {
        let text = text.trim();
        if let Some(exponent) = spelling::exponent(text, dimension) {
            return Ok(Self { dimension, exponent });
        }
        let is = Dimension::ALL.into_iter().find(|&other| spelling::exponent(text, other).is_some());
        let text = text.to_owned();
        Err(match is {
            Some(is) => UnitFault::WrongDimension { text, is, wanted: dimension },
            None => UnitFault::Unknown { near: spelling::near(&text, dimension), text, wanted: dimension },
        })
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn exponent(text: &str, dimension: Dimension) -> Option<i32> {
        Unit::parse(text, dimension).ok().map(|unit| unit.exponent)
    }

    #[test]
    fn every_base_unit_spells_itself() {
        for dimension in Dimension::ALL {
            if !dimension.is_dimensionless() {
                assert_eq!(exponent(dimension.base_unit(), dimension), Some(0), "{}", dimension.name());
            }
        }
    }

    #[test]
    fn spellings_and_prefixes() {
        use Dimension::{
            Area, Length, Ratio, Resistance, Temperature, TemperatureDifference, ThermalResistance, Voltage,
        };
        for text in ["mΩ", "m\u{2126}", "mohm", "mOhm"] {
            assert_eq!(exponent(text, Resistance), Some(-3), "{text}");
        }
        assert_eq!(exponent("MΩ", Resistance), Some(6));
        assert_eq!((exponent("\u{b5}V", Voltage), exponent("\u{3bc}V", Voltage)), (Some(-6), Some(-6)));
        assert_eq!(
            (exponent("mm", Length), exponent("cm", Length), exponent("m", Length)),
            (Some(-3), Some(-2), Some(0))
        );
        assert_eq!((exponent("m²", Area), exponent("cm²", Area), exponent("mm^2", Area)), (Some(6), Some(2), Some(0)));
        assert_eq!(exponent("%", Ratio), Some(-2));
        assert_eq!((exponent("°C", Temperature), exponent("K", Temperature)), (Some(0), None));
        assert_eq!((exponent("°C", TemperatureDifference), exponent("K", TemperatureDifference)), (Some(0), Some(0)));
        assert_eq!(exponent("°C/W", ThermalResistance), Some(0));
    }

    #[test]
    fn a_wrong_unit_is_named_for_what_it_is() {
        let fault = Unit::parse("nC", Dimension::Resistance).expect_err("a charge");
        assert_eq!(fault.to_string(), "`nC` is a unit of charge, not of resistance");
        let fault = Unit::parse("khz", Dimension::Frequency).expect_err("lower case");
        assert_eq!(
            fault.help().as_deref(),
            Some("did you mean `kHz`? Upper and lower case differ in units: m is milli, M is mega")
        );
        let fault = Unit::parse("mhz", Dimension::Frequency).expect_err("lower case");
        assert_eq!(fault.help().as_deref(), Some("did you mean `mHz` or `MHz`? m is milli, M is mega"));
    }
}
