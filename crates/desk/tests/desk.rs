//! The desk as a screen meets it: requests in, finished text out.

#![expect(
    clippy::unwrap_used,
    clippy::wildcard_enum_match_arm,
    reason = "what fails here, or comes back as another reply, fails the test"
)]

use dewledger_desk::{
    Change, Clock, Desk, Fault, FaultCode, FieldView, FormOpened, Place, Preset, ReadingView,
    Reply, Request, Solved, Stage, Tone, Typed, TypedReading, TypedValue,
};
use jiff::civil::date;
use jiff::tz::TimeZone;

fn clock() -> Clock {
    Clock::new(|| date(2026, 7, 14).at(14, 20, 0, 0).to_zoned_datetime(TimeZone::UTC).unwrap())
}

struct Open {
    desk: Desk,
    folder: tempfile::TempDir,
}

impl Open {
    fn new() -> Self {
        let folder = tempfile::tempdir().unwrap();
        let desk = Desk::open(&folder.path().join("ledger.dewledger"), clock()).unwrap();
        Self { desk, folder }
    }

    /// Closes the app and opens it again.
    fn again(self) -> Self {
        let folder = self.folder;
        drop(self.desk);
        let desk = Desk::open(&folder.path().join("ledger.dewledger"), clock()).unwrap();
        Self { desk, folder }
    }

    fn ask(&self, request: Request) -> Reply {
        self.desk.handle(request).unwrap_or_else(|fault| panic!("{fault:?}"))
    }

    fn fault(&self, request: Request) -> Fault {
        match self.desk.handle(request) {
            Err(fault) => fault,
            Ok(reply) => panic!("no fault: {reply:?}"),
        }
    }

    fn solve(&self, check: &str, typed: Typed) -> Solved {
        match self.ask(Request::Solve { check: check.to_owned(), typed, place: Place::default() }) {
            Reply::Solved(solved) => *solved,
            other => panic!("{other:?}"),
        }
    }

    fn ip(&self) {
        self.ask(Request::ChoosePreset { preset: Preset::Ip });
    }

    fn site(&self) -> String {
        let elevation = TypedValue { text: "1609".to_owned(), unit: Some("m".to_owned()) };
        let request = Request::SaveSite {
            site: None,
            name: "Invented hall".to_owned(),
            elevation,
            note: String::new(),
        };
        match self.ask(request) {
            Reply::Site(site) => site.site,
            other => panic!("{other:?}"),
        }
    }
}

fn typed(choices: &[(&str, &str)], readings: &[(&str, &str, &str)]) -> Typed {
    let mut typed = Typed::default();
    for (key, value) in choices {
        typed.choices.insert((*key).to_owned(), (*value).to_owned());
    }
    for (key, text, unit) in readings {
        let unit = (!unit.is_empty()).then(|| (*unit).to_owned());
        typed.readings.insert(
            (*key).to_owned(),
            TypedReading { text: (*text).to_owned(), unit, ..TypedReading::default() },
        );
    }
    typed
}

/// 80 °F / 62 °F wet bulb to 55 / 53 at 10 000 cfm at 1 609 m.
fn coil_ip() -> Typed {
    typed(
        &[("flow.basis", "actual_entering")],
        &[
            ("pressure.elevation", "1609", "m"),
            ("entering.dry_bulb", "80", "degF"),
            ("entering.wet_bulb", "62", "degF"),
            ("leaving.dry_bulb", "55", "degF"),
            ("leaving.wet_bulb", "53", "degF"),
            ("flow.rate", "10000", "cfm"),
        ],
    )
}

/// The same readings in °C and L/s.
fn coil_si() -> Typed {
    typed(
        &[("flow.basis", "actual_entering")],
        &[
            ("pressure.elevation", "1609", "m"),
            ("entering.dry_bulb", "26.6666667", "degC"),
            ("entering.wet_bulb", "16.6666667", "degC"),
            ("leaving.dry_bulb", "12.7777778", "degC"),
            ("leaving.wet_bulb", "11.6666667", "degC"),
            ("flow.rate", "4719.474432", "L/s"),
        ],
    )
}

