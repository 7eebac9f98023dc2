//! Instruments, places, takes, requirements and probes side by side, as a screen meets them.

#![expect(
    clippy::unwrap_used,
    clippy::wildcard_enum_match_arm,
    reason = "what fails here, or comes back as another reply, fails the test"
)]

use dewledger_desk::{
    Clock, Desk, Fault, FieldView, InstrumentForm, Place, ReadWith, ReadingView, Reply, Request,
    Solved, Typed, TypedBand, TypedInstrument, TypedProbe, TypedReading, TypedRequirement,
    TypedRun, TypedRunRow, TypedSpot, TypedTake, TypedValue,
};
use jiff::civil::date;
use jiff::tz::TimeZone;

struct Open {
    desk: Desk,
    _folder: tempfile::TempDir,
}

impl Open {
    fn new() -> Self {
        let folder = tempfile::tempdir().unwrap();
        let clock = Clock::new(|| {
            date(2026, 7, 14).at(14, 20, 0, 0).to_zoned_datetime(TimeZone::UTC).unwrap()
        });
        let desk = Desk::open(&folder.path().join("ledger.dewledger"), clock).unwrap();
        Self { desk, _folder: folder }
    }

    fn ask(&self, request: Request) -> Reply {
        self.desk.handle(request).unwrap_or_else(|fault| panic!("{fault:?}"))
    }

    fn fault(&self, request: Request) -> Fault {
        self.desk.handle(request).unwrap_err()
    }

    fn solve(&self, check: &str, typed: &Typed, place: &Place) -> Solved {
        let (check, typed, place) = (check.to_owned(), typed.clone(), place.clone());
        match self.ask(Request::Solve { check, typed, place }) {
            Reply::Solved(solved) => *solved,
            other => panic!("{other:?}"),
        }
    }

    fn draw(&self, check: &str, typed: &Typed) -> Solved {
        let (check, typed) = (check.to_owned(), typed.clone());
        match self.ask(Request::Draw { check, typed, place: Place::default() }) {
            Reply::Solved(solved) => *solved,
            other => panic!("{other:?}"),
        }
    }

    fn form(&self, class: &str) -> InstrumentForm {
        let request = Request::InstrumentForm {
            instrument: None,
            class: Some(class.to_owned()),
            typed: None,
        };
        match self.ask(request) {
            Reply::InstrumentForm(form) => *form,
            other => panic!("{other:?}"),
        }
    }

    /// Adds an instrument of a class; its probes are `{id}/1`, `{id}/2`.
    fn add(&self, typed: TypedInstrument) -> String {
        match self.ask(Request::SaveInstrument { instrument: None, typed }) {
            Reply::InstrumentSaved { instrument, .. } => instrument,
            other => panic!("{other:?}"),
        }
    }

    fn psychrometer(&self) -> String {
        self.add(self.form("aspirated_psychrometer").typed)
    }

    fn visit(&self) -> Place {
        let elevation = TypedValue { text: "0".to_owned(), unit: Some("m".to_owned()) };
        let name = "Invented hall".to_owned();
        let request = Request::SaveSite { site: None, name, elevation, note: String::new() };
        let site = match self.ask(request) {
            Reply::Site(site) => site.site,
            other => panic!("{other:?}"),
        };
        let request = Request::SaveVisit {
            visit: None,
            site,
            people: String::new(),
            running: String::new(),
            typed: Typed::default(),
        };
        match self.ask(request) {
            Reply::Visit(visit) => visit.place,
            other => panic!("{other:?}"),
        }
    }
}

fn reading(text: &str, unit: &str) -> TypedReading {
    TypedReading { text: text.to_owned(), unit: Some(unit.to_owned()), ..TypedReading::default() }
}

fn value(text: &str, unit: &str) -> TypedValue {
    TypedValue { text: text.to_owned(), unit: Some(unit.to_owned()) }
}

