//! The chart as a screen meets it: looked at, moved, read, put into the form.

#![expect(
    clippy::unwrap_used,
    clippy::wildcard_enum_match_arm,
    reason = "what fails here, or comes back as another reply, fails the test"
)]

use std::path::Path;

use dewledger_desk::{
    Change, ChartGesture, ChartLook, ChartOf, ChartPoint, ChartView, ChartWindow, Clock, Desk,
    FaultCode, Place, Preset, Reply, Request, ShapeView, Typed, TypedReading, TypedValue,
};
use jiff::civil::date;
use jiff::tz::TimeZone;

fn open(folder: &Path) -> Desk {
    let clock =
        Clock::new(|| date(2026, 7, 14).at(14, 20, 0, 0).to_zoned_datetime(TimeZone::UTC).unwrap());
    Desk::open(&folder.join("ledger.dewledger"), clock).unwrap()
}

fn ask(desk: &Desk, request: Request) -> Reply {
    desk.handle(request).unwrap_or_else(|fault| panic!("{fault:?}"))
}

fn reading(text: &str, unit: &str, plus_minus: Option<&str>) -> TypedReading {
    TypedReading {
        text: text.to_owned(),
        unit: Some(unit.to_owned()),
        plus_minus: plus_minus
            .map(|text| TypedValue { text: text.to_owned(), unit: Some("K".to_owned()) }),
        ..TypedReading::default()
    }
}

/// A cooling coil at 1600 m (invented): 26.4 °C and 17.6 °C wet bulb, to 12.6 °C and 11.9 °C.
fn coil() -> Typed {
    let mut typed = Typed::default();
    for (key, value) in [("pressure.by", "elevation"), ("flow.basis", "dry_air")] {
        typed.choices.insert(key.to_owned(), value.to_owned());
    }
    for (key, text, unit, plus_minus) in [
        ("pressure.elevation", "1600", "m", None),
        ("entering.dry_bulb", "26.4", "degC", Some("0.3")),
        ("entering.wet_bulb", "17.6", "degC", Some("0.3")),
        ("leaving.dry_bulb", "12.6", "degC", Some("0.3")),
        ("leaving.wet_bulb", "11.9", "degC", None),
        ("flow.dry_air", "2.3", "kg/s", None),
    ] {
        typed.readings.insert(key.to_owned(), reading(text, unit, plus_minus));
    }
    typed
}

fn form(typed: Typed) -> ChartOf {
    ChartOf::Form { check: "air_heat".to_owned(), typed, place: Place::default() }
}

fn look() -> ChartLook {
    ChartLook {
        name: "a<b".to_owned(),
        width_px: 358.0,
        height_px: 396.0,
        text_px: 14.0,
        family: None,
        window: None,
        gesture: None,
        cross: None,
        tap: None,
    }
}

fn chart(desk: &Desk, of: ChartOf, look: ChartLook) -> ChartView {
    match ask(desk, Request::Chart { of, look }) {
        Reply::Chart(view) => *view,
        other => panic!("{other:?}"),
    }
}

/// All elements of a drawing with this class.
fn find<'a>(shape: &'a ShapeView, class: &str) -> Vec<&'a ShapeView> {
    let mut found: Vec<&ShapeView> =
        shape.children.iter().flat_map(|child| find(child, class)).collect();
    if shape
        .attributes
        .get("class")
        .is_some_and(|classes| classes.split(' ').any(|one| one == class))
    {
        found.insert(0, shape);
    }
    found
}

#[test]
fn a_check_with_states_has_a_chart_with_their_doubt() {
    let folder = tempfile::tempdir().unwrap();
    let desk = open(folder.path());
    let view = chart(&desk, form(coil()), look());
    let letters: Vec<_> =
        find(&view.drawing, "pc-letter").iter().filter_map(|node| node.text.clone()).collect();
    assert_eq!(letters, ["A", "B"]);
    // A wet bulb without a ±: only the dry bulb of that state is known.
    assert_eq!(find(&view.drawing, "pc-doubt").len(), 1);
    assert_eq!(find(&view.drawing, "pc-doubt-bar").len(), 1);
    let cells: Vec<Vec<&str>> = view
        .table
        .rows
        .iter()
        .map(|row| row.iter().map(|cell| cell.text.as_str()).collect())
        .collect();
    assert_eq!(cells[0][0], "A Entering air");
    assert_eq!(cells[0][1], "26.40\u{a0}°C ±\u{a0}0.30");
    assert!(cells[1][2].ends_with("±\u{a0}not\u{a0}known"), "{cells:?}");
    assert!(view.says.contains("The air goes from A, Entering air to B, Leaving air."));
    assert!(view.outlines.is_some() && !view.moved);
    // Nothing that a screen names gets into an identifier as it is.
    assert!(find(&view.drawing, "pc-air")[0].attributes["clip-path"].contains("url(#ab-plot)"));
}

