//! A sentence with amounts in it, put into words only when it is known who reads it.
//!
//! Internal code never formats a unit: a refusal or a note carries the amounts, and the edge fills them in, in the
//! person's own units. `{0}` is an amount, `{w0}` a word, `{s0}` another sentence.

use std::borrow::Cow;

use crate::{Amount, UnitChoice, show};

/// A template with what fills it.
#[derive(Debug, Clone, PartialEq)]
pub struct Sentence {
    template: Cow<'static, str>,
    amounts: Vec<Amount>,
    words: Vec<Cow<'static, str>>,
    nested: Vec<Sentence>,
}

impl Sentence {
    /// From a template.
    pub fn new(template: impl Into<Cow<'static, str>>) -> Self {
        Self {
            template: template.into(),
            amounts: Vec::new(),
            words: Vec::new(),
            nested: Vec::new(),
        }
    }

    /// With the next amount.
    #[must_use]
    pub fn with(mut self, amount: Amount) -> Self {
        self.amounts.push(amount);
        self
    }

    /// With the next word.
    #[must_use]
    pub fn word(mut self, word: impl Into<Cow<'static, str>>) -> Self {
        self.words.push(word.into());
        self
    }

    /// With the next sentence inside.
    #[must_use]
    pub fn nested(mut self, sentence: Sentence) -> Self {
        self.nested.push(sentence);
        self
    }

    /// Its template, for storing it.
    #[must_use]
    pub fn template(&self) -> &str {
        &self.template
    }

    /// Its amounts, for storing it.
    #[must_use]
    pub fn amounts(&self) -> &[Amount] {
        &self.amounts
    }

    /// Its words, for storing it.
    #[must_use]
    pub fn words(&self) -> &[Cow<'static, str>] {
        &self.words
    }

    /// The sentences inside, for storing it.
    #[must_use]
    pub fn sentences(&self) -> &[Sentence] {
        &self.nested
    }

    /// In words, with amounts in these units. A first letter is made large at the start.
    #[must_use]
    pub fn say(&self, units: &UnitChoice) -> String {
        let mut said = String::new();
        let mut rest: &str = &self.template;
        while let Some((before, behind)) = rest.split_once('{') {
            let Some((name, after)) = behind.split_once('}') else { break };
            said.push_str(before);
            said.push_str(&self.fill(name, units));
            rest = after;
        }
        said.push_str(rest);
        capital(&said)
    }

    fn fill(&self, name: &str, units: &UnitChoice) -> String {
        let index = |text: &str| text.parse::<usize>().ok();
        let filled = if let Some(word) = name.strip_prefix('w') {
            index(word).and_then(|at| self.words.get(at)).map(ToString::to_string)
        } else if let Some(sentence) = name.strip_prefix('s') {
            index(sentence)
                .and_then(|at| self.nested.get(at))
                .map(|sentence| uncapital(&sentence.template, &sentence.say(units)))
        } else {
            index(name)
                .and_then(|at| self.amounts.get(at))
                .map(|amount| show(*amount, units.get(amount.kind())).text())
        };
        filled.unwrap_or_else(|| format!("{{{name}}}"))
    }
}

fn capital(text: &str) -> String {
    let mut characters = text.chars();
    characters
        .next()
        .map_or_else(String::new, |first| first.to_uppercase().chain(characters).collect())
}

/// A sentence inside another keeps the case that its template begins with.
fn uncapital(template: &str, said: &str) -> String {
    if template.starts_with(|c: char| c.is_lowercase()) {
        let mut characters = said.chars();
        characters
            .next()
            .map_or_else(String::new, |first| first.to_lowercase().chain(characters).collect())
    } else {
        said.to_owned()
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::Kind;

    #[test]
    fn amounts_are_said_in_the_readers_units() {
        let says = Sentence::new("wet bulb {0} is above dry bulb {1} ({w0}, {s0}).")
            .with(Amount::new(Kind::Temperature, 300.15))
            .with(Amount::new(Kind::Temperature, 298.15))
            .word("entering")
            .nested(Sentence::new("read at {0}").with(Amount::new(Kind::Elevation, 1609.344)));
        assert_eq!(
            says.say(&UnitChoice::si()),
            "Wet bulb 27.0\u{a0}°C is above dry bulb 25.0\u{a0}°C (entering, read at 1609\u{a0}m)."
        );
        assert!(says.say(&UnitChoice::ip()).contains("80.6\u{a0}°F"));
    }
}
