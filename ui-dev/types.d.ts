// Made from docs/desk.schema.json by tools/types.mjs. Change the Rust types, not this file.
declare namespace Desk {
  /** About the app. */
  type About = {
    /** Where the ledger is. */
    ledger: string;
    /** Limits and cautions, one paragraph each. */
    says: Array<string>;
    /** The app's version. */
    version: string;
  };

  /** One tap that changes what is typed. */
  type Act = {
    /** Applied in order to what is typed. */
    changes: Array<Change>;
    /** "Swap the two". */
    label: string;
  };

  /** A requirement that was typed on an earlier entry of this equipment. */
  type BeforeView = {
    /** What it types. */
    requirement: TypedRequirement;
    /** "Total at least 48 kW (schedule M-601), asked on 3 November". */
    says: string;
  };

  /** A caution. */
  type CautionView = {
    /** The text. */
    says: string;
    /** "Rotating parts". */
    title: string;
  };

  /** What stands in a table. */
  type CellView = {
    /** It is a number: to the right. */
    number: boolean;
    /** The text, with its unit. */
    text: string;
  };

  /** A change of what is typed. */
  type Change = 
    | {
      change: "choose";
      /** Key of the choice. */
      key: string;
      /** Its value. */
      value: string;
    }
    | {
      change: "type";
      /** Key of the reading. */
      key: string;
      /** The text. */
      text: string;
      /** The unit. */
      unit: string;
    }
    | {
      change: "unit";
      /** Key of the reading. */
      key: string;
      /** The unit. */
      unit: string;
    }
    | {
      change: "swap";
      /** Key of one. */
      one: string;
      /** Key of the other. */
      other: string;
    }
    | {
      change: "move";
      /** From this key. */
      from: string;
      /** To this key. */
      to: string;
    }
    | {
      change: "clear";
      /** Key of the reading. */
      key: string;
    }
    | {
      change: "accept";
      /** Code of the note. */
      code: string;
    };

  /** A drag, a pinch, or a step of zoom. */
  type ChartGesture = {
    /** The point that stays where it is; none is the middle. */
    about?: ChartPoint | null;
    /** Drawn to the right by this, px. */
    dx_px?: number;
    /** Drawn down by this, px. */
    dy_px?: number;
    /** Made larger by this factor. */
    zoom: number;
  };

  /** How a chart is looked at. */
  type ChartLook = {
    /** Where the cross was. */
    cross?: ChartPlace | null;
    /** Family of lines beside relative humidity. */
    family?: string | null;
    /** What was done to a drawing of that window. */
    gesture?: ChartGesture | null;
    /** Its height. */
    height_px: number;
    /** Begins every identifier in the drawing, so that two charts on a page do not mix: letters and digits. */
    name: string;
    /** Where it is put on a drawing of that window. */
    tap?: ChartPoint | null;
    /** Size of the text. */
    text_px: number;
    /** Width of the paper in CSS pixels. */
    width_px: number;
    /** What was looked at; none frames the states. */
    window?: ChartWindow | null;
  };

  /** Whose chart it is. */
  type ChartOf = {
      /** Identifier of the check. */
      check: string;
      of: "form";
      /** Where the check is made. */
      place?: Place;
      /** What is typed. */
      typed: Typed;
    } | {
      /** The entry. */
      entry: string;
      of: "entry";
    };

  /** A place on the chart. */
  type ChartPlace = {
    /** Dry bulb, K. */
    dry_bulb_k: number;
    /** Humidity ratio, kg/kg. */
    humidity_ratio_kg_kg: number;
  };

  /** A point of the drawing. */
  type ChartPoint = {
    /** From the left, px. */
    x_px: number;
    /** From above, px. */
    y_px: number;
  };

  /** The psychrometric chart of a check. */
  type ChartView = {
    /** What is read at the cross. */
    cross?: CrossView | null;
    /** The chart. */
    drawing: ShapeView;
    /** Families of lines that can be drawn. */
    families: Array<OptionView>;
    /** The one that is drawn. */
    family: string;
    /** It is not the first look. */
    moved: boolean;
    /** What the outlines around the states mean, where there are any. */
    outlines?: string | null;
    /** The same in words. */
    says: string;
    /** The states as a table, with their ±. */
    table: TableView;
    /** What is looked at: send it back to look at the same. */
    window: ChartWindow;
  };

  /** What is looked at. */
  type ChartWindow = {
    /** Left edge, K. */
    coldest_k: number;
    /** Lower edge, kg/kg. */
    driest_kg_kg: number;
    /** Right edge, K. */
    warmest_k: number;
    /** Upper edge, kg/kg. */
    wettest_kg_kg: number;
  };

  /** A check in a list. */
  type CheckName = {
    /** Air, water or whole equipment. */
    group: string;
    /** Identifier, as `air_heat`. */
    id: string;
    /** Label, as "Heat moved by the air". */
    label: string;
    /** What a person wants to know. */
    question: string;
    /** What it takes, in a line: "two air states, a flow". */
    takes: string;
  };

  /** One of several to choose. */
  type ChoiceView = {
    /** What is wrong with it. */
    error?: Message | null;
    /** A line of help. */
    help?: string | null;
    /** Its key: `flow.basis`. */
    key: string;
    /** "Flow is". */
    label: string;
    /** In the order of the sheet. */
    options: Array<OptionView>;
    /** The value chosen or standing by default; none must be chosen. */
    value?: string | null;
  };