fn reading<'a>(solved: &'a Solved, key: &str) -> &'a ReadingView {
    let fields = solved.sections.iter().flat_map(|section| &section.fields);
    for field in fields {
        if let FieldView::Reading(reading) = field
            && reading.key == key
        {
            return reading;
        }
    }
    panic!("no field {key}")
}

fn without(mut typed: Typed, key: &str) -> Typed {
    typed.readings.remove(key);
    typed
}

fn with(mut typed: Typed, key: &str, text: &str, unit: &str) -> Typed {
    let reading = TypedReading {
        text: text.to_owned(),
        unit: Some(unit.to_owned()),
        ..TypedReading::default()
    };
    typed.readings.insert(key.to_owned(), reading);
    typed
}

#[test]
fn the_same_readings_in_both_systems_are_one_result() {
    let open = Open::new();
    let (ip, si) = (open.solve("air_heat", coil_ip()), open.solve("air_heat", coil_si()));
    assert_eq!((ip.stage, si.stage), (Stage::Solved, Stage::Solved));
    let (a, b) = (ip.headline.value.unwrap(), si.headline.value.unwrap());
    assert!((a.si / b.si - 1.0).abs() < 1e-7, "{} {}", a.si, b.si);
    assert_eq!(a.unit, "kW", "shown in the person's units, whatever was typed");
    assert_eq!(ip.headline.says, "Heat removed, total");
    // The book's constants follow the unit that the flow was typed in.
    assert_eq!(ip.versus[0].title, "Total by 4.500\u{a0}lb/h per cfm");
    assert_eq!(si.versus[0].title, "Total by 1.200\u{a0}kg/m³");
    assert!(ip.versus[0].gap.contains("too high"), "{}", ip.versus[0].gap);
}

#[test]
fn results_follow_the_chosen_units_and_what_was_typed_stays() {
    let open = Open::new();
    open.ip();
    let solved = open.solve("air_heat", coil_si());
    assert_eq!(solved.headline.value.as_ref().unwrap().unit, "kBtu/h");
    let field = reading(&solved, "entering.dry_bulb");
    assert_eq!((field.text.as_str(), field.unit.id.as_str()), ("26.6666667", "degC"));
}

#[test]
fn a_blank_reading_is_waited_for_by_name() {
    let open = Open::new();
    let solved = open.solve("air_heat", without(coil_ip(), "leaving.wet_bulb"));
    assert_eq!(solved.stage, Stage::Waiting);
    assert_eq!(solved.waits.as_deref(), Some("waits for the leaving wet bulb"));
    assert!(solved.headline.value.is_none());
    let solved = open.solve("air_heat", without(coil_ip(), "flow.rate"));
    assert_eq!(solved.stage, Stage::Waiting);
    assert_eq!(solved.waits.as_deref(), Some("waits for the air flow"));
    assert!(
        solved
            .groups
            .iter()
            .any(|group| group.rows.iter().any(|row| row.key == "delta_h" && row.value.is_some()))
    );
}

#[test]
fn a_flow_without_its_basis_is_asked_about() {
    let open = Open::new();
    open.ip();
    let mut typed = coil_ip();
    typed.choices.clear();
    let solved = open.solve("air_heat", typed);
    assert_eq!(solved.waits.as_deref(), Some("waits for what the flow is"));
    let asked =
        solved.sections.iter().flat_map(|section| &section.fields).find_map(|field| match field {
            FieldView::Choice(choice) if choice.key == "flow.basis" => choice.error.as_ref(),
            _ => None,
        });
    assert_eq!(
        asked.unwrap().says,
        "Is 10\u{a0}000\u{a0}cfm what passed there (actual), or standard air?"
    );
}