/// A cooling coil at sea level, read with one psychrometer; the flow carries a ± of its own.
fn coil(psychrometer: &str) -> Typed {
    let mut typed = Typed::default();
    for (key, choice) in
        [("pressure.by", "read"), ("flow.basis", "actual_leaving"), ("water.state", "condensate")]
    {
        typed.choices.insert(key.to_owned(), choice.to_owned());
    }
    let mut put = |key: &str, one: TypedReading| typed.readings.insert(key.to_owned(), one);
    put("pressure.read", reading("101.325", "kPa"));
    put(
        "flow.rate",
        TypedReading { plus_minus: Some(value("5 %", "L/s")), ..reading("2000", "L/s") },
    );
    for (key, text, probe) in [
        ("entering.dry_bulb", "26.7", 1),
        ("entering.wet_bulb", "19.4", 2),
        ("leaving.dry_bulb", "12.8", 1),
        ("leaving.wet_bulb", "12.2", 2),
    ] {
        let probe = Some(format!("{psychrometer}/{probe}"));
        put(key, TypedReading { probe, ..reading(text, "degC") });
    }
    typed
}

fn field(solved: &Solved, key: &str) -> ReadingView {
    let fields = solved.sections.iter().flat_map(|section| &section.fields);
    let mut found = fields.filter_map(|field| match field {
        FieldView::Reading(reading) if reading.key == key => Some((**reading).clone()),
        _ => None,
    });
    found.next().unwrap_or_else(|| panic!("no field {key}"))
}

fn with(solved: &Solved, key: &str) -> ReadWith {
    *field(solved, key).with.unwrap()
}

fn width(solved: &Solved, key: &str) -> f64 {
    let rows = solved.groups.iter().flat_map(|group| &group.rows);
    let row = rows.clone().find(|row| row.key == key).unwrap_or_else(|| panic!("no {key}"));
    row.plus_minus.as_ref().unwrap().si.unwrap()
}

#[test]
fn every_class_is_a_whole_instrument() {
    let open = Open::new();
    let Reply::Instruments(register) = open.ask(Request::Instruments {}) else { unreachable!() };
    assert!(register.instruments.is_empty() && register.classes.len() >= 12);
    for class in register.classes {
        let form = open.form(&class.value);
        assert_eq!(form.errors, [], "{}", class.value);
        for probe in &form.probes {
            assert!(probe.comes_to.as_ref().unwrap().contains("(95 %)"), "{}", class.value);
        }
        open.add(form.typed);
    }
    let Reply::Instruments(register) = open.ask(Request::Instruments {}) else { unreachable!() };
    assert_eq!(register.instruments.len(), 13);
}

#[test]
fn an_impossible_statement_is_refused_at_its_field() {
    let open = Open::new();
    let probe = TypedProbe {
        quantity: "temperature".to_owned(),
        unit: "degC".to_owned(),
        bands: vec![TypedBand { of_range: "0.4".to_owned(), ..TypedBand::default() }],
        ..TypedProbe::default()
    };
    let typed = TypedInstrument {
        name: "Invented thermometer".to_owned(),
        probes: vec![probe],
        ..TypedInstrument::default()
    };
    let fault = open.fault(Request::SaveInstrument { instrument: None, typed: typed.clone() });
    assert_eq!(fault.field.as_deref(), Some("probes.0.range"));
    assert_eq!(fault.message, "It gives a share of the range: give the range too.");
    let nameless = TypedInstrument { name: " ".to_owned(), ..typed };
    let fault = open.fault(Request::SaveInstrument { instrument: None, typed: nameless });
    assert_eq!(fault.message, "An instrument needs a name, as the team calls it.");
}