  /** A reading that the conditions of a rating can name. */
  type ConditionView = {
    /** Its key. */
    key: string;
    /** "Entering air, dry bulb". */
    label: string;
    /** The unit chosen for it. */
    unit: UnitView;
    /** All units of its quantity. */
    units: Array<UnitView>;
  };

  /** What is read at the cross of a chart. */
  type CrossView = {
    /** One tap each: put it into a part of the form. */
    acts: Array<Act>;
    /** Where it is drawn; none outside of what is looked at. */
    at?: ChartPoint | null;
    /** Why there is no air there. */
    fog?: string | null;
    /** Where it is: send it back to keep it there. */
    place: ChartPlace;
    /** The full state; the two coordinates alone where air cannot be. */
    rows: Array<ResultRow>;
  };

  /** One result over a range of another quantity. */
  type CurveView = {
    /** The line graph. */
    drawing: ShapeView;
    /** The same in words. */
    says: string;
    /** The same as a table. */
    table: TableView;
    /** What it shows. */
    title: string;
  };

  /** An unfinished form. */
  type DraftRow = {
    /** Its identity. */
    draft: string;
    /** The check's label. */
    label: string;
    /** Where and when: "AH-2, Haldry Fork School, 14:05". */
    says: string;
  };

  /** One source of doubt. */
  type DriverView = {
    /** "Entering wet bulb". */
    label: string;
    /** 0 to 1. */
    share: number;
    /** "46 %". */
    text: string;
  };

  /** What decides a ±. */
  type Drivers = {
    /** "share of the total's ±". */
    aside: string;
    /** By source, largest first; adds up to 1. */
    rows: Array<DriverView>;
    /** One sentence: what a better reading would buy, or why there is no ±. */
    says?: string | null;
  };

  /** An entry in a list. */
  type EntryRow = {
    /** The entry. */
    entry: string;
    /** Its headline: "Heat removed 41.3 kW ± 3.1". */
    figure: string;
    /** Invented example data. */
    invented: boolean;
    /** The check's label. */
    label: string;
    /** Where and when. */
    says: string;
    /** Withdrawn. */
    withdrawn: boolean;
  };

  /** A filed entry as it was filed. */
  type EntryView = {
    /** The entry. */
    entry: string;
    /** "Filed 14:20 by version 0.1.0". */
    filed: string;
    /** Invented example data. */
    invented: boolean;
    /** Where. */
    place: Place;
    /** What was typed, as typed. */
    readings: Array<ReadingRow>;
    /** Earlier and side-by-side revisions. */
    revisions: Array<RevisionRow>;
    /** "AH-2, Haldry Fork School, 14 July 2026". */
    says: string;
    /** What came out then, in today's units; its sections hold what was typed. */
    solved: Solved;
    /** Withdrawn. */
    withdrawn: boolean;
  };

  /** Equipment in a list. */
  type EquipmentRow = {
    /** The equipment. */
    equipment: string;
    /** What it is, when it was last read. */
    says: string;
    /** Its tag. */
    tag: string;
  };

  /** Equipment. */
  type EquipmentView = {
    /** What it is. */
    class: string;
    /** Its entries, newest first. */
    entries: Array<EntryRow>;
    /** Invented example data. */
    invented: boolean;
    /** Anything worth knowing. */
    note: string;
    /** Where it is. */
    place: Place;
    /** Its site's name. */
    site: string;
    /** Its tag. */
    tag: string;
  };

  /** Why there is no reply: branch on `code`, mark `field`, show `message`. */
  type Fault = {
    /** What it is, for programs. */
    code: FaultCode;
    /** The key of the field it concerns. */
    field?: string | null;
    /** What to show a person. */
    message: string;
  };

  /** The faults that a screen or a script tells apart. */
  type FaultCode = 
    | "bad_request"
    | "not_found"
    | "field"
    | "not_solved"
    | "ledger_refused"
    | "not_stored";

  /** Something wrong with a field that is no reading. */
  type FieldError = {
    /** Its place. */
    field: string;
    /** What is wrong and what mends it. */
    says: string;
  };

  /** A field of a form. */
  type FieldView = ReadingView & {
      field: "reading";
    } | ChoiceView & {
      field: "choice";
    };

  /** A check filed. */
  type Filed = {
    /** The entry. */
    entry: string;
    /** Where it stands: "AH-2, Haldry Fork School". */
    place: string;
    /** "Filed 14:20". */
    says: string;
  };

  /** A form with its texts, ready to type in. */
  type FormOpened = {
    /** The entry that it corrects. */
    corrects?: string | null;
    /** The draft behind it, when one is kept. */
    draft?: string | null;
    /** Where it is made. */
    place: Place;
    /** The form worked out. */
    solved: Solved;
    /** What is typed. */
    typed: Typed;
  };

  /** The one figure that counts. */
  type Headline = {
    /** A second figure in small: "11.7 refrigeration tons". */
    also?: string | null;
    /** Key of the figure; empty while there is none. */
    key: string;
    /** The small line under the bar: sensible, latent, SHR. */
    minor: Array<MinorView>;
    /** Its ±. */
    plus_minus?: PlusMinusView | null;
    /** "Heat removed, total". */
    says: string;
    /** Sensible and latent as parts of a bar, when they have one sign. */
    split: Array<SplitView>;
    /** The figure; none is drawn as a dash. */
    value?: ValueView | null;
    /** Why it is withheld or waits. */
    why_not?: string | null;
  };

  /** The site and visit that a person is probably at. */
  type Here = {
    /** Invented example data. */
    invented: boolean;
    /** Where. */
    place: Place;
    /** One line: visit, pressure. */
    says: string;
    /** The site's name. */
    site: string;
  };

