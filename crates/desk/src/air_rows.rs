//! Air states row by row, for tables: what the command `dewledger air` streams through.
//!
//! Header cells are `quantity [unit]`. Whatever of dry bulb, one humidity and pressure stands in the columns gives
//! the rest, at full precision.

use dewledger_properties::{AirError, Humidity, MoistAir, Wick, atmosphere};
use dewledger_quantities::{
    Elevation, Enthalpy, Entry, HumidityRatio, Kind, Pressure, Quantity, ReadError,
    RelativeHumidity, ThermodynamicTemperature, Unit, plain, read,
};

/// A property of air that a column can hold.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
enum Column {
    DryBulb,
    WetBulb,
    RelativeHumidity,
    RelativeHumidityOverIce,
    DewPoint,
    FrostPoint,
    HumidityRatio,
    Enthalpy,
    SpecificVolume,
    Pressure,
    Elevation,
}

impl Column {
    const ALL: [Column; 11] = [
        Column::DryBulb,
        Column::WetBulb,
        Column::RelativeHumidity,
        Column::RelativeHumidityOverIce,
        Column::DewPoint,
        Column::FrostPoint,
        Column::HumidityRatio,
        Column::Enthalpy,
        Column::SpecificVolume,
        Column::Pressure,
        Column::Elevation,
    ];

    const fn name(self) -> &'static str {
        match self {
            Column::DryBulb => "dry bulb",
            Column::WetBulb => "wet bulb",
            Column::RelativeHumidity => "relative humidity",
            Column::RelativeHumidityOverIce => "relative humidity over ice",
            Column::DewPoint => "dew point",
            Column::FrostPoint => "frost point",
            Column::HumidityRatio => "humidity ratio",
            Column::Enthalpy => "enthalpy",
            Column::SpecificVolume => "specific volume",
            Column::Pressure => "pressure",
            Column::Elevation => "elevation",
        }
    }

    const fn kind(self) -> Kind {
        match self {
            Column::DryBulb | Column::WetBulb | Column::DewPoint | Column::FrostPoint => {
                Kind::Temperature
            }
            Column::RelativeHumidity | Column::RelativeHumidityOverIce => Kind::RelativeHumidity,
            Column::HumidityRatio => Kind::HumidityRatio,
            Column::Enthalpy => Kind::Enthalpy,
            Column::SpecificVolume => Kind::SpecificVolume,
            Column::Pressure => Kind::Pressure,
            Column::Elevation => Kind::Elevation,
        }
    }

    const fn is_humidity(self) -> bool {
        matches!(
            self,
            Column::WetBulb
                | Column::RelativeHumidity
                | Column::RelativeHumidityOverIce
                | Column::DewPoint
                | Column::FrostPoint
                | Column::HumidityRatio
                | Column::Enthalpy
        )
    }
}

/// What is appended unless other columns are asked for, with its unit.
const USUAL: [(Column, &str); 7] = [
    (Column::HumidityRatio, "kg/kg"),
    (Column::Enthalpy, "kJ/kg"),
    (Column::SpecificVolume, "m3/kg"),
    (Column::RelativeHumidity, "%"),
    (Column::WetBulb, "degC"),
    (Column::DewPoint, "degC"),
    (Column::FrostPoint, "degC"),
];

/// Why a table cannot be worked on.
#[derive(Debug, Clone, PartialEq, Eq, thiserror::Error)]
pub enum HeaderError {
    /// A header cell names a known quantity without a unit.
    #[error("column “{cell}” needs its unit: write “{cell} [{example}]”")]
    NoUnit {
        /// The cell.
        cell: String,
        /// A unit that would do.
        example: &'static str,
    },
    /// A unit that is not known, or not of that quantity.
    #[error("column “{cell}”: “{unit}” is not a unit of {quantity}; known are {known}")]
    WrongUnit {
        /// The cell.
        cell: String,
        /// The unit.
        unit: String,
        /// The quantity.
        quantity: &'static str,
        /// Units that would do.
        known: String,
    },
    /// A quantity stands twice.
    #[error("column “{quantity}” stands twice")]
    Twice {
        /// The quantity.
        quantity: &'static str,
    },
    /// Something without which no row can be worked out.
    #[error("no column holds {what}")]
    Missing {
        /// What is missing.
        what: &'static str,
    },
    /// A wanted column that cannot be worked out.
    #[error("“{wanted}” cannot be worked out here; known are {known}")]
    Unwanted {
        /// As asked for.
        wanted: String,
        /// What can be asked for.
        known: String,
    },
}

