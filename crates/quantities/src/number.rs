//! The number in what a person types: its sign, its digits and marks, and what stands behind it.

/// A text taken apart. Nothing is decided yet about what a mark means.
#[derive(Debug, PartialEq)]
pub(crate) struct Parts {
    pub(crate) negative: bool,
    /// Digits and decimal marks, as typed; spaces and apostrophes between thousands are gone.
    pub(crate) body: String,
    /// Thousands were parted by a space or an apostrophe, so that a mark can only be the decimal one.
    pub(crate) parted: bool,
    /// Power of ten, as programs write it: `-3` of `9.1e-3`.
    pub(crate) exponent: Option<String>,
    /// What stands behind the number, trimmed.
    pub(crate) rest: String,
}

/// Why a text cannot be taken apart.
#[derive(Debug, PartialEq)]
pub(crate) enum Trouble {
    /// There is no number in it, or a sign or mark where none belongs.
    NoNumber,
    /// A space parts digits where no thousands end: "21 5".
    TwoNumbers,
}

/// Hyphen, true minus, dashes and their compatibility forms: phones and pasted tables use them all.
fn is_minus(character: char) -> bool {
    matches!(character, '-' | '−' | '–' | '—' | '‐' | '‑' | '‒' | '﹣' | '－')
}

fn is_mark(character: char) -> bool {
    matches!(character, '.' | ',')
}

/// A character that may part thousands by itself, with a digit right behind it.
fn is_apostrophe(character: char) -> bool {
    matches!(character, '\'' | '’' | '‘' | '`' | '´' | '_')
}

/// Takes a text apart.
pub(crate) fn take_apart(text: &str) -> Result<Parts, Trouble> {
    let characters: Vec<char> = text.trim().chars().collect();
    let at = |index: usize| characters.get(index).copied();
    let past_spaces = |mut index: usize| {
        while at(index).is_some_and(char::is_whitespace) {
            index += 1;
        }
        index
    };
    let mut index = 0;
    let mut negative = false;
    let signed = at(0).is_some_and(|first| first == '+' || is_minus(first));
    if signed {
        negative = at(0) != Some('+');
        index = past_spaces(1);
    }
    let (groups, next) = groups(&characters, index);
    index = next;
    let body: String = groups.concat();
    if !body.chars().any(|character| character.is_ascii_digit()) {
        return Err(Trouble::NoNumber);
    }
    if !are_thousands(&groups) {
        return Err(Trouble::TwoNumbers);
    }
    let exponent = exponent(&characters[index..]);
    index += exponent.as_ref().map_or(0, |text| text.chars().count() + 1);
    index = past_spaces(index);
    // A minus behind the number, as ledgers and some keyboards put it, ends the text.
    if at(index).is_some_and(is_minus) && index + 1 == characters.len() && !signed {
        negative = true;
        index += 1;
    }
    let rest: String = characters[index..].iter().collect();
    if rest.starts_with(|first: char| {
        first.is_ascii_digit() || is_minus(first) || is_mark(first) || first == '+'
    }) {
        return Err(Trouble::NoNumber);
    }
    let exponent =
        exponent.map(|text| text.chars().map(|c| if is_minus(c) { '-' } else { c }).collect());
    Ok(Parts { negative, body, parted: groups.len() > 1, exponent, rest })
}

/// The runs of digits and marks from `index` on that a space or an apostrophe parts, and where they end.
fn groups(characters: &[char], mut index: usize) -> (Vec<String>, usize) {
    let at = |index: usize| characters.get(index).copied();
    let mut groups = vec![String::new()];
    let mut end = index;
    while let Some(character) = at(index) {
        if character.is_ascii_digit() || is_mark(character) {
            let last = groups.last_mut().expect("there is a group from the start");
            last.push(character);
            index += 1;
            end = index;
            continue;
        }
        let next = index + 1;
        let follows = if is_apostrophe(character) {
            next
        } else if character.is_whitespace() {
            next + characters[next..].iter().take_while(|c| c.is_whitespace()).count()
        } else {
            break;
        };
        let before = groups.last().and_then(|group| group.chars().last());
        match (before, at(follows)) {
            (Some(before), Some(after)) if before.is_ascii_digit() && after.is_ascii_digit() => {
                groups.push(String::new());
            }
            // A space beside a mark means nothing: dictation writes "17 , 5".
            (Some(_), Some(after))
                if is_mark(after) || (is_mark_last(&groups) && after.is_ascii_digit()) =>
            {
                if is_apostrophe(character) {
                    break;
                }
            }
            _ => break,
        }
        index = follows;
    }
    (groups, end)
}

