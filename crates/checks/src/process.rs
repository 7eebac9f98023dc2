//! What a change of air is called.

use dewledger_properties::MoistAir;
use dewledger_quantities::Quantity;

use crate::given::Given;

/// The process between two air states, by the signs of its changes once they are resolved.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Process {
    /// Warmer, the same water.
    SensibleHeating,
    /// Cooler, the same water.
    SensibleCooling,
    /// Warmer and wetter.
    HeatingAndHumidifying,
    /// Cooler and drier.
    CoolingAndDehumidifying,
    /// Cooler and wetter along the wet bulb.
    EvaporativeCooling,
    /// Cooler and wetter, the wet bulb falling.
    CoolingAndHumidifying,
    /// Cooler and wetter, the wet bulb rising.
    HumidifyingWithHeat,
    /// Warmer and drier along the wet bulb.
    AdiabaticDehumidifying,
    /// Warmer and drier.
    ChemicalDehumidifying,
    /// Wetter at one temperature.
    Humidifying,
    /// Drier at one temperature.
    Dehumidifying,
    /// Neither change is resolved.
    None,
}

impl Process {
    /// Its name on screen.
    #[must_use]
    pub const fn name(self) -> &'static str {
        match self {
            Process::SensibleHeating => "Sensible heating",
            Process::SensibleCooling => "Sensible cooling",
            Process::HeatingAndHumidifying => "Heating and humidifying",
            Process::CoolingAndDehumidifying => "Cooling and dehumidifying",
            Process::EvaporativeCooling => "Evaporative cooling",
            Process::CoolingAndHumidifying => "Cooling and humidifying",
            Process::HumidifyingWithHeat => "Humidifying with heat added",
            Process::AdiabaticDehumidifying => "Dehumidifying by a desiccant, adiabatic",
            Process::ChemicalDehumidifying => "Dehumidifying by a desiccant",
            Process::Humidifying => "Humidifying at constant temperature",
            Process::Dehumidifying => "Dehumidifying at constant temperature",
            Process::None => {
                "No process is resolved: both changes are within what the readings can tell"
            }
        }
    }

    /// Whether the air gets warmer.
    #[must_use]
    pub const fn gains_heat(self) -> bool {
        matches!(self, Process::SensibleHeating | Process::HeatingAndHumidifying)
    }
}

/// The process from `entering` to `leaving`. The floors, in SI, hold where the differences carry no ± of their own.
#[must_use]
pub fn classify(
    given: &Given,
    entering: &MoistAir,
    leaving: &MoistAir,
    floor_k: f64,
    floor_w: f64,
    floor_wet_bulb_k: f64,
) -> Process {
    let sign = |change: f64, floor: f64| {
        if change.abs() < floor {
            0
        } else if change > 0.0 {
            1
        } else {
            -1
        }
    };
    let t =
        sign(leaving.dry_bulb().si() - entering.dry_bulb().si(), given.floor("delta_t", floor_k));
    let w = sign(
        leaving.humidity_ratio().si() - entering.humidity_ratio().si(),
        given.floor("delta_w", floor_w),
    );
    let wet_bulb = || {
        let read = |air: &MoistAir| air.wet_bulb().map(|wet_bulb| wet_bulb.reading().si());
        match (read(entering), read(leaving)) {
            (Ok(entering), Ok(leaving)) => sign(leaving - entering, floor_wet_bulb_k),
            _ => 0,
        }
    };
    match (t, w) {
        (1, 0) => Process::SensibleHeating,
        (-1, 0) => Process::SensibleCooling,
        (1, 1) => Process::HeatingAndHumidifying,
        (-1, -1) => Process::CoolingAndDehumidifying,
        (-1, 1) => match wet_bulb() {
            0 => Process::EvaporativeCooling,
            -1 => Process::CoolingAndHumidifying,
            _ => Process::HumidifyingWithHeat,
        },
        (1, -1) if wet_bulb() == 0 => Process::AdiabaticDehumidifying,
        (1, -1) => Process::ChemicalDehumidifying,
        (0, 1) => Process::Humidifying,
        (0, -1) => Process::Dehumidifying,
        _ => Process::None,
    }
}