/// Why a row has no results. The sentence names the cell.
#[derive(Debug, Clone, PartialEq, thiserror::Error)]
pub enum RowError {
    /// A cell is no number.
    #[error("{column}: {error}")]
    Cell {
        /// The column.
        column: &'static str,
        /// Why.
        error: ReadError,
    },
    /// A cell is blank that is needed.
    #[error("{column} was not read")]
    NotRead {
        /// The column.
        column: &'static str,
    },
    /// No humidity in the row.
    #[error("no humidity was read")]
    NoHumidity,
    /// Two humidities in the row.
    #[error("two humidities in one row, {one} and {other}: keep one")]
    TwoHumidities {
        /// One.
        one: &'static str,
        /// The other.
        other: &'static str,
    },
    /// Pressure and elevation in the row.
    #[error("pressure and elevation in one row: keep one")]
    TwoPressures,
    /// There is no such air.
    #[error("{0}")]
    Air(#[from] AirError),
    /// No such elevation.
    #[error("elevation is outside -430 to 5000 m")]
    Elevation,
}

/// A table's columns: which hold what, and what is appended.
#[derive(Debug, Clone)]
pub struct AirRows {
    given: Vec<(usize, Column, &'static Unit)>,
    appended: Vec<(Column, &'static Unit)>,
}

/// Splits `quantity [unit]`.
fn cell_parts(cell: &str) -> (String, Option<String>) {
    let cell = cell.trim().trim_start_matches('\u{feff}');
    match cell.split_once('[') {
        Some((name, unit)) => {
            (name.trim().to_lowercase(), Some(unit.trim().trim_end_matches(']').trim().to_owned()))
        }
        None => (cell.to_lowercase(), None),
    }
}

fn column(name: &str) -> Option<Column> {
    Column::ALL.into_iter().find(|column| column.name() == name)
}

fn unit_of(column: Column, cell: &str, unit: &str) -> Result<&'static Unit, HeaderError> {
    Unit::find(unit).filter(|unit| unit.measures(column.kind())).ok_or_else(|| {
        HeaderError::WrongUnit {
            cell: cell.trim().to_owned(),
            unit: unit.to_owned(),
            quantity: column.name(),
            known: Unit::of(column.kind()).map(|unit| unit.id).collect::<Vec<_>>().join(", "),
        }
    })
}

impl AirRows {
    /// From the header cells, and the columns wanted instead of the usual ones (empty for the usual ones).
    ///
    /// # Errors
    ///
    /// [`HeaderError`], in words for the person at the terminal.
    pub fn new<'a>(
        header: impl IntoIterator<Item = &'a str>,
        wanted: &[String],
    ) -> Result<Self, HeaderError> {
        let mut given: Vec<(usize, Column, &'static Unit)> = Vec::new();
        for (index, cell) in header.into_iter().enumerate() {
            let (name, unit) = cell_parts(cell);
            let Some(column) = column(&name) else { continue };
            let Some(unit) = unit else {
                let example = Unit::of(column.kind()).next().map_or("", |unit| unit.id);
                return Err(HeaderError::NoUnit { cell: cell.trim().to_owned(), example });
            };
            let unit = unit_of(column, cell, &unit)?;
            if given.iter().any(|(_, other, _)| *other == column) {
                return Err(HeaderError::Twice { quantity: column.name() });
            }
            given.push((index, column, unit));
        }
        let has = |test: &dyn Fn(Column) -> bool| given.iter().any(|(_, column, _)| test(*column));
        if !has(&|column| column == Column::DryBulb) {
            return Err(HeaderError::Missing {
                what: "the dry bulb; name it “dry bulb [degC]”"
            });
        }
        if !has(&Column::is_humidity) {
            return Err(HeaderError::Missing {
                what: "a humidity; name it “relative humidity [%]”, “wet bulb [degC]” …",
            });
        }
        if !has(&|column| matches!(column, Column::Pressure | Column::Elevation)) {
            return Err(HeaderError::Missing {
                what: "the pressure; name it “pressure [kPa]” or “elevation [m]”",
            });
        }
        let appended = if wanted.is_empty() {
            USUAL
                .into_iter()
                .filter(|(column, _)| !given.iter().any(|(_, other, _)| other == column))
                .filter_map(|(column, unit)| Some((column, Unit::find(unit)?)))
                .collect()
        } else {
            wanted.iter().map(|cell| wanted_column(cell)).collect::<Result<_, _>>()?
        };
        Ok(Self { given, appended })
    }

    /// Header cells of what is appended.
    #[must_use]
    pub fn appended(&self) -> Vec<String> {
        self.appended
            .iter()
            .map(|(column, unit)| format!("{} [{}]", column.name(), unit.id))
            .collect()
    }

    /// What a row appends, as full-precision numbers; a figure that this air does not have is empty.
    ///
    /// # Errors
    ///
    /// [`RowError`]; the row has no results then.
    pub fn row<'a>(
        &self,
        cell: impl Fn(usize) -> Option<&'a str>,
    ) -> Result<Vec<String>, RowError> {
        let air = self.air(cell)?;
        Ok(self.appended.iter().map(|(column, unit)| value(&air, *column, unit)).collect())
    }

