//! Starting entries of the register, by class of instrument. Their figures are common practice, nobody's specification:
//! the instrument's own paper overrides them. Never by brand.

use crate::request::{TypedBand, TypedInstrument, TypedProbe};

/// A starting entry.
pub(crate) struct Class {
    pub(crate) id: &'static str,
    pub(crate) label: &'static str,
    pub(crate) help: &'static str,
    probes: &'static [Probe],
}

/// A probe of a starting entry: figures as they would be typed.
struct Probe {
    name: &'static str,
    quantity: &'static str,
    unit: &'static str,
    absolute: &'static str,
    of_reading: &'static str,
    of_range: &'static str,
    range: &'static str,
    resolution: &'static str,
    /// Per cent of the statement that is calibration.
    calibration: &'static str,
    greater: bool,
    reads: &'static [(&'static str, &'static str)],
}

/// What a probe has where its line says nothing else.
const PLAIN: Probe = Probe {
    name: "",
    quantity: "",
    unit: "",
    absolute: "",
    of_reading: "",
    of_range: "",
    range: "",
    resolution: "",
    calibration: "",
    greater: false,
    reads: &[],
};

const fn thermometer(name: &'static str, absolute: &'static str) -> Probe {
    Probe { name, quantity: "temperature", unit: "degC", absolute, resolution: "0.1", ..PLAIN }
}

const MEASURED: &[(&str, &str)] = &[("wet_bulb", "measured")];
const ACTUAL: &[(&str, &str)] = &[("flow", "actual")];

pub(crate) static CLASSES: &[Class] = &[
    Class {
        id: "air_thermometer",
        label: "Thermistor or resistance probe for air",
        help: "± 0.3 °C, limits",
        probes: &[thermometer("dry bulb", "0.3")],
    },
    Class {
        id: "aspirated_psychrometer",
        label: "Aspirated psychrometer",
        help: "± 0.2 °C each; a wick that is not quite wet reads high by up to 0.3 K",
        probes: &[
            thermometer("dry bulb", "0.2"),
            Probe { reads: MEASURED, ..thermometer("wet bulb", "0.2") },
        ],
    },
    Class {
        id: "sling_psychrometer",
        label: "Sling psychrometer",
        help: "± 0.5 °C each; read late it shows a wet bulb 0.2 to 0.5 K high",
        probes: &[
            Probe { resolution: "0.5", ..thermometer("dry bulb", "0.5") },
            Probe { resolution: "0.5", reads: MEASURED, ..thermometer("wet bulb", "0.5") },
        ],
    },
    Class {
        id: "humidity_probe",
        label: "Capacitive humidity probe",
        help: "± 2 % RH between 10 and 90 %, ± 4 % beyond; drifts about 1 % RH a year",
        probes: &[
            thermometer("dry bulb", "0.3"),
            Probe {
                name: "humidity",
                quantity: "relative_humidity",
                unit: "%",
                absolute: "2",
                resolution: "0.1",
                ..PLAIN
            },
        ],
    },
    Class {
        id: "flow_hood",
        label: "Flow hood",
        help: "± 3 % of the reading and 3 L/s; swirl and back pressure add 5 to 10 %",
        probes: &[Probe {
            name: "flow",
            quantity: "air_flow",
            unit: "L/s",
            absolute: "3",
            of_reading: "3",
            resolution: "1",
            reads: ACTUAL,
            ..PLAIN
        }],
    },
    Class {
        id: "micromanometer",
        label: "Micromanometer with Pitot tube",
        help: "± 1 % and 0.25 Pa; the plane adds 3 to 10 %",
        probes: &[Probe {
            name: "pressure difference",
            quantity: "pressure_difference",
            unit: "Pa",
            absolute: "0.25",
            of_reading: "1",
            resolution: "0.1",
            ..PLAIN
        }],
    },
    Class {
        id: "hot_wire",
        label: "Hot-wire anemometer",
        help: "± 3 % and 0.05 m/s; it reads mass flow; dust and angle add about 5 %",
        probes: &[Probe {
            name: "velocity",
            quantity: "velocity",
            unit: "m/s",
            absolute: "0.05",
            of_reading: "3",
            resolution: "0.01",
            ..PLAIN
        }],
    },
    Class {
        id: "vane",
        label: "Rotating vane anemometer",
        help: "± 2 % and 0.1 m/s; at the face of a coil ± 10 %",
        probes: &[Probe {
            name: "velocity",
            quantity: "velocity",
            unit: "m/s",
            absolute: "0.1",
            of_reading: "2",
            resolution: "0.1",
            ..PLAIN
        }],
    },
    Class {
        id: "clamp_power",
        label: "Clamp power meter",
        help: "± 2 % of the reading and 0.3 % of the range; at a low power factor ± 5 %",
        probes: &[Probe {
            name: "power",
            quantity: "power",
            unit: "kW",
            of_reading: "2",
            of_range: "0.3",
            range: "100",
            resolution: "0.1",
            ..PLAIN
        }],
    },
    Class {
        id: "ultrasonic_water",
        label: "Clamp-on ultrasonic flow meter",
        help: "± 2 % of the reading, or 0.05 L/s where that is more; wall, lining and straight length add 3 to 5 %",
        probes: &[Probe {
            name: "water flow",
            quantity: "water_flow",
            unit: "L/s",
            absolute: "0.05",
            of_reading: "2",
            resolution: "0.01",
            greater: true,
            ..PLAIN
        }],
    },
    Class {
        id: "water_pair",
        label: "Matched pair of water thermometers in wells",
        help: "± 0.1 °C; strapped to the pipe ± 0.5 to 1.0 °C",
        probes: &[thermometer("entering water", "0.1"), thermometer("leaving water", "0.1")],
    },
    Class {
        id: "barometer",
        label: "Barometer",
        help: "± 2 hPa; it must show the pressure here, not one brought down to sea level",
        probes: &[Probe {
            name: "pressure",
            quantity: "pressure",
            unit: "hPa",
            absolute: "2",
            resolution: "0.1",
            ..PLAIN
        }],
    },
    Class {
        id: "bucket",
        label: "Bucket and watch",
        help: "± 2 % of the volume; the watch is held to ± 2 s",
        probes: &[
            Probe { name: "volume", quantity: "water_volume", unit: "L", of_reading: "2", ..PLAIN },
            Probe {
                name: "time",
                quantity: "duration",
                unit: "s",
                absolute: "2",
                calibration: "0",
                ..PLAIN
            },
        ],
    },
];

