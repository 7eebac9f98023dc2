//! Every drawn point of every family, against `properties` and against an outside program.

#![expect(clippy::unwrap_used, reason = "what fails here fails the test")]

use dewledger_drawing::{
    Chart, Contour, Family, Place, Plot, Px, Sheet, Window, contours, draw, saturation,
};
use dewledger_properties::MoistAir;
use dewledger_quantities::{
    HumidityRatio, Pressure, Quantity, ThermodynamicTemperature, UnitChoice,
};

/// Sea level, 1600 m, 3000 m (ISO 2533 atmosphere, Pa).
const PRESSURES: [f64; 3] = [101_325.0, 83_523.0, 70_109.0];

/// Everyday, winter, hot and damp, and looked at from near: K and kg/kg.
const WINDOWS: [((f64, f64), (f64, f64)); 6] = [
    ((275.15, 309.15), (0.0, 0.020)),
    ((243.15, 298.15), (0.0, 0.008)),
    ((288.15, 333.15), (0.0, 0.120)),
    ((285.15, 288.15), (0.008, 0.0095)),
    ((271.15, 275.15), (0.002, 0.0050)),
    ((213.15, 363.15), (0.0, 0.9)),
];

fn window(((low, high), (dry, wet)): ((f64, f64), (f64, f64))) -> Window {
    Window::si((low, high), (dry, wet))
}

fn air(place: &Place, pressure: f64) -> MoistAir {
    MoistAir::unchecked(place.dry_bulb, place.humidity_ratio, Pressure::from_si(pressure))
}

/// How far the family's quantity of a drawn point is from its line, over the size of the quantity's everyday range.
fn off(family: Family, contour: &Contour, place: &Place, pressure: f64) -> f64 {
    let air = air(place, pressure);
    let level = contour.level.si();
    let (found, scale) = match family {
        Family::RelativeHumidity => (air.relative_humidity().si(), 1.0),
        Family::Enthalpy => (air.enthalpy().si(), 1e5),
        Family::SpecificVolume => (air.specific_volume().si(), 1.0),
        Family::WetBulb => {
            let wet_bulb = air.wet_bulb().unwrap();
            let root = if level < 273.16 { wet_bulb.ice } else { wet_bulb.liquid };
            // On the very curve of saturation either phase may be the one that is found.
            (root.unwrap_or_else(|| wet_bulb.reading()).si(), 50.0)
        }
    };
    (found - level).abs() / scale
}

#[test]
fn every_point_of_every_line_is_what_its_label_says() {
    let mut lines = 0;
    for pressure in PRESSURES {
        for edges in WINDOWS {
            for units in [UnitChoice::si(), UnitChoice::ip()] {
                for family in Family::ALL {
                    let window = window(edges);
                    for contour in
                        contours(family, &window, Pressure::from_si(pressure), &units, 9.0)
                    {
                        lines += 1;
                        for place in &contour.points {
                            assert!(place.humidity_ratio.si() >= 0.0);
                            let off = off(family, &contour, place, pressure);
                            assert!(
                                off < 1e-8,
                                "{family:?} {} at {pressure}, {place:?}: {off}",
                                contour.label
                            );
                        }
                    }
                }
            }
        }
    }
    assert!(lines > 600, "{lines} lines were looked at");
}

#[test]
fn saturation_is_over_ice_below_freezing_and_over_liquid_above() {
    for pressure in PRESSURES {
        for edges in WINDOWS {
            let curve = saturation(&window(edges), Pressure::from_si(pressure));
            for place in &curve.stable {
                let air = air(place, pressure);
                assert!((air.relative_humidity_over_ice().si() - 1.0).abs() < 1e-9, "{place:?}");
            }
            for place in &curve.supercooled {
                let air = air(place, pressure);
                assert!((air.relative_humidity().si() - 1.0).abs() < 1e-9, "{place:?}");
                assert!(place.dry_bulb.si() <= 273.16);
            }
        }
    }
}