    fn air<'a>(&self, cell: impl Fn(usize) -> Option<&'a str>) -> Result<MoistAir, RowError> {
        let (mut dry_bulb, mut pressure, mut elevation, mut humidity) = (None, None, None, None);
        for (index, column, unit) in &self.given {
            let text = cell(*index).unwrap_or("");
            let entry = read(column.kind(), text, unit)
                .or_else(|error| exact(text, *column, unit).ok_or(error))
                .map_err(|error| RowError::Cell { column: column.name(), error })?;
            let Entry::Read(typed) = entry else { continue };
            let si = typed.amount.si();
            match column {
                Column::DryBulb => dry_bulb = Some(ThermodynamicTemperature::from_si(si)),
                Column::Pressure => pressure = Some(Pressure::from_si(si)),
                Column::Elevation => elevation = Some(Elevation::from_si(si)),
                Column::SpecificVolume => {}
                Column::WetBulb
                | Column::RelativeHumidity
                | Column::RelativeHumidityOverIce
                | Column::DewPoint
                | Column::FrostPoint
                | Column::HumidityRatio
                | Column::Enthalpy => match humidity {
                    None => humidity = Some((*column, si)),
                    Some((one, _)) => {
                        let one: Column = one;
                        return Err(RowError::TwoHumidities {
                            one: one.name(),
                            other: column.name(),
                        });
                    }
                },
            }
        }
        let dry_bulb = dry_bulb.ok_or(RowError::NotRead { column: "dry bulb" })?;
        let pressure = match (pressure, elevation) {
            (Some(_), Some(_)) => return Err(RowError::TwoPressures),
            (Some(pressure), None) => pressure,
            (None, Some(elevation)) => {
                atmosphere::pressure_at(elevation).map_err(|_| RowError::Elevation)?
            }
            (None, None) => return Err(RowError::NotRead { column: "pressure" }),
        };
        let (column, si) = humidity.ok_or(RowError::NoHumidity)?;
        let temperature = ThermodynamicTemperature::from_si(si);
        let humidity = match column {
            Column::RelativeHumidity => Humidity::RelativeHumidity(RelativeHumidity::from_si(si)),
            Column::RelativeHumidityOverIce => {
                Humidity::RelativeHumidityOverIce(RelativeHumidity::from_si(si))
            }
            Column::DewPoint => Humidity::DewPoint(temperature),
            Column::FrostPoint => Humidity::FrostPoint(temperature),
            Column::HumidityRatio => Humidity::HumidityRatio(HumidityRatio::from_si(si)),
            Column::Enthalpy => Humidity::Enthalpy(Enthalpy::from_si(si)),
            Column::DryBulb
            | Column::WetBulb
            | Column::SpecificVolume
            | Column::Pressure
            | Column::Elevation => Humidity::WetBulb(temperature, Wick::NotSaid),
        };
        Ok(MoistAir::new(dry_bulb, humidity, pressure)?)
    }
}

/// A number with a point is never ambiguous in a table written by a program: `1.013` is what it says.
fn exact(text: &str, column: Column, unit: &'static Unit) -> Option<Entry> {
    let value: f64 = text.trim().parse().ok()?;
    let si = unit.to_si(column.kind(), value).filter(|si| si.is_finite())?;
    let amount = dewledger_quantities::Amount::new(column.kind(), si);
    Some(Entry::Read(dewledger_quantities::Typed {
        amount,
        unit,
        unit_typed: false,
        comma: false,
        value,
    }))
}