#[test]
fn swapped_bulbs_are_refused_and_the_swap_is_offered() {
    let open = Open::new();
    open.ip();
    let typed =
        with(with(coil_ip(), "entering.dry_bulb", "62", "degF"), "entering.wet_bulb", "80", "degF");
    let solved = open.solve("air_heat", typed);
    assert_eq!(solved.stage, Stage::Refused);
    let error = reading(&solved, "entering.wet_bulb").error.as_ref().unwrap();
    assert_eq!(
        error.says,
        "Wet bulb 80.0\u{a0}°F is above dry bulb 62.0\u{a0}°F. Air cannot do that. Swap the two, or wet the wick and read again."
    );
    let swap =
        Change::Swap { one: "entering.dry_bulb".to_owned(), other: "entering.wet_bulb".to_owned() };
    assert!(
        error
            .acts
            .iter()
            .any(|act| act.label == "Swap the two" && act.changes == vec![swap.clone()])
    );
    assert_eq!(solved.notes[0].tone, Tone::Impossible);
}

#[test]
fn a_comma_is_read_and_said_back_and_two_meanings_are_refused() {
    let open = Open::new();
    let solved = open.solve("air_heat", with(coil_si(), "entering.dry_bulb", "26,7", "degC"));
    assert_eq!(
        reading(&solved, "entering.dry_bulb").read_as.as_deref(),
        Some("read as 26.7\u{a0}°C")
    );
    let solved = open.solve("air_heat", with(coil_ip(), "flow.rate", "10,000", "cfm"));
    let error = reading(&solved, "flow.rate").error.as_ref().unwrap();
    assert!(error.says.contains("10,000") && error.says.contains("10\u{a0}000"), "{}", error.says);
    assert_eq!(solved.stage, Stage::Waiting);
}

#[test]
fn fahrenheit_typed_as_celsius_is_noticed() {
    let open = Open::new();
    let typed =
        with(with(coil_si(), "entering.dry_bulb", "80", "degC"), "entering.wet_bulb", "62", "degC");
    let solved = open.solve("air_heat", typed);
    let note = solved.notes.iter().find(|note| note.code == "entering.dry_bulb.extreme").unwrap();
    assert_eq!(note.tone, Tone::Unusual);
    let act = note.acts.iter().find(|act| act.label == "It was typed in °F").unwrap();
    assert!(
        act.changes.contains(&Change::Unit {
            key: "entering.dry_bulb".to_owned(),
            unit: "degF".to_owned()
        })
    );
    assert!(
        act.changes.contains(&Change::Unit {
            key: "entering.wet_bulb".to_owned(),
            unit: "degF".to_owned()
        })
    );
}

#[test]
fn a_sea_level_barometer_is_caught_before_any_result() {
    let open = Open::new();
    let mut typed = with(coil_si(), "pressure.read", "102.0", "kPa");
    typed.choices.insert("pressure.by".to_owned(), "read".to_owned());
    let solved = open.solve("air_heat", typed);
    assert_eq!(solved.stage, Stage::Refused);
    let error = reading(&solved, "pressure.read").error.as_ref().unwrap();
    assert_eq!(
        error.says,
        "Pressure 102.00\u{a0}kPa cannot be at 1609\u{a0}m, where it is near 83.43\u{a0}kPa. It is probably a sea-level figure: taken as an altimeter setting it gives 84.01\u{a0}kPa. Say which it is, or correct the elevation."
    );
    let labels: Vec<&str> = error.acts.iter().map(|act| act.label.as_str()).collect();
    assert_eq!(labels, ["It is an altimeter setting", "It is a sea-level pressure"]);
}

#[test]
fn a_wet_bulb_a_little_above_the_dry_bulb_is_saturated_air() {
    let open = Open::new();
    let solved = open.solve("air_heat", with(coil_si(), "leaving.wet_bulb", "12.88", "degC"));
    assert_eq!(solved.stage, Stage::Solved);
    let note = solved.notes.iter().find(|note| note.tone == Tone::Within).unwrap();
    assert_eq!(note.lead, "The leaving air is taken as saturated.");
    assert_eq!(reading(&solved, "leaving.wet_bulb").text, "12.88", "the typed value stays");
}