  /** An instrument as a form, with what its statement comes to. */
  type InstrumentForm = {
    /** What the width of a statement can mean. */
    coverages: Array<OptionView>;
    /** What is wrong, with the place: `name`, `probes.0.bands.1.absolute`. */
    errors: Array<FieldError>;
    /** The instrument; none for a new one. */
    instrument?: string | null;
    /** One for each probe. */
    probes: Array<ProbeForm>;
    /** The quantities that a probe can read. */
    quantities: Array<OptionView>;
    /** As it stands. */
    typed: TypedInstrument;
    /** Taken out of use. */
    withdrawn: boolean;
  };

  /** One instrument in a list. */
  type InstrumentRow = {
    /** "calibration due 3 March", "overdue since …"; none when no date is known. */
    due?: string | null;
    /** Its identity. */
    instrument: string;
    /** Invented example data. */
    invented: boolean;
    /** Its name. */
    name: string;
    /** A calibration is overdue. */
    overdue: boolean;
    /** Serial and probes, in a line. */
    says: string;
    /** Taken out of use. */
    withdrawn: boolean;
  };

  /** The register. */
  type InstrumentsView = {
    /** Starting entries by class, their figures common practice: the instrument's own paper overrides them. */
    classes: Array<OptionView>;
    /** By name. */
    instruments: Array<InstrumentRow>;
    /** A sentence above the classes. */
    says: string;
  };

  /** Letter and shape of a place, the same on chart, form and report. */
  type MarkView = {
    /** One capital letter. */
    letter: string;
    /** `circle`, `square`, `triangle`, `hanging_triangle`, `diamond`. */
    shape: string;
  };

  /** A sentence with what could be done about it. */
  type Message = {
    /** One tap each. */
    acts: Array<Act>;
    /** What is wrong and what mends it. */
    says: string;
  };

  /** A small figure under the headline. */
  type MinorView = {
    /** "sensible". */
    label: string;
    /** Its value, or a dash. */
    text: string;
  };

  /** A note. */
  type NoteView = {
    /** The person has said that it is right. */
    accepted: boolean;
    /** At most three acts. */
    acts: Array<Act>;
    /** What it is, for `accept` and for programs. */
    code: string;
    /** The field it stands on. */
    field?: string | null;
    /** The lead sentence. */
    lead: string;
    /** The reason. */
    reason?: string | null;
    /** Its weight. */
    tone: Tone;
  };

  /** One option. */
  type OptionView = {
    /** A line of help. */
    help?: string | null;
    /** Label. */
    label: string;
    /** Identifier. */
    value: string;
  };

  /** The first screen. */
  type Overview = {
    /** Unfinished forms, newest first. */
    drafts: Array<DraftRow>;
    /** Nothing is in the ledger yet: offer the demo site. */
    empty: boolean;
    /** Newest entries. */
    entries: Array<EntryRow>;
    /** The site visited last, with its open visit: where a check started now would belong. */
    here?: Here | null;
    /** What happened when the ledger was opened, when a person should know: set aside as damaged, migrated. */
    ledger_note?: string | null;
    /** Sites by last visit. */
    sites: Array<SiteRow>;
  };

  /** One part of a reading's ±. */
  type PartView = {
    /** "Calibration, shared with other readings of this probe". */
    label: string;
    /** "± 0.18 K". */
    text: string;
  };

  /** Where a check is made. */
  type Place = {
    /** The equipment at that site. */
    equipment?: string | null;
    /** The site. */
    site?: string | null;
    /** The visit. */
    visit?: string | null;
  };

  /** A ± as shown. */
  type PlusMinusView = {
    /** "31.2 to 47.9, lopsided": stands instead of a ± that would mislead. */
    interval?: string | null;
    /** The readings whose ± is missing. */
    missing?: string | null;
    /** Draws are wanted before it can be said: ask `draw`. */
    pending: boolean;
    /** The 95 % half-width in SI; none when not known, and where an interval stands instead. */
    si?: number | null;
    /** "± 3.1" in the unit of its value, or "± not known". */
    text: string;
  };

  /** A set of units chosen at once. */
  type Preset = "ip" | "si";

  /** What surrounds one probe's fields. */
  type ProbeForm = {
    /** "± 0.2 °C at 20 °C (95 %), of which ± 0.18 °C is calibration". */
    comes_to?: string | null;
    /** Ways of reading that matter for its quantity: key, label, options. */
    reads: Array<ChoiceView>;
    /** What the ± of its statement is typed in: "°C". */
    unit: string;
    /** Units of its quantity. */
    units: Array<UnitView>;
  };

  /** Beside a reading: what it was read with, where, and how often. */
  type ReadWith = {
    /** "13.4 °C as read, 13.2 °C after the side-by-side run". */
    corrected?: string | null;
    /** Ways of holding it. */
    held: Array<OptionView>;
    /** Its name, or "no instrument named". */
    label: string;
    /** What the ± is made of, with half-widths: calibration, the reading itself, its place, scatter. */
    parts: Array<PartView>;
    /** The probe in use, as `instrument/probe`; none where no instrument is named. */
    probe?: string | null;
    /** Probes that can read it; the first option, with an empty value, is none. */
    probes: Array<OptionView>;
    /** How it was held, as typed. */
    spot: TypedSpot;
    /** The unit of a spread or a ± of the place. */
    spread_unit: UnitView;
    /** Takes. */
    takes: TakesView;
    /** Usual figures for the place, common practice: one tap each, never applied unasked. */
    usual: Array<UsualSpot>;
  };

