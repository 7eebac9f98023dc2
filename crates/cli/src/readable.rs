//! A check for a person at a terminal: its form, or its answer.

use std::fmt::Write as _;

use dewledger_desk::{FieldView, NoteView, ResultRow, SectionView, Solved, Tone};

/// Width of the label column.
const LABELS: usize = 48;

/// The fields that a check asks for.
pub(crate) fn form(solved: &Solved) -> String {
    let mut text = format!("{}: {}\n", solved.check.label, solved.check.question);
    for section in &solved.sections {
        line(&mut text, &format!("\n{}", section.title));
        fields(&mut text, section);
    }
    line(
        &mut text,
        "\nA field marked * is wanted. Give a value with its unit, and its ± if known: entering.dry_bulb=\"80 F ± 0.5\"",
    );
    text
}

fn fields(text: &mut String, section: &SectionView) {
    for field in &section.fields {
        match field {
            FieldView::Reading(reading) => {
                let units: Vec<&str> = reading.units.iter().map(|unit| unit.id.as_str()).collect();
                let wanted = if reading.required { "*" } else { " " };
                let assumed = reading
                    .assumed
                    .as_ref()
                    .map(|assumed| format!(" ({assumed})"))
                    .unwrap_or_default();
                line(
                    text,
                    &format!(
                        "  {wanted} {:36} {}{assumed}: {}",
                        reading.key,
                        reading.label,
                        units.join(" ")
                    ),
                );
                if let Some(pick) = &reading.pick {
                    choice(text, pick);
                }
            }
            FieldView::Choice(view) => choice(text, view),
        }
    }
}

fn choice(text: &mut String, choice: &dewledger_desk::ChoiceView) {
    let options: Vec<String> = choice
        .options
        .iter()
        .map(|option| {
            if choice.value.as_ref() == Some(&option.value) {
                format!("[{}]", option.value)
            } else {
                option.value.clone()
            }
        })
        .collect();
    line(text, &format!("    {:36} {}: {}", choice.key, choice.label, options.join(" ")));
}

/// What a check answers.
pub(crate) fn answer(solved: &Solved, working: bool) -> String {
    let mut text = format!("{}\n", solved.check.label);
    if !solved.subtitle.is_empty() {
        line(&mut text, &solved.subtitle);
    }
    for note in solved.notes.iter().filter(|note| note.tone == Tone::Impossible) {
        say_note(&mut text, note);
    }
    let headline = &solved.headline;
    if let Some(value) = &headline.value {
        let plus_minus =
            headline.plus_minus.as_ref().map(|pm| format!("  {}", pm.text)).unwrap_or_default();
        let also = headline.also.as_ref().map(|also| format!("  ({also})")).unwrap_or_default();
        line(
            &mut text,
            &format!("\n{}: {} {}{plus_minus}{also}", headline.says, value.number, value.unit),
        );
    } else if let Some(why) = &headline.why_not {
        line(&mut text, &format!("\n{}: – ({why})", headline.says));
    }
    verdicts(&mut text, solved);
    for group in &solved.groups {
        let aside = group.aside.as_ref().map(|aside| format!("  ({aside})")).unwrap_or_default();
        line(&mut text, &format!("\n{}{aside}", group.title));
        for row in &group.rows {
            say_row(&mut text, row);
        }
    }
    if !solved.versus.is_empty() {
        line(&mut text, "\nBook constants would say");
    }
    for versus in &solved.versus {
        let verdict =
            versus.verdict.as_ref().map(|verdict| format!(": {verdict}")).unwrap_or_default();
        line(
            &mut text,
            &format!(
                "  {:LABELS$} {} {}, {}{verdict}",
                versus.title, versus.book.number, versus.book.unit, versus.gap
            ),
        );
        let parts: Vec<String> =
            versus.parts.iter().map(|part| format!("{} {}", part.label, part.text)).collect();
        line(&mut text, &format!("    {}", parts.join(", ")));
    }
    if let Some(says) = &solved.drivers.says {
        line(&mut text, "\nWhat decides the ±");
        for driver in &solved.drivers.rows {
            line(&mut text, &format!("  {:LABELS$} {}", driver.label, driver.text));
        }
        line(&mut text, &format!("  {says}"));
    }
    for note in solved.notes.iter().filter(|note| note.tone != Tone::Impossible) {
        say_note(&mut text, note);
    }
    if working {
        line(&mut text, "\nThe working");
        for step in &solved.working {
            line(&mut text, &format!("  {}: {}", step.title, step.formula));
            line(&mut text, &format!("    {}", step.numbers));
            line(&mut text, &format!("    {}", step.source));
        }
    }
    if !solved.cautions.is_empty() {
        line(&mut text, "\nCautions");
    }
    for caution in &solved.cautions {
        line(&mut text, &format!("  {}. {}", caution.title, caution.says));
    }
    text
}

/// Requirements and their answers.
fn verdicts(text: &mut String, solved: &Solved) {
    let verdicts = &solved.requirements.verdicts;
    if !verdicts.is_empty() {
        line(text, "\nRequirements");
    }
    for verdict in verdicts {
        let word = verdict.word.as_deref().unwrap_or("No answer");
        line(text, &format!("  {}: {word}", verdict.asked));
        let chance = verdict.chance.iter().map(|chance| format!("{chance}."));
        let why = verdict.why_not.iter().map(|why| why.says.clone());
        let errors = verdict.errors.iter().map(|error| error.says.clone());
        let all = verdict.says.iter().cloned().chain(chance).chain(verdict.decides.iter().cloned());
        for says in all.chain(verdict.share.iter().cloned()).chain(why).chain(errors) {
            line(text, &format!("    {says}"));
        }
    }
}

fn say_row(text: &mut String, row: &ResultRow) {
    let value = match (&row.value, &row.withheld) {
        (Some(value), _) => format!("{} {}", value.number, value.unit),
        (None, Some(why)) => format!("– ({why})"),
        (None, None) => "–".to_owned(),
    };
    let plus_minus = row.plus_minus.as_ref().map(|pm| format!("  {}", pm.text)).unwrap_or_default();
    line(text, &format!("  {:LABELS$} {value}{plus_minus}", row.label));
    if let Some(condition) = &row.condition {
        line(text, &format!("    {condition}"));
    }
}

fn say_note(text: &mut String, note: &NoteView) {
    let mark = match note.tone {
        Tone::Impossible => "Error: ",
        Tone::Unusual => "Unusual: ",
        Tone::Within | Tone::Remark => "",
    };
    let reason = note.reason.as_ref().map(|reason| format!(" {reason}")).unwrap_or_default();
    line(text, &format!("\n{mark}{}{reason}", note.lead));
    for act in note.acts.iter().filter(|act| act.label != "It is right") {
        line(text, &format!("  Perhaps: {}", act.label));
    }
}

fn line(text: &mut String, says: &str) {
    // Writing to a string cannot fail.
    let _ = writeln!(text, "{}", says.trim_end());
}