/// A new instrument of a class.
pub(crate) fn typed(id: &str) -> Option<TypedInstrument> {
    let class = CLASSES.iter().find(|class| class.id == id)?;
    Some(TypedInstrument {
        name: class.label.to_owned(),
        note: "Figures by class, common practice; put in what its own paper says.".to_owned(),
        probes: class.probes.iter().map(probe).collect(),
        ..TypedInstrument::default()
    })
}

fn probe(probe: &Probe) -> TypedProbe {
    let mut bands = vec![TypedBand {
        absolute: probe.absolute.to_owned(),
        of_reading: probe.of_reading.to_owned(),
        of_range: probe.of_range.to_owned(),
        greater: probe.greater,
        ..TypedBand::default()
    }];
    // Wide of 10 to 90 % a capacitive probe is worse; below 10 % there is little air to measure.
    if probe.quantity == "relative_humidity" {
        bands[0].up_to = "90".to_owned();
        bands.push(TypedBand { absolute: "4".to_owned(), ..TypedBand::default() });
    }
    TypedProbe {
        name: probe.name.to_owned(),
        quantity: probe.quantity.to_owned(),
        unit: probe.unit.to_owned(),
        bands,
        range: probe.range.to_owned(),
        resolution: probe.resolution.to_owned(),
        calibration_share: probe.calibration.to_owned(),
        reads: probe
            .reads
            .iter()
            .map(|(key, value)| ((*key).to_owned(), (*value).to_owned()))
            .collect(),
        ..TypedProbe::default()
    }
}