  /** A reading of a filed entry. */
  type ReadingRow = {
    /** Section and label: "Entering air, dry bulb". */
    label: string;
    /** Its ±. */
    plus_minus: string;
    /** As typed, with its unit. */
    text: string;
    /** Instrument, place and takes, in a line. */
    with?: string | null;
  };

  /** A number to type. */
  type ReadingView = {
    /** What is used when it stays blank, a constant of the method: "14.0 °C, assumed". */
    assumed?: string | null;
    /** What is wrong with it, when it is wrong by itself or refused by the check. */
    error?: Message | null;
    /** A line of help under the label. */
    help?: string | null;
    /** Its key: `entering.dry_bulb`. */
    key: string;
    /** "Dry bulb". */
    label: string;
    /** For screen readers: "Entering air, dry bulb, in degrees Celsius". */
    name: string;
    /** When the property itself can be chosen: the choice drawn in place of the label. */
    pick?: ChoiceView | null;
    /** Its ±: "± 0.3 K" or "± not known". */
    plus_minus: string;
    /** The ± as typed. */
    plus_minus_text: string;
    /** The unit of the ± as typed. */
    plus_minus_unit: UnitView;
    /** The units that a ± can be typed in. */
    plus_minus_units: Array<UnitView>;
    /** "read as 17.1", when a comma was typed or a unit was typed with the number. */
    read_as?: string | null;
    /** Must be read for the headline. */
    required: boolean;
    /** Can go below zero: draw the sign key. */
    signed: boolean;
    /** The text as typed. */
    text: string;
    /** The unit it is typed in. */
    unit: UnitView;
    /** All units of its quantity. */
    units: Array<UnitView>;
    /** An unusual note stands on it. */
    unusual: boolean;
    /** Last visit's reading at the same place, for a pull button. */
    was?: WasView | null;
    /** What it was read with, where, and how often; none for definitions and settings. */
    with?: ReadWith | null;
  };

  /** One reply. Its kind is the member `reply`. */
  type Reply = 
    | Overview & {
      reply: "overview";
    }
    | {
      /** In the order of the screen. */
      checks: Array<CheckName>;
      reply: "checks";
    }
    | Solved & {
      reply: "solved";
    }
    | ChartView & {
      reply: "chart";
    }
    | FormOpened & {
      reply: "form";
    }
    | {
      /** When, as `14:07`. */
      at: string;
      /** The draft's identity from now on. */
      draft: string;
      reply: "draft_kept";
    }
    | {
      reply: "done";
      /** What happened, in words. */
      says: string;
    }
    | Filed & {
      reply: "filed";
    }
    | {
      reply: "sites";
      /** By name. */
      sites: Array<SiteRow>;
    }
    | SiteView & {
      reply: "site";
    }
    | EquipmentView & {
      reply: "equipment";
    }
    | VisitView & {
      reply: "visit";
    }
    | VisitFormView & {
      reply: "visit_form";
    }
    | EntryView & {
      reply: "entry";
    }
    | UnitsView & {
      reply: "units";
    }
    | {
      reply: "appearance";
      /** The theme in use. */
      theme: Theme;
    }
    | {
      reply: "overtaken";
    }
    | InstrumentsView & {
      reply: "instruments";
    }
    | InstrumentForm & {
      reply: "instrument_form";
    }
    | {
      /** The instrument. */
      instrument: string;
      reply: "instrument_saved";
      /** What happened, in words. */
      says: string;
    }
    | RunView & {
      reply: "run";
    }
    | About & {
      reply: "about";
    };