/// Each is wrong in one band or one number beside them; that field is marked, and no other.
#[test]
fn what_is_wrong_with_a_statement_stands_at_its_field() {
    let open = Open::new();
    let band = |absolute: &str, up_to: &str| TypedBand {
        absolute: absolute.to_owned(),
        up_to: up_to.to_owned(),
        ..TypedBand::default()
    };
    let probe = |bands: Vec<TypedBand>| TypedProbe {
        quantity: "air_flow".to_owned(),
        unit: "L/s".to_owned(),
        bands,
        ..TypedProbe::default()
    };
    let large = TypedBand { of_reading: "60".to_owned(), ..band("", "") };
    let cases = [
        (probe(vec![band("3", "50"), band("", "")]), "bands.1.absolute"),
        (probe(vec![band("3", "50"), band("-1", "")]), "bands.1.absolute"),
        (probe(vec![band("3", "50"), large]), "bands.1.of_reading"),
        (probe(vec![band("3", ""), band("4", "")]), "bands.0.up_to"),
        (probe(vec![band("3", "50"), band("4", "20"), band("5", "")]), "bands.0.up_to"),
        (probe(vec![band("3", "50")]), "bands.0.up_to"),
        (TypedProbe { resolution: "-1".to_owned(), ..probe(vec![band("3", "")]) }, "resolution"),
    ];
    for (probe, field) in cases {
        let typed = TypedInstrument { probes: vec![probe], ..TypedInstrument::default() };
        let request =
            Request::InstrumentForm { instrument: None, class: None, typed: Some(typed.clone()) };
        let Reply::InstrumentForm(form) = open.ask(request) else { unreachable!() };
        let fields: Vec<&str> = form.errors.iter().map(|error| error.field.as_str()).collect();
        assert_eq!(fields, [format!("probes.0.{field}")], "{typed:?}");
    }
}

/// The worked coil of the uncertainty tests, at 95 %: total ± 2807 W, moisture ± 0.000602 kg/s with the pressure's own
/// doubt, which differs here (a barometer's 0.1 %): within 1 %.
#[test]
fn readings_of_one_probe_share_its_calibration() {
    let open = Open::new();
    let typed = coil(&open.psychrometer());
    let solved = open.solve("air_heat", &typed, &Place::default());
    assert!((width(&solved, "total") / 2807.3 - 1.0).abs() < 0.01, "{}", width(&solved, "total"));
    assert!((width(&solved, "moisture") / 0.000_602 - 1.0).abs() < 0.01);
    let sources: Vec<&str> = solved.drivers.rows.iter().map(|row| row.label.as_str()).collect();
    assert!(sources.contains(&"Aspirated psychrometer, wet bulb: calibration"), "{sources:?}");
    assert!(sources.contains(&"Entering air, wet bulb: the reading itself"), "{sources:?}");
    let parts = with(&solved, "entering.wet_bulb").parts;
    assert_eq!(parts[0].label, "Calibration, shared with other readings of this probe");
    assert_eq!(parts[0].text, "± 0.20\u{a0}K");
}

#[test]
fn the_probe_used_last_is_taken_up() {
    let open = Open::new();
    let place = open.visit();
    let psychrometer = open.psychrometer();
    let typed = coil(&psychrometer);
    // Within a form the like reading follows.
    let mut half = typed.clone();
    half.readings.get_mut("leaving.wet_bulb").unwrap().probe = None;
    let solved = open.solve("air_heat", &half, &place);
    assert_eq!(with(&solved, "leaving.wet_bulb").probe, Some(format!("{psychrometer}/2")));
    // And so does the next form, once one was filed.
    open.ask(Request::File {
        draft: None,
        check: "air_heat".to_owned(),
        typed: typed.clone(),
        place: place.clone(),
        corrects: None,
    });
    let mut next = Typed::default();
    next.readings.insert("air.wet_bulb".to_owned(), reading("15", "degC"));
    let solved = open.solve("air_state", &next, &place);
    let shown = with(&solved, "air.wet_bulb");
    assert_eq!(shown.label, "Aspirated psychrometer, wet bulb");
    assert_eq!(field(&solved, "air.wet_bulb").plus_minus, "± 0.23\u{a0}K");
    // None is a choice too.
    next.readings.get_mut("air.wet_bulb").unwrap().probe = Some(String::new());
    let solved = open.solve("air_state", &next, &place);
    assert_eq!(with(&solved, "air.wet_bulb").probe, None);
    assert_eq!(field(&solved, "air.wet_bulb").plus_minus, "± not\u{a0}known");
}

