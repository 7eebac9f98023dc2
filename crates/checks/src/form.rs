//! What a check asks for: plain tables from which a screen, a command line and a report are made.

use std::borrow::Cow;

use dewledger_quantities::{Amount, Kind};

use crate::given::Given;

/// Text of a form: mostly fixed, sometimes made (stream 3).
pub type Text = Cow<'static, str>;

/// One part of a form, in the order in which a person meets it.
#[derive(Debug, Clone, PartialEq)]
pub struct Section {
    /// Prefix of its keys.
    pub key: Text,
    /// Its title.
    pub title: Text,
    /// A word at the right of the title.
    pub aside: Option<Text>,
    /// Letter and shape of its place.
    pub mark: Option<Mark>,
    /// Seldom wanted: folded until something stands in it.
    pub seldom: bool,
    /// What is asked.
    pub items: Vec<Item>,
    /// A part that can be repeated: add one, or take this one away.
    pub repeat: Option<Repeat>,
}

impl Section {
    /// A section that always stands open.
    pub fn new(key: impl Into<Text>, title: impl Into<Text>, items: Vec<Item>) -> Self {
        Self {
            key: key.into(),
            title: title.into(),
            aside: None,
            mark: None,
            seldom: false,
            items,
            repeat: None,
        }
    }

    /// With the letter of its place.
    #[must_use]
    pub fn marked(mut self, mark: Mark) -> Self {
        self.mark = Some(mark);
        self
    }

    /// With a word at the right of its title.
    #[must_use]
    pub fn beside(mut self, aside: impl Into<Text>) -> Self {
        self.aside = Some(aside.into());
        self
    }

    /// Folded until something stands in it.
    #[must_use]
    pub fn seldom(mut self) -> Self {
        self.seldom = true;
        self
    }

    /// All keys of readings in it.
    pub fn reading_keys(&self) -> impl Iterator<Item = &str> {
        self.items.iter().filter_map(|item| match item {
            Item::Reading(reading) => Some(reading.key.as_ref()),
            Item::Choice(_) => None,
        })
    }
}

/// How many of a repeated part there are, and within what bounds.
#[derive(Debug, Clone, PartialEq)]
pub struct Repeat {
    /// The choice that holds how many there are.
    pub choice: Text,
    /// How many there are now.
    pub count: usize,
    /// Not fewer than this.
    pub least: usize,
    /// Not more than this.
    pub most: usize,
    /// Stands on the last one: "Add a stream".
    pub add: Option<Text>,
    /// Stands where one can be taken away: "Take this stream away"; the last one goes.
    pub remove: Option<Text>,
}

/// How many of a repeated part there are: what was chosen, within its bounds.
#[must_use]
pub fn count(given: &Given, choice: &str, least: usize, most: usize) -> usize {
    given.choice(choice).and_then(|count| count.parse().ok()).unwrap_or(least).clamp(least, most)
}

/// Something asked.
#[derive(Debug, Clone, PartialEq)]
pub enum Item {
    /// A number.
    Reading(ReadingItem),
    /// One of several.
    Choice(ChoiceItem),
}

/// A number asked for.
#[derive(Debug, Clone, PartialEq)]
pub struct ReadingItem {
    /// Its key.
    pub key: Text,
    /// Its label.
    pub label: Text,
    /// What it is.
    pub kind: Kind,
    /// Wanted for the headline.
    pub required: bool,
    /// The property itself can be chosen: drawn in place of the label.
    pub pick: Option<ChoiceItem>,
    /// A line of help.
    pub help: Option<Text>,
    /// A constant of the method, used while it stays blank, and said.
    pub assumed: Option<Amount>,
    /// Without a stated ± it does not make results "not known": a definition, or the check brings its doubt itself.
    pub covered: bool,
}