  /** One request. Its kind is the member `ask`. */
  type Request = 
    | {
      ask: "overview";
    }
    | {
      ask: "checks";
    }
    | {
      ask: "solve";
      /** Identifier of the check, as `air_heat`. */
      check: string;
      /** Where the check is made; for last visit's figures beside the fields. */
      place?: Place;
      /** What is typed so far. */
      typed: Typed;
    }
    | {
      ask: "draw";
      /** Identifier of the check. */
      check: string;
      /** Where the check is made. */
      place?: Place;
      /** What is typed so far. */
      typed: Typed;
    }
    | {
      ask: "chart";
      /** How it is looked at. */
      look: ChartLook;
      /** Whose chart. */
      of: ChartOf;
    }
    | {
      ask: "start";
      /** Identifier of the check. */
      check: string;
      /** Where it is made; may be empty and chosen when filing. */
      place?: Place;
    }
    | {
      ask: "keep_draft";
      /** Identifier of the check. */
      check: string;
      /** The entry that this draft corrects. */
      corrects?: string | null;
      /** The draft to keep over; none for a new one. */
      draft?: string | null;
      /** Where the check is made. */
      place?: Place;
      /** What is typed so far. */
      typed: Typed;
    }
    | {
      ask: "open_draft";
      /** The draft. */
      draft: string;
    }
    | {
      ask: "discard_draft";
      /** The draft. */
      draft: string;
    }
    | {
      ask: "restore_draft";
      /** The draft. */
      draft: string;
    }
    | {
      ask: "file";
      /** Identifier of the check. */
      check: string;
      /** The entry that this corrects: a new revision of it. */
      corrects?: string | null;
      /** The draft that this was, removed in the same transaction. */
      draft?: string | null;
      /** Where; a site is wanted. */
      place: Place;
      /** What was typed. */
      typed: Typed;
    }
    | {
      ask: "correct";
      /** The entry. */
      entry: string;
    }
    | {
      ask: "withdraw_entry";
      /** The entry. */
      entry: string;
    }
    | {
      ask: "restore_entry";
      /** The entry. */
      entry: string;
    }
    | {
      ask: "sites";
    }
    | {
      ask: "site";
      /** The site. */
      site: string;
    }
    | {
      ask: "save_site";
      /** Elevation as typed; blank is not known. */
      elevation: TypedValue;
      /** Name of the site. */
      name: string;
      /** Anything worth knowing. */
      note?: string;
      /** The site to revise; none to add. */
      site?: string | null;
    }
    | {
      ask: "equipment";
      /** The equipment. */
      equipment: string;
    }
    | {
      ask: "save_equipment";
      /** What it is, as air handler. */
      class: string;
      /** The equipment to revise; none to add. */
      equipment?: string | null;
      /** Anything worth knowing. */
      note?: string;
      /** Its site. */
      site: string;
      /** Its tag, as on the drawing. */
      tag: string;
    }
    | {
      ask: "visit";
      /** The visit. */
      visit: string;
    }
    | {
      ask: "save_visit";
      /** Who is there. */
      people?: string;
      /** How the equipment was running: valve, damper, fan, stages. */
      running?: string;
      /** Its site. */
      site: string;
      /** Pressure here and outdoor air, as a form (see the reply's sections). */
      typed: Typed;
      /** The visit to revise; none to start one now. */
      visit?: string | null;
    }
    | {
      ask: "visit_form";
      /** Its site. */
      site: string;
      /** What is typed so far; none for the form as it stands. */
      typed?: Typed | null;
      /** The visit to revise; none for a new one. */
      visit?: string | null;
    }
    | {
      ask: "instruments";
    }
    | {
      ask: "instrument_form";
      /** The class that a new one starts from. */
      class?: string | null;
      /** The instrument; none for a new one. */
      instrument?: string | null;
      /** What is typed so far. */
      typed?: TypedInstrument | null;
    }
    | {
      ask: "save_instrument";
      /** The instrument to revise; none to add. */
      instrument?: string | null;
      /** As typed. */
      typed: TypedInstrument;
    }
    | {
      ask: "withdraw_instrument";
      /** The instrument. */
      instrument: string;
      /** Out of use. */
      withdrawn: boolean;
    }
    | {
      ask: "run_form";
      /** Which of its runs; none for a new one. */
      index?: number | null;
      /** What is typed so far. */
      typed?: TypedRun | null;
      /** The visit. */
      visit: string;
    }
    | {
      ask: "save_run";
      /** Which of its runs to replace; none to add one. */
      index?: number | null;
      /** As typed. */
      typed: TypedRun;
      /** The visit. */
      visit: string;
    }
    | {
      ask: "entry";
      /** The entry. */
      entry: string;
    }
    | {
      ask: "add_demo";
    }
    | {
      ask: "units";
    }
    | {
      ask: "choose_unit";
      /** Identifier of the quantity, as `temperature`. */
      quantity: string;
      /** Identifier of the unit, as `degF`. */
      unit: string;
    }
    | {
      ask: "choose_preset";
      /** `ip` or `si`. */
      preset: Preset;
    }
    | {
      ask: "appearance";
    }
    | {
      ask: "choose_appearance";
      /** The theme. */
      theme: Theme;
    }
    | {
      ask: "about";
    };

  /** A result that something can be asked of. */
  type RequirableView = {
    /** Its key. */
    figure: string;
    /** "Heat removed, total". */
    label: string;
    /** The unit chosen for it. */
    unit: UnitView;
    /** All units of its quantity. */
    units: Array<UnitView>;
    /** The unit of a tolerance: its difference's. */
    width_unit: UnitView;
  };

  /** What is asked of a check's results, and the answers. */
  type RequirementsView = {
    /** Requirements that this equipment was held to before: one tap takes one over. */
    before: Array<BeforeView>;
    /** Readings that the conditions of a rating can name. */
    conditions: Array<ConditionView>;
    /** Directions, in the order of the sheet. */
    directions: Array<OptionView>;
    /** Results that something can be asked of. */
    figures: Array<RequirableView>;
    /** One for each requirement typed, in the same order. */
    verdicts: Array<VerdictView>;
  };

  /** A group of results. */
  type ResultGroup = {
    /** At the right of the title: "± holds 95 times in 100". */
    aside?: string | null;
    /** Folded at first. */
    folded: boolean;
    /** The rows. */
    rows: Array<ResultRow>;
    /** "Results". */
    title: string;
  };

  /** One result. */
  type ResultRow = {
    /** A line below the label: "if the drain carries all of it". */
    condition?: string | null;
    /** Key, as `total_w` without its unit: `total`. */
    key: string;
    /** "Total". */
    label: string;
    /** Its ±; none where a ± makes no sense. */
    plus_minus?: PlusMinusView | null;
    /** Drawn bold, double-ruled. */
    strong: boolean;
    /** The value; none when withheld. */
    value?: ValueView | null;
    /** Why it is withheld. */
    withheld?: string | null;
  };

  /** A revision of an entry. */
  type RevisionRow = {
    /** It stands now. */
    current: boolean;
    /** Its headline. */
    figure: string;
    /** "14:20, first", "15:02, corrected". */
    says: string;
  };

  /** One probe in a run. */
  type RunRow = {
    /** What is wrong with the text. */
    error?: string | null;
    /** Its name. */
    label: string;
    /** "0.3 K above" what it is held against; none while it is not read. */
    offset?: string | null;
    /** The probe. */
    probe: string;
    /** As typed. */
    text: string;
    /** Further apart than both accuracies allow: it wants calibration. */
    too_far: boolean;
    /** The unit it is typed in. */
    unit: UnitView;
  };