fn wanted_column(cell: &str) -> Result<(Column, &'static Unit), HeaderError> {
    let (name, unit) = cell_parts(cell);
    let Some(column) = column(&name).filter(|column| *column != Column::Elevation) else {
        let known: Vec<&str> = Column::ALL
            .iter()
            .filter(|column| **column != Column::Elevation)
            .map(|column| column.name())
            .collect();
        return Err(HeaderError::Unwanted {
            wanted: cell.trim().to_owned(),
            known: known.join(", "),
        });
    };
    let unit = match unit {
        Some(unit) => unit_of(column, cell, &unit)?,
        None => match USUAL
            .iter()
            .find(|(other, _)| *other == column)
            .and_then(|(_, unit)| Unit::find(unit))
        {
            Some(unit) => unit,
            None => {
                let example = Unit::of(column.kind()).next().map_or("", |unit| unit.id);
                return Err(HeaderError::NoUnit { cell: cell.trim().to_owned(), example });
            }
        },
    };
    Ok((column, unit))
}

fn value(air: &MoistAir, column: Column, unit: &Unit) -> String {
    let amount = match column {
        Column::DryBulb => Some(air.dry_bulb().amount()),
        Column::WetBulb => air.wet_bulb().ok().map(|wet_bulb| wet_bulb.reading().amount()),
        Column::RelativeHumidity => Some(air.relative_humidity().amount()),
        Column::RelativeHumidityOverIce => Some(air.relative_humidity_over_ice().amount()),
        Column::DewPoint => air.dew_point().ok().map(Quantity::amount),
        Column::FrostPoint => air.frost_point().ok().map(Quantity::amount),
        Column::HumidityRatio => Some(air.humidity_ratio().amount()),
        Column::Enthalpy => Some(air.enthalpy().amount()),
        Column::SpecificVolume => Some(air.specific_volume().amount()),
        Column::Pressure => Some(air.pressure().amount()),
        Column::Elevation => None,
    };
    amount.map_or_else(String::new, |amount| plain(amount, unit))
}

#[cfg(test)]
mod tests {
    use super::*;

    fn rows(header: &[&str]) -> Result<AirRows, HeaderError> {
        AirRows::new(header.iter().copied(), &[])
    }

    fn row(rows: &AirRows, cells: &[&'static str]) -> Result<Vec<String>, RowError> {
        rows.row(|index| cells.get(index).copied())
    }

    #[test]
    fn what_was_not_given_is_appended() {
        let rows = rows(&["station", "dry bulb [degC]", "relative humidity [%]", "pressure [kPa]"])
            .unwrap();
        assert_eq!(
            rows.appended(),
            [
                "humidity ratio [kg/kg]",
                "enthalpy [kJ/kg]",
                "specific volume [m3/kg]",
                "wet bulb [degC]",
                "dew point [degC]",
                "frost point [degC]"
            ]
        );
        let row = row(&rows, &["a", "24", "50", "101.325"]).unwrap();
        // CoolProp 8.0.0: HAPropsSI('W', 'T', 297.15, 'R', 0.5, 'P', 101325).
        assert!((row[0].parse::<f64>().unwrap() - 0.009_340_3).abs() < 5e-8, "{row:?}");
    }

    #[test]
    fn columns_that_do_not_fit_are_said() {
        assert!(matches!(
            rows(&["dry bulb", "wet bulb [degC]", "pressure [kPa]"]),
            Err(HeaderError::NoUnit { .. })
        ));
        assert!(matches!(
            rows(&["dry bulb [cfm]", "wet bulb [degC]", "pressure [kPa]"]),
            Err(HeaderError::WrongUnit { .. })
        ));
        assert!(matches!(
            rows(&["dry bulb [degC]", "wet bulb [degC]"]),
            Err(HeaderError::Missing { .. })
        ));
        assert!(matches!(
            rows(&["dry bulb [degC]", "dry bulb [degF]", "pressure [kPa]"]),
            Err(HeaderError::Twice { .. })
        ));
    }

    #[test]
    fn bad_rows_say_why() {
        let rows =
            rows(&["dry bulb [degC]", "wet bulb [degC]", "dew point [degC]", "pressure [kPa]"])
                .unwrap();
        assert_eq!(row(&rows, &["24", "", "", "101"]), Err(RowError::NoHumidity));
        assert_eq!(
            row(&rows, &["", "10", "", "101"]),
            Err(RowError::NotRead { column: "dry bulb" })
        );
        assert!(matches!(
            row(&rows, &["24", "10", "9", "101"]),
            Err(RowError::TwoHumidities { .. })
        ));
        assert!(matches!(
            row(&rows, &["24", "30", "", "101"]),
            Err(RowError::Air(AirError::WetBulbAboveDryBulb { .. }))
        ));
        assert!(matches!(row(&rows, &["24", "x", "", "101"]), Err(RowError::Cell { .. })));
        assert!(row(&rows, &["24", "10", "", "101.325"]).is_ok());
    }
}