fn take(text: &str, second: u32) -> TypedTake {
    TypedTake {
        text: text.to_owned(),
        at: format!("2026-07-14T14:{:02}:{:02}Z", 10 + second / 60, second % 60),
    }
}

#[test]
fn takes_make_a_mean_and_say_whether_it_stood_still() {
    let open = Open::new();
    let mut typed = coil(&open.psychrometer());
    let leaving = typed.readings.get_mut("leaving.dry_bulb").unwrap();
    leaving.takes = vec![take("13.2", 0), take("13.1", 20), take("13.3", 40), take("13.2", 60)];
    let solved = open.solve("air_heat", &typed, &Place::default());
    let shown = with(&solved, "leaving.dry_bulb").takes;
    assert_eq!(shown.rows[3].at, "14:11:00");
    assert_eq!(shown.word.as_deref(), Some("Steady"));
    assert_eq!(
        shown.says.as_deref(),
        Some("4 takes in 60 s: mean 13.2\u{a0}°C, scatter 0.082\u{a0}K")
    );
    let scatter = with(&solved, "leaving.dry_bulb").parts;
    assert_eq!(scatter.last().unwrap().label, "Scatter of the takes");
    // Drifting: said at the reading and in every result.
    let leaving = typed.readings.get_mut("leaving.dry_bulb").unwrap();
    leaving.takes = vec![take("13.0", 0), take("13.3", 20), take("13.6", 40), take("13.9", 60)];
    let solved = open.solve("air_heat", &typed, &Place::default());
    assert_eq!(with(&solved, "leaving.dry_bulb").takes.word.as_deref(), Some("Drifting"));
    let note = solved.notes.iter().find(|note| note.code == "leaving.dry_bulb.unsteady").unwrap();
    assert!(note.lead.starts_with("Leaving air, dry bulb is drifting: 0.9"), "{}", note.lead);
}

#[test]
fn a_reading_is_brought_to_the_time_of_another() {
    let open = Open::new();
    let mut typed = coil(&open.psychrometer());
    let entering = typed.readings.get_mut("entering.dry_bulb").unwrap();
    entering.takes = vec![take("26.0", 0), take("26.6", 120)];
    entering.at_time_of = Some("leaving.dry_bulb".to_owned());
    typed.readings.get_mut("leaving.dry_bulb").unwrap().takes = vec![take("12.8", 40)];
    let solved = open.solve("air_heat", &typed, &Place::default());
    let says = with(&solved, "entering.dry_bulb").takes.says.unwrap();
    assert!(says.contains("at the other’s time 26.2"), "{says}");
    typed.readings.get_mut("leaving.dry_bulb").unwrap().takes = vec![take("12.8", 200)];
    let solved = open.solve("air_heat", &typed, &Place::default());
    let error = field(&solved, "entering.dry_bulb").error.unwrap();
    assert_eq!(
        error.says,
        "Take this one before and after the other: there is no take on one side of its time."
    );
}

#[test]
fn the_place_has_a_part_of_its_own() {
    let open = Open::new();
    let mut typed = coil(&open.psychrometer());
    let before = width(&open.solve("air_heat", &typed, &Place::default()), "total");
    let wet_bulb = typed.readings.get_mut("entering.wet_bulb").unwrap();
    wet_bulb.spot = Some(TypedSpot {
        held: "grid".to_owned(),
        points: "9".to_owned(),
        spread: value("0.6", "K"),
        plus_minus: TypedValue::default(),
    });
    let solved = open.solve("air_heat", &typed, &Place::default());
    let parts = with(&solved, "entering.wet_bulb").parts;
    // 0.6/√9 times t for 8 degrees of freedom, 2.31 (JCGM 100:2008 table G.2).
    let place = parts.iter().find(|part| part.label == "Where it was held").unwrap();
    assert_eq!(place.text, "± 0.46\u{a0}K");
    assert!(width(&solved, "total") > before);
    let wet_bulb = typed.readings.get_mut("entering.wet_bulb").unwrap();
    wet_bulb.spot.as_mut().unwrap().points = "1".to_owned();
    let solved = open.solve("air_heat", &typed, &Place::default());
    let error = field(&solved, "entering.wet_bulb").error.unwrap();
    assert_eq!(error.says, "Say how many points the grid has: two or more.");
}