  /** A run of probes side by side, worked out. */
  type RunView = {
    /** Which one of the visit's. */
    index?: number | null;
    /** Quantities that two or more probes can read. */
    quantities: Array<OptionView>;
    /** One for each probe that can read the quantity. */
    rows: Array<RunRow>;
    /** What it comes to, or what is missing. */
    says: string;
    /** "Temperature, at the start, 14:05". */
    title: string;
    /** As typed. */
    typed: TypedRun;
  };

  /** One part of a form. */
  type SectionView = {
    /** Acts of the section: add a stream, remove this one. */
    acts: Array<Act>;
    /** A word at the right of the title: "before the coil". */
    aside?: string | null;
    /** Its fields. */
    fields: Array<FieldView>;
    /** Folded at first, since its fields have been answered for (pressure of the visit) or are seldom wanted; `summary` says what stands. */
    folded: boolean;
    /** Key, the prefix of its fields: `entering`. */
    key: string;
    /** Letter and shape of its place. */
    mark?: MarkView | null;
    /** What its readings come to: "W 10.4 g/kg, h 53.3 kJ/kg". */
    readout?: string | null;
    /** One line that stands for the folded section: "83.43 kPa, standard atmosphere at 1609 m". */
    summary?: string | null;
    /** "Entering air". */
    title: string;
  };

  /** An SVG element, to be made as such: no text of it is ever read as markup. */
  type ShapeView = {
    /** Its attributes. Classes say what a line is; the stylesheet gives it its ink. */
    attributes: Record<string, string>;
    /** What stands in it, back to front. */
    children?: Array<ShapeView>;
    /** Name of the element: `path`. */
    name: string;
    /** Its text. */
    text?: string | null;
  };

  /** A site in a list. */
  type SiteRow = {
    /** Invented example data. */
    invented: boolean;
    /** Its name. */
    name: string;
    /** Elevation, last visit. */
    says: string;
    /** The site. */
    site: string;
  };

  /** A site. */
  type SiteView = {
    /** The elevation as typed. */
    elevation_text: string;
    /** The unit it was typed in. */
    elevation_unit: UnitView;
    /** The units that it can be typed in. */
    elevation_units: Array<UnitView>;
    /** Its entries, newest first. */
    entries: Array<EntryRow>;
    /** Its equipment. */
    equipment: Array<EquipmentRow>;
    /** Invented example data. */
    invented: boolean;
    /** Its name. */
    name: string;
    /** Anything worth knowing. */
    note: string;
    /** Elevation and the pressure that follows from it. */
    says: string;
    /** The site. */
    site: string;
    /** Its visits, newest first. */
    visits: Array<VisitRow>;
  };

  /** A check worked out. */
  type Solved = {
    /** Safety, always visible. */
    cautions: Array<CautionView>;
    /** Which check. */
    check: CheckName;
    /** Results over a range. */
    curves: Array<CurveView>;
    /** What decides the headline's ±. */
    drivers: Drivers;
    /** Further results. */
    groups: Array<ResultGroup>;
    /** The one figure that counts. */
    headline: Headline;
    /** Invented example data. */
    invented: boolean;
    /** Remarks on single readings and on the whole, in order of weight. */
    notes: Array<NoteView>;
    /** What is asked of the results, and the answers. */
    requirements: RequirementsView;
    /** The form, in order. */
    sections: Array<SectionView>;
    /** How far it has come. */
    stage: Stage;
    /** The air states as a table, the equal of the chart; with any, there is a chart to ask for. */
    states: Array<StateView>;
    /** One line under the title: equipment, site, pressure here and where it is from. */
    subtitle: string;
    /** Tables that are results in themselves. */
    tables: Array<TableView>;
    /** What the book constants would have said. */
    versus: Array<Versus>;
    /** "waits for air flow", when something is missing. */
    waits?: string | null;
    /** Some ± waits for draws: ask `draw` when typing rests. */
    wants_draws: boolean;
    /** Formula with numbers put in. */
    working: Array<StepView>;
  };

  /** One part of a split bar. */
  type SplitView = {
    /** "sensible". */
    label: string;
    /** Drawn dotted: it is about water. */
    moist: boolean;
    /** Its part of the whole, 0 to 1. */
    share: number;
  };

  /** How far a check has come. */
  type Stage = 
    | "waiting"
    | "refused"
    | "solved";

  /** An air state in full. */
  type StateView = {
    /** "Entering air". */
    label: string;
    /** Letter and shape. */
    mark?: MarkView | null;
    /** Its properties, in a fixed order. */
    rows: Array<ResultRow>;
  };

  /** One step of the working. */
  type StepView = {
    /** The formula in symbols. */
    formula: string;
    /** The formula with the numbers put in, and the result. */
    numbers: string;
    /** Convention and source. */
    source: string;
    /** What it gives: "Dry-air mass flow". */
    title: string;
  };

  /** A table. */
  type TableView = {
    /** Heads of its columns. */
    columns: Array<string>;
    /** Its rows, as long as there are columns. */
    rows: Array<Array<CellView>>;
    /** What it shows. */
    title: string;
  };

  /** One take. */
  type TakeRow = {
    /** "14:05:20". */
    at: string;
    /** What is wrong with it. */
    error?: string | null;
    /** As typed. */
    text: string;
  };