#[test]
fn without_a_state_there_is_no_chart_yet() {
    let folder = tempfile::tempdir().unwrap();
    let desk = open(folder.path());
    let fault =
        desk.handle(Request::Chart { of: form(Typed::default()), look: look() }).unwrap_err();
    assert_eq!(fault.code, FaultCode::NotSolved);
}

#[test]
fn what_is_read_at_a_finger_is_put_into_the_form() {
    let folder = tempfile::tempdir().unwrap();
    let desk = open(folder.path());
    let tap = ChartPoint { x_px: 220.0, y_px: 250.0 };
    let view = chart(&desk, form(coil()), ChartLook { tap: Some(tap), ..look() });
    let cross = view.cross.unwrap();
    let at = cross.at.unwrap();
    assert!((at.x_px - tap.x_px).abs() < 1e-6 && (at.y_px - tap.y_px).abs() < 1e-6);
    assert_eq!(find(&view.drawing, "pc-cross-ring").len(), 1);
    let keys: Vec<_> = cross.rows.iter().map(|row| row.key.as_str()).collect();
    assert_eq!(
        keys,
        [
            "dry_bulb",
            "humidity_ratio",
            "relative_humidity",
            "wet_bulb",
            "dew_point",
            "enthalpy",
            "specific_volume"
        ]
    );
    let labels: Vec<_> = cross.acts.iter().map(|act| act.label.as_str()).collect();
    assert_eq!(labels, ["Put the cross into entering air", "Put the cross into leaving air"]);

    // The form then reads back the air that was under the finger.
    let mut typed = coil();
    for change in &cross.acts[0].changes {
        let Change::Type { key, text, unit } = change else { panic!("{change:?}") };
        typed.readings.insert(key.clone(), reading(text, unit, None));
    }
    let again = chart(&desk, form(typed), look());
    let state = find(&again.drawing, "pc-dot");
    assert_eq!(state.len(), 2);
    let wanted = &cross.rows[0].value.as_ref().unwrap().number;
    assert!(again.table.rows[0][1].text.starts_with(wanted.as_str()), "{:?}", again.table);

    // The cross stays in its place when it is sent back, wherever one looks.
    let kept = chart(&desk, form(coil()), ChartLook { cross: Some(cross.place), ..look() });
    assert_eq!(kept.cross.unwrap().place, cross.place);
}

#[test]
fn in_the_fog_there_is_no_air_to_put_anywhere() {
    let folder = tempfile::tempdir().unwrap();
    let desk = open(folder.path());
    let tap = ChartPoint { x_px: 40.0, y_px: 50.0 };
    let cross = chart(&desk, form(coil()), ChartLook { tap: Some(tap), ..look() }).cross.unwrap();
    assert!(cross.fog.unwrap().starts_with("Fog: air of "));
    assert!(cross.acts.is_empty());
}

#[test]
fn a_window_is_zoomed_dragged_and_framed_again() {
    let folder = tempfile::tempdir().unwrap();
    let desk = open(folder.path());
    let home = chart(&desk, form(coil()), look());
    let gesture = ChartGesture { dx_px: 0.0, dy_px: 0.0, zoom: 2.0, about: None };
    let larger = chart(
        &desk,
        form(coil()),
        ChartLook { window: Some(home.window), gesture: Some(gesture), ..look() },
    );
    let span = |window: ChartWindow| window.warmest_k - window.coldest_k;
    assert!(larger.moved);
    assert!((span(larger.window) - 0.5 * span(home.window)).abs() < 1e-9);
    let back = chart(
        &desk,
        form(coil()),
        ChartLook {
            window: Some(larger.window),
            gesture: Some(ChartGesture { zoom: 0.5, ..gesture }),
            ..look()
        },
    );
    assert!((back.window.coldest_k - home.window.coldest_k).abs() < 1e-9);
    let same = chart(&desk, form(coil()), ChartLook { window: Some(larger.window), ..look() });
    assert_eq!(same.window, larger.window);
}