#[test]
fn a_plus_minus_typed_beside_per_cent_is_a_share_of_the_reading() {
    let open = Open::new();
    let shown = |text: &str, unit: &str| {
        let mut typed = coil_si();
        typed.readings.get_mut("flow.rate").unwrap().plus_minus =
            Some(TypedValue { text: text.to_owned(), unit: Some(unit.to_owned()) });
        let solved = open.solve("air_heat", typed);
        let view = reading(&solved, "flow.rate");
        (view.plus_minus.clone(), view.plus_minus_unit.id.clone(), view.error.clone())
    };
    let share = shown("4", "%");
    assert_eq!(share.0, shown("4 %", "L/s").0);
    assert_ne!(share.0, shown("4", "L/s").0);
    assert_eq!((share.1.as_str(), share.2), ("%", None));
}

#[test]
fn a_plus_minus_on_every_reading_gives_one_to_the_result() {
    let open = Open::new();
    let mut typed = coil_si();
    let solved = open.solve("air_heat", typed.clone());
    assert_eq!(solved.headline.plus_minus.as_ref().unwrap().text, "± not\u{a0}known");
    for (key, text, unit) in [
        ("entering.dry_bulb", "0.3", "K"),
        ("entering.wet_bulb", "0.3", "K"),
        ("leaving.dry_bulb", "0.3", "K"),
        ("leaving.wet_bulb", "0.3", "K"),
        ("flow.rate", "4 %", "L/s"),
    ] {
        let plus_minus = TypedValue { text: text.to_owned(), unit: Some(unit.to_owned()) };
        typed.readings.get_mut(key).unwrap().plus_minus = Some(plus_minus);
    }
    let solved = open.solve("air_heat", typed);
    let plus_minus = solved.headline.plus_minus.unwrap();
    assert!(plus_minus.si.is_some() && plus_minus.text.starts_with("± "), "{plus_minus:?}");
    let sum: f64 = solved.drivers.rows.iter().map(|driver| driver.share).sum();
    assert!((sum - 1.0).abs() < 1e-9);
    assert!(solved.drivers.rows.iter().any(|driver| driver.label == "Entering air, wet bulb"));
    assert!(solved.drivers.says.unwrap().contains("would bring ±"));
    assert!(solved.versus.iter().all(|versus| versus.verdict.is_some()));
}

#[test]
fn a_check_is_filed_and_found_again_after_closing() {
    let open = Open::new();
    let site = open.site();
    let place = Place { site: Some(site.clone()), ..Place::default() };
    let fault = open.fault(Request::File {
        draft: None,
        check: "air_heat".to_owned(),
        typed: coil_ip(),
        place: Place::default(),
        corrects: None,
    });
    assert_eq!((fault.code, fault.field.as_deref()), (FaultCode::Field, Some("site")));
    let Reply::DraftKept { draft, at } = open.ask(Request::KeepDraft {
        draft: None,
        check: "air_heat".to_owned(),
        typed: coil_ip(),
        place: place.clone(),
        corrects: None,
    }) else {
        panic!()
    };
    assert_eq!(at, "14:20");
    let Reply::Filed(filed) = open.ask(Request::File {
        draft: Some(draft),
        check: "air_heat".to_owned(),
        typed: coil_ip(),
        place: place.clone(),
        corrects: None,
    }) else {
        panic!()
    };
    assert_eq!((filed.says.as_str(), filed.place.as_str()), ("Filed 14:20", "Invented hall"));
    let open = open.again();
    let Reply::Overview(overview) = open.ask(Request::Overview {}) else { panic!() };
    assert!(overview.drafts.is_empty() && !overview.empty);
    assert_eq!(overview.entries[0].entry, filed.entry);
    let Reply::Entry(entry) = open.ask(Request::Entry { entry: filed.entry.clone() }) else {
        panic!()
    };
    assert_eq!(entry.readings.len(), 6);
    assert!(
        entry
            .readings
            .iter()
            .any(|row| row.label == "Entering air, dry bulb" && row.text == "80\u{a0}°F")
    );
    // The stored answer is the same as one worked out now, and follows the units of today.
    let si = entry.solved.headline.value.unwrap().si;
    let now = open.solve("air_heat", coil_ip()).headline.value.unwrap().si;
    assert!((si / now - 1.0).abs() < 1e-12);
    open.ip();
    let Reply::Entry(entry) = open.ask(Request::Entry { entry: filed.entry.clone() }) else {
        panic!()
    };
    assert_eq!(entry.solved.headline.value.unwrap().unit, "kBtu/h");
    assert!(entry.readings.iter().any(|row| row.text == "80\u{a0}°F"));
}