  /** The takes of a reading. */
  type TakesView = {
    /** Readings whose time this one can be brought to (A-B-A); the first option, with an empty value, is none. */
    at_time_of: Array<OptionView>;
    /** The one chosen. */
    at_time_of_value: string;
    /** "13.20", what stands in the field; none without takes. */
    mean?: string | null;
    /** In the order they were made. */
    rows: Array<TakeRow>;
    /** "Mean of 4 takes in 60 s: 13.20 °C, scatter 0.08 K"; none without takes. */
    says?: string | null;
    /** `steady`, `drifting`, `hunting` or `not_judged`; none without takes. */
    steadiness?: string | null;
    /** "Steady", "Drifting", "Hunting", "Not judged". */
    word?: string | null;
  };

  /** How the screens look. */
  type Theme = 
    | "system"
    | "light"
    | "dark"
    | "contrast";

  /** The weight of a note. */
  type Tone = 
    | "impossible"
    | "unusual"
    | "within"
    | "remark";

  /** A form as typed. */
  type Typed = {
    /** Codes of unusual notes that the person has said to be right. */
    accepted?: Array<string>;
    /** Choices made, by key: `flow.basis` → `actual_entering`. */
    choices?: Record<string, string>;
    /** Readings by key: `entering.dry_bulb` → text and unit. A blank or missing one is not read. */
    readings?: Record<string, TypedReading>;
    /** What is asked of its results. */
    requirements?: Array<TypedRequirement>;
  };

  /** One band of an accuracy statement, as printed. */
  type TypedBand = {
    /** ± this much, in the probe's unit. */
    absolute?: string;
    /** ± this many steps of the display. */
    counts?: string;
    /** The greater of the fixed part and the share of the reading counts, not their sum. */
    greater?: boolean;
    /** ± this many per cent of the range. */
    of_range?: string;
    /** ± this many per cent of the reading. */
    of_reading?: string;
    /** Up to this reading; blank in the last one. */
    up_to?: string;
  };

  /** An instrument as typed. */
  type TypedInstrument = {
    /** What the team calls it. */
    name?: string;
    /** Anything worth knowing. */
    note?: string;
    /** Its probes; an instrument that reads one thing has one. */
    probes?: Array<TypedProbe>;
    /** Its serial number. */
    serial?: string;
  };

  /** A probe, or the one channel of an instrument without any. */
  type TypedProbe = {
    /** Bands of its accuracy statement, the narrowest first. */
    bands?: Array<TypedBand>;
    /** When it was calibrated last, as `2026-03-01`. */
    calibrated?: string;
    /** Share of the statement that is calibration, in per cent; blank is 80. */
    calibration_share?: string;
    /** `limits`, `ninety_five` or `one_sigma`; none is limits. */
    coverage?: string;
    /** When it is due, as `2027-03-01`. */
    due?: string;
    /** Its identity within the instrument; none for a new one. */
    id?: string | null;
    /** What it is called: "wet bulb". */
    name?: string;
    /** Identifier of the quantity that it reads, as `temperature`. */
    quantity?: string;
    /** The upper end of its range, in its unit. */
    range?: string;
    /** How it reads what it reads: `flow` → `actual` or `standard_1.2`, `wet_bulb` → `measured` or `sea_level`. */
    reads?: Record<string, string>;
    /** The step of its display, in its unit. */
    resolution?: string;
    /** Seconds until it shows a change. */
    response?: string;
    /** Its own serial number. */
    serial?: string;
    /** The unit that its accuracy is stated in. */
    unit?: string;
  };

  /** One reading as typed. */
  type TypedReading = {
    /** Key of the reading to whose time this one is brought, from takes before and after it (A-B-A). */
    at_time_of?: string | null;
    /** Its ± (95 %), as typed; none or blank is not known. */
    plus_minus?: TypedValue | null;
    /** The probe that it was read with, as `instrument/probe`; none is the one used last for it, an empty text none at all. */
    probe?: string | null;
    /** How the probe was held; none is not said. */
    spot?: TypedSpot | null;
    /** Its takes; with any, their mean is the reading, whatever `text` says. */
    takes?: Array<TypedTake>;
    /** The text, exactly as typed; it may carry a unit of its own. */
    text: string;
    /** The unit beside it; none means the unit chosen for its quantity. */
    unit?: string | null;
  };

  /** What is asked of a result. */
  type TypedRequirement = {
    /** What the readings would have to be for it to hold, by key: the conditions of a rating. Empty: it holds as read. */
    conditions?: Record<string, TypedValue>;
    /** `at_least`, `at_most`, `between` or `within` (a nominal figure and a tolerance). */
    direction: string;
    /** Key of the result. */
    figure: string;
    /** The upper limit, or the tolerance. */
    other?: TypedValue;
    /** The ± of the requirement itself, where a maker states one; then it is only said whether the two disagree. */
    plus_minus?: TypedValue;
    /** Accepted risk of a wrong "meets", in per cent; blank is 5. */
    risk?: string;
    /** Where it comes from: drawing, schedule, specification. */
    source?: string;
    /** The limit, the lower one of two, or the nominal figure. */
    value: TypedValue;
  };

  /** Several probes held in the same air. */
  type TypedRun = {
    /** The probe that the others are held against; none is the mean of all. */
    against?: string | null;
    /** Readings of this visit are corrected by what was found. */
    apply?: boolean;
    /** Identifier of the quantity, as `temperature`. */
    quantity: string;
    /** What each probe showed. */
    rows?: Array<TypedRunRow>;
    /** `start` or `end` of the visit. */
    when: string;
  };

  /** What one probe showed. */
  type TypedRunRow = {
    /** The probe, as `instrument/probe`. */
    probe: string;
    /** What it showed. */
    value: TypedValue;
  };