#[test]
fn the_chart_is_in_the_units_of_the_person() {
    let folder = tempfile::tempdir().unwrap();
    let desk = open(folder.path());
    ask(&desk, Request::ChoosePreset { preset: Preset::Ip });
    let look = ChartLook { family: Some("enthalpy".to_owned()), ..look() };
    let view = chart(&desk, form(coil()), look);
    let titles: Vec<_> =
        find(&view.drawing, "pc-title").iter().filter_map(|node| node.text.clone()).collect();
    assert_eq!(titles, ["Dry bulb, °F", "Humidity ratio, gr/lb"]);
    assert!(!find(&view.drawing, "pc-enthalpy").is_empty());
    assert!(view.table.rows[0][1].text.contains("°F"));
}

/// A filed entry is drawn from what was stored, in today's units, with its doubt and its lines.
#[test]
fn a_filed_entry_has_the_chart_of_its_day() {
    let folder = tempfile::tempdir().unwrap();
    let desk = open(folder.path());
    let elevation = TypedValue { text: "1600".to_owned(), unit: Some("m".to_owned()) };
    let site = match ask(
        &desk,
        Request::SaveSite {
            site: None,
            name: "Invented hall".to_owned(),
            elevation,
            note: String::new(),
        },
    ) {
        Reply::Site(site) => site.site,
        other => panic!("{other:?}"),
    };
    let place = Place { site: Some(site), ..Place::default() };
    let filed = Request::File {
        draft: None,
        check: "air_heat".to_owned(),
        typed: coil(),
        place,
        corrects: None,
    };
    let entry = match ask(&desk, filed) {
        Reply::Filed(filed) => filed.entry,
        other => panic!("{other:?}"),
    };
    let live = chart(&desk, form(coil()), look());
    let stored = chart(&desk, ChartOf::Entry { entry }, look());
    assert_eq!(stored.drawing, live.drawing);
    assert_eq!(stored.table, live.table);
}

/// A humid morning at 95 kPa (invented).
fn economizer() -> Typed {
    let mut typed = Typed::default();
    for (key, value) in [
        ("pressure.by", "read"),
        ("return.humidity_by", "relative_humidity"),
        ("outdoor.humidity_by", "relative_humidity"),
        ("flow.basis", "dry_air"),
    ] {
        typed.choices.insert(key.to_owned(), value.to_owned());
    }
    for (key, text, unit) in [
        ("pressure.read", "95", "kPa"),
        ("return.dry_bulb", "23.5", "degC"),
        ("return.relative_humidity", "50", "%"),
        ("outdoor.dry_bulb", "21", "degC"),
        ("outdoor.relative_humidity", "95", "%"),
        ("flow.dry_air", "3.2", "kg/s"),
        ("damper.least", "25", "%"),
        ("coil.leaving", "12.5", "degC"),
    ] {
        typed.readings.insert(key.to_owned(), reading(text, unit, None));
    }
    typed
}

/// Tables and curves of a check come with its results, and with its filed entry.
#[test]
fn tables_and_curves_are_carried_along() {
    let folder = tempfile::tempdir().unwrap();
    let desk = open(folder.path());
    let solved = |check: &str, typed: Typed| match ask(
        &desk,
        Request::Solve { check: check.to_owned(), typed, place: Place::default() },
    ) {
        Reply::Solved(solved) => *solved,
        other => panic!("{other:?}"),
    };
    let economizer = solved("economizer", economizer());
    let table = economizer.tables.first().unwrap_or_else(|| panic!("{economizer:?}"));
    assert!(table.rows.len() > 1 && table.rows.iter().all(|row| row.len() == table.columns.len()));
    let curve = economizer.curves.first().unwrap_or_else(|| panic!("{economizer:?}"));
    assert_eq!(find(&curve.drawing, "pc-curve").len(), 1);
    assert!((2..=14).contains(&curve.table.rows.len()));
    assert!(curve.says.starts_with(curve.title.as_str()));
}