fn is_mark_last(groups: &[String]) -> bool {
    groups.last().and_then(|group| group.chars().last()).is_some_and(is_mark)
}

/// Whether parted digits are thousands: before the decimal mark all groups but the first have three digits, behind it
/// all but the last.
fn are_thousands(groups: &[String]) -> bool {
    if groups.len() == 1 {
        return true;
    }
    let marked = groups.iter().position(|group| group.contains(is_mark));
    groups.iter().enumerate().all(|(index, group)| {
        let pieces: Vec<usize> = group.split(is_mark).map(str::len).collect();
        let (whole, decimals) = (pieces[0], pieces.get(1).copied());
        let three_or_end =
            |length: usize, last: bool| length == 3 || (last && (1..=3).contains(&length));
        let last = index + 1 == groups.len();
        match marked {
            Some(mark) if index > mark => three_or_end(whole, last),
            Some(mark) if index == mark => {
                (if index == 0 { whole <= 3 || groups.len() == 1 } else { whole == 3 })
                    && pieces.len() == 2
                    // Decimals go on in further groups only after three.
                    && (last || decimals == Some(3))
            }
            _ if index == 0 => (1..=3).contains(&whole),
            _ => whole == 3,
        }
    })
}

/// The power of ten that begins right here: `-3` of "e-3", when digits follow and then nothing or a space.
fn exponent(characters: &[char]) -> Option<String> {
    let mut rest = characters.iter().copied();
    rest.next().filter(|first| matches!(first, 'e' | 'E'))?;
    let text: String = rest.take_while(|character| !character.is_whitespace()).collect();
    let digits = text.strip_prefix(|first| is_minus(first) || first == '+').unwrap_or(&text);
    let is_number = (1..=3).contains(&digits.len()) && digits.chars().all(|c| c.is_ascii_digit());
    is_number.then_some(text)
}

/// What a number's marks can mean.
#[derive(Debug, PartialEq)]
pub(crate) enum Marks {
    /// One reading, with a point.
    One(String),
    /// One reading with a point if the mark is decimal, and one without it if the mark parts thousands.
    DecimalOrThousands(String, String),
    /// Two readings, each with a point or none.
    Two(String, String),
    /// Marks in places that make no number.
    None,
}