fn asked(direction: &str, kw: &str) -> TypedRequirement {
    TypedRequirement {
        figure: "total".to_owned(),
        direction: direction.to_owned(),
        value: value(kw, "kW"),
        source: "the invented schedule".to_owned(),
        ..TypedRequirement::default()
    }
}

#[test]
fn a_requirement_gets_one_of_three_answers() {
    let open = Open::new();
    let mut typed = coil(&open.psychrometer());
    typed.requirements = vec![
        asked("at_least", "44"),
        asked("at_least", "48"),
        asked("at_least", "54"),
        asked("at_most", "44"),
    ];
    let solved = open.solve("air_heat", &typed, &Place::default());
    let words: Vec<&str> =
        solved.requirements.verdicts.iter().map(|v| v.word.as_deref().unwrap()).collect();
    assert_eq!(words, ["Meets", "Cannot be told with these readings", "Falls short", "Goes over"]);
    let untold = &solved.requirements.verdicts[1];
    assert_eq!(
        untold.asked,
        "Heat removed, total: at least 48.0\u{a0}kW, by the invented schedule"
    );
    assert_eq!(
        untold.says.as_deref().unwrap(),
        "Read 50.2\u{a0}kW, 2.24\u{a0}kW above the limit; 2.36\u{a0}kW would be needed to say so."
    );
    assert!(
        untold.decides[0].starts_with("This would decide it: Air flow"),
        "{:?}",
        untold.decides
    );
    assert!(untold.share.as_ref().unwrap().starts_with("No share of 48.0\u{a0}kW is given"));
    // 44 kW lies 4.3 standard uncertainties below the 50.2 kW read.
    let certain = solved.requirements.verdicts[0].chance.as_deref();
    assert_eq!(certain, Some("more than 99.9\u{a0}% likely to be met"));
    let hopeless = solved.requirements.verdicts[3].chance.as_deref();
    assert_eq!(hopeless, Some("less than 0.1\u{a0}% likely to be met"));
}

#[test]
fn a_share_is_given_like_for_like_only() {
    let open = Open::new();
    let mut typed = coil(&open.psychrometer());
    let mut rated = asked("at_least", "44");
    rated.conditions.insert("entering.dry_bulb".to_owned(), value("26.7", "degC"));
    rated.conditions.insert("entering.wet_bulb".to_owned(), value("19.4", "degC"));
    typed.requirements = vec![rated.clone()];
    let solved = open.solve("air_heat", &typed, &Place::default());
    let share = solved.requirements.verdicts[0].share.clone().unwrap();
    assert!(share.starts_with("114"), "{share}");
    rated.conditions.insert("entering.wet_bulb".to_owned(), value("16.1", "degC"));
    typed.requirements = vec![rated];
    let solved = open.solve("air_heat", &typed, &Place::default());
    let verdict = &solved.requirements.verdicts[0];
    assert_eq!(verdict.answer, None);
    assert_eq!(
        verdict.why_not.as_ref().unwrap().says,
        "The requirement holds at entering air, wet bulb 16.1\u{a0}°C; these readings were taken at 19.4\u{a0}°C."
    );
}

#[test]
fn a_requirement_without_a_known_doubt_has_no_answer() {
    let open = Open::new();
    let mut typed = coil(&open.psychrometer());
    typed.readings.get_mut("flow.rate").unwrap().plus_minus = None;
    typed.requirements = vec![
        asked("at_least", "44"),
        TypedRequirement { value: value("x", "kW"), ..asked("at_least", "44") },
    ];
    let solved = open.solve("air_heat", &typed, &Place::default());
    let [first, second] = solved.requirements.verdicts.as_slice() else { unreachable!() };
    let why = &first.why_not.as_ref().unwrap().says;
    assert!(why.starts_with("Its ± is not known: say what was used for Air flow"), "{why}");
    assert_eq!(second.errors[0].field, "value");
}