#[test]
fn a_correction_keeps_what_was_filed_before() {
    let open = Open::new();
    let place = Place { site: Some(open.site()), ..Place::default() };
    let file = |typed: Typed, corrects: Option<String>| {
        let check = "air_heat".to_owned();
        match open.ask(Request::File { draft: None, check, typed, place: place.clone(), corrects })
        {
            Reply::Filed(filed) => filed.entry,
            other => panic!("{other:?}"),
        }
    };
    let entry = file(coil_ip(), None);
    let Reply::Form(form) = open.ask(Request::Correct { entry: entry.clone() }) else { panic!() };
    let FormOpened { typed, corrects, .. } = *form;
    assert_eq!(corrects.as_deref(), Some(entry.as_str()));
    let again = file(with(typed, "leaving.dry_bulb", "56", "degF"), corrects);
    assert_eq!(again, entry);
    let Reply::Entry(view) = open.ask(Request::Entry { entry: entry.clone() }) else { panic!() };
    assert_eq!(view.revisions.len(), 2);
    assert!(
        view.revisions[0].says.ends_with("first") && view.revisions[1].says.ends_with("corrected")
    );
    assert!(view.revisions[1].current && !view.revisions[0].current);
    open.ask(Request::WithdrawEntry { entry: entry.clone() });
    let Reply::Entry(view) = open.ask(Request::Entry { entry: entry.clone() }) else { panic!() };
    assert!(view.withdrawn && view.revisions.len() == 3);
    open.ask(Request::RestoreEntry { entry: entry.clone() });
    let Reply::Entry(view) = open.ask(Request::Entry { entry }) else { panic!() };
    assert!(!view.withdrawn);
}

#[test]
fn a_visit_gives_its_pressure_to_every_check() {
    let open = Open::new();
    let site = open.site();
    let visit = typed(
        &[("pressure.by", "read")],
        &[("pressure.read", "83.10", "kPa"), ("pressure.elevation", "1609", "m")],
    );
    let Reply::Visit(visit) = open.ask(Request::SaveVisit {
        visit: None,
        site: site.clone(),
        people: "M. Ovrane".to_owned(),
        running: "valve 62 %".to_owned(),
        typed: visit,
    }) else {
        panic!()
    };
    assert!(visit.open);
    let Reply::Form(form) =
        open.ask(Request::Start { check: "air_state".to_owned(), place: visit.place.clone() })
    else {
        panic!()
    };
    assert_eq!(form.typed.readings["pressure.read"].text, "83.10");
    let pressure = &form.solved.sections[0];
    assert!(pressure.folded);
    assert_eq!(pressure.summary.as_deref(), Some("83.10\u{a0}kPa, read here"));
    // A visit with an impossible barometer is not begun.
    let wrong = typed(
        &[("pressure.by", "read")],
        &[("pressure.read", "101.3", "kPa"), ("pressure.elevation", "1609", "m")],
    );
    let fault = open.fault(Request::SaveVisit {
        visit: None,
        site,
        people: String::new(),
        running: String::new(),
        typed: wrong,
    });
    assert_eq!(fault.field.as_deref(), Some("pressure.read"));
}

