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

  /** A caution. */
  type CautionView = {
    /** The text. */
    says: string;
    /** "Rotating parts". */
    title: string;
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
    /** The readings whose ± is missing. */
    missing?: string | null;
    /** The 95 % half-width in SI; none when not known. */
    si?: number | null;
    /** "± 3.1" in the unit of its value, or "± not known". */
    text: string;
  };

  /** A set of units chosen at once. */
  type Preset = "ip" | "si";

  /** A reading of a filed entry. */
  type ReadingRow = {
    /** Section and label: "Entering air, dry bulb". */
    label: string;
    /** Its ±. */
    plus_minus: string;
    /** As typed, with its unit. */
    text: string;
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
    /** The form, in order. */
    sections: Array<SectionView>;
    /** How far it has come. */
    stage: Stage;
    /** The air states as a table, the equal of the chart. */
    states: Array<StateView>;
    /** One line under the title: equipment, site, pressure here and where it is from. */
    subtitle: string;
    /** What the book constants would have said. */
    versus: Array<Versus>;
    /** "waits for air flow", when something is missing. */
    waits?: string | null;
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
  };

  /** One reading as typed. */
  type TypedReading = {
    /** Its ± (95 %), as typed; none or blank is not known. */
    plus_minus?: TypedValue | null;
    /** The text, exactly as typed; it may carry a unit of its own. */
    text: string;
    /** The unit beside it; none means the unit chosen for its quantity. */
    unit?: string | null;
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