#[test]
fn a_lopsided_result_waits_for_draws_and_is_filed_with_them() {
    let open = Open::new();
    let place = open.visit();
    let mut typed = Typed::default();
    typed.choices.insert("pressure.by".to_owned(), "read".to_owned());
    typed.readings.insert("pressure.read".to_owned(), reading("101.325", "kPa"));
    // Wet bulb as high as dry bulb: saturated here, and on both sides.
    let near =
        |text: &str| TypedReading { plus_minus: Some(value("0.6", "K")), ..reading(text, "degC") };
    typed.readings.insert("air.dry_bulb".to_owned(), near("13.0"));
    typed.readings.insert("air.wet_bulb".to_owned(), near("13.5"));
    let solved = open.solve("air_state", &typed, &Place::default());
    assert!(solved.wants_draws);
    let drawn = open.draw("air_state", &typed);
    assert!(!drawn.wants_draws);
    let rows: Vec<_> = drawn.groups.iter().flat_map(|group| &group.rows).collect();
    let rh = rows.iter().find(|row| row.key == "relative_humidity").unwrap();
    let interval = rh.plus_minus.as_ref().unwrap().interval.clone().unwrap();
    assert!(interval.ends_with("lopsided"), "{interval}");
    let filed = open.ask(Request::File {
        draft: None,
        check: "air_state".to_owned(),
        typed,
        place,
        corrects: None,
    });
    let Reply::Filed(filed) = filed else { unreachable!() };
    let Reply::Entry(entry) = open.ask(Request::Entry { entry: filed.entry }) else {
        unreachable!()
    };
    let rows: Vec<_> = entry.solved.groups.iter().flat_map(|group| &group.rows).collect();
    let rh = rows.iter().find(|row| row.key == "relative_humidity").unwrap();
    assert_eq!(rh.plus_minus.as_ref().unwrap().interval.as_ref(), Some(&interval));
}

#[test]
fn probes_side_by_side_are_held_against_each_other() {
    let open = Open::new();
    let place = open.visit();
    let one = open.psychrometer();
    let other = open.psychrometer();
    let run = |apply: bool| TypedRun {
        quantity: "temperature".to_owned(),
        when: "start".to_owned(),
        against: Some(format!("{one}/1")),
        apply,
        rows: vec![
            TypedRunRow { probe: format!("{one}/1"), value: value("21.0", "degC") },
            TypedRunRow { probe: format!("{other}/1"), value: value("21.3", "degC") },
        ],
    };
    let visit = place.visit.clone().unwrap();
    let form =
        open.ask(Request::RunForm { visit: visit.clone(), index: None, typed: Some(run(false)) });
    let Reply::Run(form) = form else { unreachable!() };
    let row = |probe: &str| form.rows.iter().find(|row| row.probe == probe).unwrap().clone();
    assert_eq!(row(&format!("{one}/1")).offset.unwrap(), "the others are held against it");
    assert_eq!(row(&format!("{other}/1")).offset.unwrap(), "0.30\u{a0}K above");
    assert!(!row(&format!("{other}/1")).too_far);
    let save = |index, typed| {
        let request = Request::SaveRun { visit: visit.clone(), index, typed };
        let Reply::Visit(view) = open.ask(request) else { unreachable!() };
        view.runs
    };
    let runs = save(None, run(false));
    assert_eq!(runs[0].help.as_deref(), Some("2 probes; recorded, not applied"));
    // Entering by one thermometer, leaving by the other.
    let mut typed = coil(&one);
    typed.readings.get_mut("leaving.dry_bulb").unwrap().probe = Some(format!("{other}/1"));
    let before = open.solve("air_heat", &typed, &place);
    assert_eq!(with(&before, "leaving.dry_bulb").corrected, None);
    save(Some(0), run(true));
    let after = open.solve("air_heat", &typed, &place);
    let corrected = with(&after, "leaving.dry_bulb").corrected.unwrap();
    assert_eq!(corrected, "12.8\u{a0}°C as read; what the side-by-side run found is taken off");
    let difference = |solved: &Solved| {
        let rows = solved.groups.iter().flat_map(|group| &group.rows);
        rows.clone().find(|row| row.key == "delta_t").unwrap().value.as_ref().unwrap().si
    };
    assert!((difference(&after) - difference(&before) + 0.3).abs() < 1e-9);
    // Calibrations that were apart before are one now: the difference is surer.
    assert!(width(&after, "delta_t") < width(&before, "delta_t"));
    let alone = TypedRun { rows: run(true).rows[..1].to_vec(), ..run(true) };
    let fault = open.fault(Request::SaveRun { visit: visit.clone(), index: None, typed: alone });
    assert!(fault.message.starts_with("A run needs two probes or more"), "{}", fault.message);
}