#[test]
fn the_demo_site_is_invented_and_filled() {
    let open = Open::new();
    let Reply::Overview(overview) = open.ask(Request::Overview {}) else { panic!() };
    assert!(overview.empty);
    let Reply::Overview(overview) = open.ask(Request::AddDemo {}) else { panic!() };
    assert!(!overview.empty && overview.entries.len() == 5);
    assert!(overview.entries.iter().all(|entry| entry.invented));
    let Reply::Site(site) = open.ask(Request::Site { site: overview.sites[0].site.clone() }) else {
        panic!()
    };
    assert_eq!((site.visits.len(), site.equipment.len()), (2, 3));
    assert!(site.invented);
    for entry in &overview.entries {
        let Reply::Entry(view) = open.ask(Request::Entry { entry: entry.entry.clone() }) else {
            panic!()
        };
        assert_eq!(view.solved.stage, Stage::Solved, "{}", view.solved.check.label);
        assert!(
            view.solved
                .headline
                .plus_minus
                .as_ref()
                .is_some_and(|pm| pm.si.is_some() || pm.interval.is_some()),
            "{}: {:?}",
            entry.label,
            view.solved.headline
        );
        assert!(!view.solved.notes.iter().any(|note| note.tone == Tone::Impossible));
    }
    // The last visit's readings stand beside the fields of a new form on the same equipment.
    let place = Place {
        site: Some(site.site.clone()),
        equipment: Some(site.equipment[1].equipment.clone()),
        visit: None,
    };
    let Reply::Form(form) = open.ask(Request::Start { check: "air_heat".to_owned(), place }) else {
        panic!()
    };
    assert_eq!(reading(&form.solved, "entering.dry_bulb").was.as_ref().unwrap().text, "26.4");
    assert!(form.solved.invented);
}

#[test]
fn a_draft_is_found_where_it_was_left() {
    let open = Open::new();
    let Reply::DraftKept { draft, .. } = open.ask(Request::KeepDraft {
        draft: None,
        check: "mixing".to_owned(),
        typed: typed(&[], &[("stream1.dry_bulb", "24.", "degC")]),
        place: Place::default(),
        corrects: None,
    }) else {
        panic!()
    };
    let open = open.again();
    let Reply::Form(form) = open.ask(Request::OpenDraft { draft: draft.clone() }) else { panic!() };
    assert_eq!(form.typed.readings["stream1.dry_bulb"].text, "24.");
    open.ask(Request::DiscardDraft { draft: draft.clone() });
    let Reply::Overview(overview) = open.ask(Request::Overview {}) else { panic!() };
    assert!(overview.drafts.is_empty());
    let Reply::Form(_) = open.ask(Request::RestoreDraft { draft }) else { panic!() };
}

#[test]
fn streams_are_added_and_taken_away() {
    let open = Open::new();
    let solved = open.solve("mixing", Typed::default());
    let add = solved
        .sections
        .iter()
        .flat_map(|section| &section.acts)
        .find(|act| act.label == "Add a stream")
        .unwrap();
    assert_eq!(
        add.changes,
        vec![Change::Choose { key: "streams".to_owned(), value: "3".to_owned() }]
    );
    let solved = open.solve("mixing", typed(&[("streams", "3")], &[]));
    assert!(solved.sections.iter().any(|section| section.key == "stream3"));
    let remove = solved
        .sections
        .iter()
        .flat_map(|section| &section.acts)
        .find(|act| act.label == "Take this stream away");
    assert!(
        remove.unwrap().changes.contains(&Change::Clear { key: "stream3.dry_bulb".to_owned() })
    );
}

#[test]
fn nonsense_is_answered_not_suffered() {
    let open = Open::new();
    for text in [
        "",
        "{}",
        "[]",
        "null",
        "{\"ask\":\"solve\"}",
        "{\"ask\":\"overview\",\"more\":1}",
        "\u{0}",
        "{\"ask\":\"site\",\"site\":\"x\"}",
    ] {
        assert!(open.desk.answer(text).starts_with("{\"fault\""), "{text}");
    }
    let mut hostile = coil_si();
    let nasty =
        [" ", "NaN", "inf", "1e999", "--5", "1..2", "1,2,3", "💧", "9".repeat(5000).as_str()]
            .map(str::to_owned);
    for text in nasty {
        hostile.readings.get_mut("entering.dry_bulb").unwrap().text = text;
        let solved = open.solve("air_heat", hostile.clone());
        assert!(solved.headline.value.is_none());
    }
    hostile.choices.insert("streams".to_owned(), "99999".to_owned());
    let _ = open.solve("mixing", hostile);
}

#[test]
fn the_schema_in_the_documentation_is_current() {
    let kept = include_str!("../../../docs/desk.schema.json");
    assert!(
        kept == dewledger_desk::schema(),
        "run: cargo run -p dewledger-desk --example schema > docs/desk.schema.json"
    );
}