/// What the marks of a body of digits can mean.
pub(crate) fn marks(parts: &Parts) -> Marks {
    let body = parts.body.as_str();
    let pieces: Vec<&str> = body.split(is_mark).collect();
    let typed: Vec<char> = body.chars().filter(|character| is_mark(*character)).collect();
    match typed.as_slice() {
        [] => Marks::One(body.to_owned()),
        [_] => {
            let decimal = format!("{}.{}", pieces[0], pieces[1]);
            let could_part_thousands = pieces[1].len() == 3
                && (1..=3).contains(&pieces[0].len())
                && !pieces[0].starts_with('0')
                && !parts.parted
                && parts.exponent.is_none();
            if could_part_thousands {
                Marks::DecimalOrThousands(decimal, pieces.concat())
            } else {
                Marks::One(decimal)
            }
        }
        _ if pieces.iter().any(|piece| piece.is_empty())
            || parts.parted
            || parts.exponent.is_some() =>
        {
            Marks::None
        }
        // "1.234,5": decimal at the comma, or at the point.
        [first, second] if first != second => Marks::Two(
            format!("{}{}.{}", pieces[0], pieces[1], pieces[2]),
            format!("{}.{}{}", pieces[0], pieces[1], pieces[2]),
        ),
        several => {
            let [leading @ .., last] = several else { return Marks::None };
            let whole = &pieces[..pieces.len() - 1];
            let thousands = |pieces: &[&str]| {
                pieces[0].len() <= 3 && pieces[1..].iter().all(|piece| piece.len() == 3)
            };
            let (all, decimals) = (pieces.concat(), pieces[pieces.len() - 1]);
            let same = leading.iter().all(|mark| mark == &leading[0]);
            if same && thousands(whole) && (leading[0] != *last || decimals.len() == 3) {
                Marks::Two(format!("{}.{decimals}", whole.concat()), all)
            } else {
                Marks::None
            }
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn body(text: &str) -> (bool, String, String) {
        let parts = take_apart(text).unwrap();
        (parts.negative, parts.body, parts.rest)
    }

    fn apart(negative: bool, body: &str, rest: &str) -> (bool, String, String) {
        (negative, body.to_owned(), rest.to_owned())
    }

    #[test]
    fn spaces_and_apostrophes_part_thousands() {
        for text in [
            "12 400",
            "12\u{a0}400",
            "12\u{202f}400",
            "12\u{2009}400",
            "12'400",
            "12’400",
            "12_400",
        ] {
            assert_eq!(body(text), apart(false, "12400", ""), "{text}");
        }
        assert_eq!(body("1 234 567,125 5"), apart(false, "1234567,1255", ""));
        assert_eq!(body("17 , 5"), apart(false, "17,5", ""));
    }

    #[test]
    fn digits_that_are_no_thousands_are_two_numbers() {
        for text in ["21 5", "5 6", "1 23", "12 40 0", "1 2345", "1234 567", "5'6", "1.2 3"] {
            assert_eq!(take_apart(text), Err(Trouble::TwoNumbers), "{text}");
        }
    }

    #[test]
    fn a_foot_mark_is_no_part_of_the_number() {
        assert_eq!(body("5280'"), apart(false, "5280", "'"));
        assert_eq!(body("5280' "), apart(false, "5280", "'"));
    }

    #[test]
    fn every_minus_is_one_and_only_one_sign_is_taken() {
        for text in ["-5", "−5", "–5", "—5", "‐5", "‑5", "‒5", "－5", "- 5", "5-", "5−", "5 –"]
        {
            assert_eq!(body(text), apart(true, "5", ""), "{text}");
        }
        assert_eq!(body("+5"), apart(false, "5", ""));
        for text in [
            "--5", "+-5", "-+5", "-5-", "5-6", "5--", "-", "", "+", ".", "-,", "x", "F 55", "±5",
            "5- C",
        ] {
            assert_eq!(take_apart(text), Err(Trouble::NoNumber), "{text}");
        }
    }

    #[test]
    fn a_power_of_ten_ends_at_a_space() {
        let parts = take_apart("9.1e−3 kg/kg").unwrap();
        assert_eq!((parts.exponent.as_deref(), parts.rest.as_str()), (Some("-3"), "kg/kg"));
        assert_eq!(take_apart("1e5cfm").unwrap().rest, "e5cfm");
        assert_eq!(take_apart("5 E").unwrap().rest, "E");
    }

    #[test]
    fn marks_have_one_reading_or_two() {
        let of = |text: &str| marks(&take_apart(text).unwrap());
        let two = |one: &str, other: &str| Marks::Two(one.to_owned(), other.to_owned());
        assert_eq!(of("17,1"), Marks::One("17.1".to_owned()));
        assert_eq!(of(",5"), Marks::One(".5".to_owned()));
        assert_eq!(of("0.125"), Marks::One("0.125".to_owned()));
        assert_eq!(of("1 234.567"), Marks::One("1234.567".to_owned()));
        assert_eq!(
            of("10,000"),
            Marks::DecimalOrThousands("10.000".to_owned(), "10000".to_owned())
        );
        assert_eq!(of("1.234,5"), two("1234.5", "1.2345"));
        assert_eq!(of("1,234.5"), two("1234.5", "1.2345"));
        assert_eq!(of("1,234,567"), two("1234.567", "1234567"));
        assert_eq!(of("1.234.567,8"), two("1234567.8", "12345678"));
        for text in ["1,,5", "1.2.3", "1.,5", ",1.5", "1,234,56", "12,34,567.8"] {
            assert_eq!(of(text), Marks::None, "{text}");
        }
    }
}