/// Humidity ratio of a line at a dry bulb, between two drawn points.
fn at(points: &[Place], dry_bulb_k: f64) -> f64 {
    let pair = points
        .windows(2)
        .find(|pair| (pair[0].dry_bulb.si()..=pair[1].dry_bulb.si()).contains(&dry_bulb_k))
        .unwrap_or_else(|| panic!("the line does not reach {dry_bulb_k}: {points:?}"));
    let share =
        (dry_bulb_k - pair[0].dry_bulb.si()) / (pair[1].dry_bulb.si() - pair[0].dry_bulb.si());
    let of = |place: &Place| place.humidity_ratio.si();
    of(&pair[0]) + share * (of(&pair[1]) - of(&pair[0]))
}

/// Sources: CoolProp 8.0.0, `HAPropsSI` (real-gas moist air, another formulation of the same data). The tolerance is that of
/// joining drawn points by straight lines.
#[test]
fn lines_agree_with_an_outside_program() {
    // Pressure, dry bulb, humidity ratio of saturated air (over ice below freezing).
    let saturated = [
        (101_325.0, 268.15, 0.002_486_313),
        (101_325.0, 293.15, 0.014_760_495),
        (83_523.0, 283.15, 0.009_314_865),
        (83_523.0, 303.15, 0.033_454_347),
        (70_109.0, 268.15, 0.003_595_442),
        (70_109.0, 293.15, 0.021_539_488),
    ];
    for (pressure, t, w) in saturated {
        let curve =
            saturation(&Window::si((263.15, 308.15), (0.0, 0.05)), Pressure::from_si(pressure));
        let found = at(&curve.stable, t);
        assert!((found - w).abs() < 1e-3 * w, "saturated at {t} K, {pressure} Pa: {found} for {w}");
    }
    // Family, level, pressure, dry bulb, humidity ratio.
    let lines = [
        (Family::RelativeHumidity, 0.5, 101_325.0, 298.15, 0.009_925_739),
        (Family::RelativeHumidity, 0.2, 70_109.0, 303.15, 0.007_654_310),
        (Family::WetBulb, 288.15, 101_325.0, 298.15, 0.006_560_122),
        (Family::WetBulb, 293.15, 83_523.0, 308.15, 0.011_698_302),
        (Family::Enthalpy, 50e3, 101_325.0, 298.15, 0.009_759_403),
        (Family::Enthalpy, 60e3, 70_109.0, 308.15, 0.009_634_773),
        (Family::SpecificVolume, 0.86, 101_325.0, 298.15, 0.011_560_583),
    ];
    for (family, level, pressure, t, w) in lines {
        let window = Window::si((283.15, 311.15), (0.0, 0.025));
        let most = if family == Family::SpecificVolume { 9.0 } else { 12.0 };
        let all = contours(family, &window, Pressure::from_si(pressure), &UnitChoice::si(), most);
        let line = all
            .iter()
            .find(|contour| (contour.level.si() - level).abs() < 1e-9 * level)
            .unwrap_or_else(|| panic!("{family:?} {level} is not among {all:?}"));
        let found = at(&line.points, t);
        assert!((found - w).abs() < 1e-3 * w, "{family:?} {level} at {t} K: {found} for {w}");
    }
}

/// Points of a path of the drawing.
fn points(d: &str) -> Vec<Px> {
    d.split(['M', 'L'])
        .filter(|pair| !pair.is_empty())
        .map(|pair| {
            let (x, y) = pair.split_once(' ').unwrap();
            Px { x: x.parse().unwrap(), y: y.parse().unwrap() }
        })
        .collect()
}

/// A hundredth of a pixel, in which the drawing is written, over the quantity's slope.
fn near(plot: &Plot, one: Px, place: &Place) -> bool {
    let other = plot.px(place);
    (one.x - other.x).abs() < 0.006 && (one.y - other.y).abs() < 0.006
}