#[test]
fn an_instrument_that_reads_something_else_is_caught() {
    let open = Open::new();
    let mut psychrometer = open.form("aspirated_psychrometer").typed;
    psychrometer.probes[1].reads.insert("wet_bulb".to_owned(), "sea_level".to_owned());
    psychrometer.probes[0].due = "2026-03-01".to_owned();
    let psychrometer = open.add(psychrometer);
    let mut hood = open.form("flow_hood").typed;
    hood.probes[0].reads.insert("flow".to_owned(), "standard".to_owned());
    let hood = open.add(hood);
    let mut typed = coil(&psychrometer);
    typed.readings.insert("pressure.read".to_owned(), reading("83.43", "kPa"));
    typed.readings.insert(
        "flow.rate".to_owned(),
        TypedReading { probe: Some(format!("{hood}/1")), ..reading("2000", "L/s") },
    );
    // A visit at 1 609 m whose instrument worked wet bulbs out for sea level: 63.1 °F shown for 62.0.
    typed.readings.insert(
        "entering.dry_bulb".to_owned(),
        TypedReading { probe: Some(format!("{psychrometer}/1")), ..reading("80", "degF") },
    );
    typed.readings.insert(
        "entering.wet_bulb".to_owned(),
        TypedReading { probe: Some(format!("{psychrometer}/2")), ..reading("63.1", "degF") },
    );
    let solved = open.solve("air_heat", &typed, &Place::default());
    let note = |code: &str| solved.notes.iter().find(|note| note.code == code).unwrap();
    let sea_level = note("entering.wet_bulb.sea_level");
    assert!(sea_level.lead.contains("17.3\u{a0}°C shown is 16.7"), "{}", sea_level.lead);
    assert!(note("entering.dry_bulb.overdue").lead.ends_with("was due on 1 March 2026."));
    let basis = note("flow.rate.basis");
    assert_eq!(basis.acts[0].label, "It is standard flow");
}

#[test]
fn an_entry_keeps_the_accuracy_of_its_day() {
    let open = Open::new();
    let place = open.visit();
    let psychrometer = open.psychrometer();
    let typed = coil(&psychrometer);
    let before = width(&open.solve("air_heat", &typed, &place), "total");
    let file =
        Request::File { draft: None, check: "air_heat".to_owned(), typed, place, corrects: None };
    let Reply::Filed(filed) = open.ask(file) else { unreachable!() };
    let mut worse = open.form("sling_psychrometer").typed;
    for (index, probe) in worse.probes.iter_mut().enumerate() {
        probe.id = Some((index + 1).to_string());
    }
    open.ask(Request::SaveInstrument { instrument: Some(psychrometer.clone()), typed: worse });
    open.ask(Request::WithdrawInstrument { instrument: psychrometer, withdrawn: true });
    let Reply::Entry(entry) = open.ask(Request::Entry { entry: filed.entry }) else {
        unreachable!()
    };
    assert!((width(&entry.solved, "total") - before).abs() < 1e-9);
    let row = entry.readings.iter().find(|row| row.label == "Entering air, wet bulb").unwrap();
    assert_eq!(row.with.as_deref(), Some("Aspirated psychrometer, wet bulb"));
    assert_eq!(row.plus_minus, "± 0.23\u{a0}K");
}