  /** How a probe was held. */
  type TypedSpot = {
    /** `point`, `grid` or `averaging`. */
    held: string;
    /** What the place adds by itself (95 %); blank is not known. */
    plus_minus?: TypedValue;
    /** How many points a grid has. */
    points?: string;
    /** Standard deviation of the points of a grid; blank is not known. */
    spread?: TypedValue;
  };

  /** One take of a reading. */
  type TypedTake = {
    /** When, as `2026-12-01T14:05:20Z`; blank is now. */
    at?: string;
    /** The text, in the unit of the reading unless it carries one. */
    text: string;
  };

  /** A number with its unit, as typed. */
  type TypedValue = {
    /** The text, exactly as typed. */
    text: string;
    /** The unit beside it; none means the unit chosen for its quantity. */
    unit?: string | null;
  };

  /** A unit. */
  type UnitView = {
    /** Identifier, as `degC`. */
    id: string;
    /** Name read aloud, as "degrees Celsius". */
    name: string;
    /** Symbol, as "°C". */
    symbol: string;
  };

  /** The unit of one quantity. */
  type UnitsRow = {
    /** The unit in use. */
    chosen: UnitView;
    /** An everyday value in the unit in use: "21.0 °C". */
    example: string;
    /** "temperature". */
    label: string;
    /** Identifier of the quantity. */
    quantity: string;
    /** All units of it. */
    units: Array<UnitView>;
  };

  /** The units in use. */
  type UnitsView = {
    /** The preset that they equal, if one. */
    preset?: Preset | null;
    /** By quantity. */
    rows: Array<UnitsRow>;
  };

  /** A usual figure for what a place adds. */
  type UsualSpot = {
    /** "Duct, ± 0.3 K, common practice". */
    label: string;
    /** What it would type. */
    spot: TypedSpot;
  };

  /** A value as shown, with its SI value beside. */
  type ValueView = {
    /** "41.3", with a true minus and no-break spaces. */
    number: string;
    /** The value in SI. */
    si: number;
    /** Unit of `si`, as a suffix of keys: `w`, `k`, `kg_kg`. */
    si_unit: string;
    /** "kW"; empty for plain ratios. */
    unit: string;
  };

  /** One requirement and its answer. */
  type VerdictView = {
    /** `meets`, `falls_short`, `goes_over`, `cannot_be_told`, or none where it cannot be held against it yet. */
    answer?: string | null;
    /** "Total at least 48.0 kW, by schedule M-601". */
    asked: string;
    /** "94 % likely to be met". */
    chance?: string | null;
    /** What would decide, where it cannot be told: one sentence each. */
    decides: Array<string>;
    /** What is wrong with the requirement as typed: `value`, `other`, `risk`, `conditions.entering.dry_bulb`. */
    errors: Array<FieldError>;
    /** Which one of those typed. */
    index: number;
    /** "50.2 ± 2.8 kW is above it by 2.2 kW; 2.4 kW would be needed." */
    says?: string | null;
    /** A share of the design figure, or why none is given. */
    share?: string | null;
    /** Why there is no answer: the ± is not known, draws are still running, the conditions differ. */
    why_not?: Message | null;
    /** "Meets", "Falls short", "Goes over", "Cannot be told". */
    word?: string | null;
  };

  /** A book figure beside the measured one. */
  type Versus = {
    /** The book's figure, struck through. */
    book: ValueView;
    /** "8.2 kW too high, 20 %". */
    gap: string;
    /** What makes the gap: signed parts that add up to it. */
    parts: Array<VersusPart>;
    /** "Same readings with 1.08, made for sea level …" */
    reason: string;
    /** "Book constants would say". */
    title: string;
    /** Whether it matters against the ±; none without a ±. */
    verdict?: string | null;
  };

  /** One part of a gap. */
  type VersusPart = {
    /** "pressure". */
    label: string;
    /** Signed, in shares of the figure here. */
    share: number;
    /** "+21.6 %". */
    text: string;
  };

  /** The form of a visit. */
  type VisitFormView = {
    /** Notes on them. */
    notes: Array<NoteView>;
    /** Who is there. */
    people: string;
    /** How the equipment is running. */
    running: string;
    /** Pressure here, outdoor air. */
    sections: Array<SectionView>;
    /** Its site. */
    site: string;
    /** The site's name. */
    site_name: string;
    /** What is typed. */
    typed: Typed;
    /** The visit; none is a new one. */
    visit?: string | null;
  };

  /** A visit in a list. */
  type VisitRow = {
    /** "5 entries". */
    count: string;
    /** It is today's. */
    open: boolean;
    /** People, outdoor air. */
    says: string;
    /** The visit. */
    visit: string;
    /** "14 July, today". */
    when: string;
  };

  /** A visit. */
  type VisitView = {
    /** Its entries, newest first. */
    entries: Array<EntryRow>;
    /** Invented example data. */
    invented: boolean;
    /** It is today's: checks can be started in it. */
    open: boolean;
    /** Who was there. */
    people: string;
    /** Where it is. */
    place: Place;
    /** Pressure here, outdoor air. */
    rows: Array<ResultRow>;
    /** How the equipment was running. */
    running: string;
    /** Probes run side by side: index, title, and what was found. */
    runs: Array<OptionView>;
    /** Its site's name. */
    site: string;
    /** "14 July 2026, 14:05". */
    when: string;
  };

  /** Last visit's reading. */
  type WasView = {
    /** As typed then. */
    text: string;
    /** Its unit. */
    unit: UnitView;
    /** When: "3 May". */
    when: string;
  };
}