/// The written drawing itself: each point of a family's path is a place whose quantity is the family's level.
#[test]
fn what_is_written_is_what_was_worked_out() {
    let units = UnitChoice::si();
    for pressure in PRESSURES {
        for family in [Family::WetBulb, Family::Enthalpy, Family::SpecificVolume] {
            let chart = Chart {
                pressure: Pressure::from_si(pressure),
                units: &units,
                states: &[],
                lines: &[],
                legs: None,
                family,
                window: Some(window(WINDOWS[0])),
                sheet: Sheet { width: 680.0, height: 560.0, text: 14.0 },
                cross: None,
                id: "t",
            };
            let drawing = draw(&chart);
            let svg = drawing.node.svg();
            let document = roxmltree::Document::parse(&svg).unwrap();
            let paths: Vec<(String, Vec<Px>)> = document
                .descendants()
                .filter(|node| {
                    node.parent().and_then(|p| p.attribute("class")) == Some("pc-families")
                })
                .map(|node| {
                    let class = node.attribute("class").unwrap().to_owned();
                    (class, points(node.attribute("d").unwrap()))
                })
                .collect();
            assert!(paths.len() > 12);
            for (class, path) in paths {
                // Along a line the family's quantity does not change: compare each point with the line's first.
                // A wet bulb has two of them near freezing, of which one stays the same.
                let quantities = |px: &Px| {
                    let air = air(&drawing.plot.place(*px), pressure);
                    let wet_bulb = air.wet_bulb().unwrap();
                    let of = |root: Option<ThermodynamicTemperature>| {
                        root.map_or(f64::NAN, |root| root.si() / 50.0)
                    };
                    match class.as_str() {
                        "pc-rh" => vec![air.relative_humidity().si()],
                        "pc-wet-bulb" => vec![of(wet_bulb.liquid), of(wet_bulb.ice)],
                        "pc-enthalpy" => vec![air.enthalpy().si() / 1e5],
                        "pc-volume" => vec![air.specific_volume().si()],
                        other => panic!("{other}"),
                    }
                };
                let middle = quantities(&path[path.len() / 2]);
                for px in &path {
                    if drawing.plot.place(*px).humidity_ratio.si() < 0.0 {
                        continue;
                    }
                    let here = quantities(px);
                    let same =
                        here.iter().zip(&middle).any(|(one, other)| (one - other).abs() < 1.5e-4);
                    assert!(same, "{class} {px:?}: {here:?} for {middle:?}");
                }
            }
        }
    }
}

#[test]
fn a_place_of_saturation_is_drawn_where_it_is() {
    let window = window(WINDOWS[0]);
    let units = UnitChoice::ip();
    let chart = Chart {
        pressure: Pressure::from_si(PRESSURES[1]),
        units: &units,
        states: &[],
        lines: &[],
        legs: None,
        family: Family::RelativeHumidity,
        window: Some(window),
        sheet: Sheet { width: 358.0, height: 396.0, text: 14.0 },
        cross: None,
        id: "t",
    };
    let drawing = draw(&chart);
    let svg = drawing.node.svg();
    let document = roxmltree::Document::parse(&svg).unwrap();
    let path =
        document.descendants().find(|node| node.attribute("class") == Some("pc-sat")).unwrap();
    let drawn = points(path.attribute("d").unwrap());
    let curve = saturation(&window, Pressure::from_si(PRESSURES[1]));
    assert_eq!(drawn.len(), curve.stable.len());
    for (px, place) in drawn.iter().zip(&curve.stable) {
        assert!(near(&drawing.plot, *px, place));
        let air = MoistAir::saturated(place.dry_bulb, Pressure::from_si(PRESSURES[1])).unwrap();
        let same = Place {
            dry_bulb: ThermodynamicTemperature::from_si(place.dry_bulb.si()),
            humidity_ratio: HumidityRatio::from_si(air.humidity_ratio().si()),
        };
        assert!(near(&drawing.plot, *px, &same));
    }
}