impl ReadingItem {
    /// A reading that the headline needs.
    pub fn wanted(key: impl Into<Text>, label: impl Into<Text>, kind: Kind) -> Self {
        Self {
            key: key.into(),
            label: label.into(),
            kind,
            required: true,
            pick: None,
            help: None,
            assumed: None,
            covered: false,
        }
    }

    /// A reading that may stay blank.
    pub fn optional(key: impl Into<Text>, label: impl Into<Text>, kind: Kind) -> Self {
        Self { required: false, ..Self::wanted(key, label, kind) }
    }

    /// With a line of help.
    #[must_use]
    pub fn help(mut self, help: impl Into<Text>) -> Self {
        self.help = Some(help.into());
        self
    }

    /// A definition, or a reading whose doubt the check brings itself while none is stated.
    #[must_use]
    pub fn covered(mut self) -> Self {
        self.covered = true;
        self
    }

    /// With the constant of the method that is used while it stays blank.
    #[must_use]
    pub fn assuming(mut self, assumed: Amount) -> Self {
        self.assumed = Some(assumed);
        self
    }
}

impl From<ReadingItem> for Item {
    fn from(item: ReadingItem) -> Self {
        Item::Reading(item)
    }
}

/// One of several asked for.
#[derive(Debug, Clone, PartialEq)]
pub struct ChoiceItem {
    /// Its key.
    pub key: Text,
    /// Its label.
    pub label: Text,
    /// What can be chosen.
    pub options: Vec<Choice>,
    /// What stands while nothing is chosen; none where a silent default would be a guess.
    pub default: Option<&'static str>,
    /// A line of help.
    pub help: Option<Text>,
}

impl ChoiceItem {
    /// A choice among `options`.
    pub fn new(
        key: impl Into<Text>,
        label: impl Into<Text>,
        default: Option<&'static str>,
        options: Vec<Choice>,
    ) -> Self {
        Self { key: key.into(), label: label.into(), options, default, help: None }
    }

    /// With a line of help.
    #[must_use]
    pub fn help(mut self, help: impl Into<Text>) -> Self {
        self.help = Some(help.into());
        self
    }
}

impl From<ChoiceItem> for Item {
    fn from(item: ChoiceItem) -> Self {
        Item::Choice(item)
    }
}

/// One option.
#[derive(Debug, Clone, PartialEq)]
pub struct Choice {
    /// Identifier.
    pub value: &'static str,
    /// Label.
    pub label: Text,
    /// A line of help.
    pub help: Option<Text>,
}

impl Choice {
    /// An option.
    pub fn new(value: &'static str, label: impl Into<Text>) -> Self {
        Self { value, label: label.into(), help: None }
    }

    /// An option with a line of help.
    pub fn helped(value: &'static str, label: impl Into<Text>, help: impl Into<Text>) -> Self {
        Self { value, label: label.into(), help: Some(help.into()) }
    }
}

/// Letter and shape of a place, the same on chart, form and report.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct Mark {
    /// One capital letter or digit.
    pub letter: char,
    /// The outline around it.
    pub shape: Shape,
}

/// The outline around a letter, so that a place is told without colour.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Shape {
    /// A circle.
    Circle,
    /// A square.
    Square,
    /// A triangle standing.
    Triangle,
    /// A triangle hanging.
    HangingTriangle,
    /// A diamond.
    Diamond,
}

impl Mark {
    /// Air as it enters the process.
    pub const ENTERING: Mark = Mark { letter: 'A', shape: Shape::Circle };
    /// Air as it leaves the process.
    pub const LEAVING: Mark = Mark { letter: 'B', shape: Shape::Square };
    /// Mixed air.
    pub const MIXED: Mark = Mark { letter: 'M', shape: Shape::Triangle };

    /// A numbered stream.
    #[must_use]
    pub fn stream(number: usize) -> Mark {
        let letter =
            u32::try_from(number).ok().and_then(|n| char::from_digit(n, 10)).unwrap_or('•');
        Mark { letter, shape: Shape::Circle }
    }
}
