//! The hand that types and taps: finds things by what a person sees.

use std::time::{Duration, Instant};

use fantoccini::elements::Element;
use fantoccini::{Client, Locator};

/// How long a screen may take to show something.
const PATIENCE: Duration = Duration::from_secs(15);

/// Types and taps in a session.
#[derive(Debug, Clone)]
pub struct Hand {
    client: Client,
}

/// A text as a literal of the path language; none of the tests' texts holds both kinds of quotation mark.
fn literal(text: &str) -> String {
    if text.contains('\'') { format!("\"{text}\"") } else { format!("'{text}'") }
}

impl Hand {
    /// A hand for a session.
    #[must_use]
    pub fn new(client: &Client) -> Self {
        Self { client: client.clone() }
    }

    /// Something that is there, or comes.
    pub async fn find(&self, locator: Locator<'_>) -> Element {
        match tokio::time::timeout(
            PATIENCE * 2,
            self.client.wait().at_most(PATIENCE).for_element(locator),
        )
        .await
        {
            Ok(Ok(element)) => element,
            other => panic!(
                "{locator:?} does not come: {:?}\n{}",
                other.map(|r| r.err()),
                self.page().await
            ),
        }
    }

    /// Taps a button or link that says this (its text begins so).
    pub async fn tap(&self, says: &str) {
        let says = literal(says);
        let path = format!(
            "(//*[self::button or self::a][starts-with(normalize-space(.), {says})][not(ancestor-or-self::*[@hidden])])[last()]"
        );
        let element = self.find(Locator::XPath(&path)).await;
        // Through the page: a bar at the bottom may lie over what is far down, and a person would scroll.
        self.client
            .execute(
                "arguments[0].scrollIntoView({block: 'center'}); arguments[0].click();",
                vec![serde_json::to_value(&element).expect("an element crosses")],
            )
            .await
            .unwrap_or_else(|error| panic!("{says} cannot be tapped: {error}"));
        self.settle().await;
    }

    /// Taps the button of this id.
    pub async fn press(&self, id: &str) {
        let element = self.find(Locator::Id(id)).await;
        self.client
            .execute(
                "arguments[0].scrollIntoView({block: 'center'}); arguments[0].click();",
                vec![serde_json::to_value(&element).expect("an element crosses")],
            )
            .await
            .unwrap_or_else(|error| panic!("{id} cannot be tapped: {error}"));
        self.settle().await;
    }

    /// Picks from the list of this id what says this.
    pub async fn pick(&self, id: &str, says: &str) {
        let list = self.find(Locator::Id(id)).await;
        list.select_by_label(says)
            .await
            .unwrap_or_else(|error| panic!("{id} has no “{says}”: {error}"));
        self.settle().await;
    }

    /// Goes where a link of the page leads whose address holds this.
    pub async fn follow(&self, part: &str) {
        let path = format!("(//a[contains(@href, {})])[1]", literal(part));
        let element = self.find(Locator::XPath(&path)).await;
        let to = element.attr("href").await.ok().flatten().unwrap_or_default();
        self.go(&to).await;
    }

    /// The address of the screen, behind the number sign and with it.
    pub async fn address(&self) -> String {
        let hash = self.client.execute("return location.hash;", Vec::new()).await;
        hash.ok().and_then(|hash| hash.as_str().map(str::to_owned)).unwrap_or_default()
    }

    /// Types into the field of this key, over what stands there.
    pub async fn type_into(&self, key: &str, text: &str) {
        let id = format!("field-{}", key.replace('.', "-"));
        self.type_at(&id, text).await;
    }

    /// Types into the input of this id, over what stands there.
    pub async fn type_at(&self, id: &str, text: &str) {
        let element = self.find(Locator::Id(id)).await;
        element.clear().await.unwrap_or_else(|error| panic!("{id} cannot be cleared: {error}"));
        element.send_keys(text).await.unwrap_or_else(|error| panic!("{id} takes no text: {error}"));
        self.settle().await;
    }

    /// Chooses an option of a choice field.
    pub async fn choose(&self, key: &str, option: &str) {
        let id = format!("field-{}", key.replace('.', "-"));
        let element = self.find(Locator::Id(&id)).await;
        self.client
            .execute(
                "arguments[0].scrollIntoView({block: 'center'}); arguments[0].click();",
                vec![serde_json::to_value(&element).expect("an element crosses")],
            )
            .await
            .unwrap_or_else(|error| panic!("{key} does not open: {error}"));
        let path = format!(
            "//*[@role='radio' or self::button][contains(normalize-space(.), {})]",
            literal(option)
        );
        let option = self.find(Locator::XPath(&path)).await;
        option
            .click()
            .await
            .unwrap_or_else(|error| panic!("the option does not take a tap: {error}"));
        self.settle().await;
    }

    /// Waits until the page says this.
    pub async fn sees(&self, text: &str) {
        let until = Instant::now() + PATIENCE;
        loop {
            let page = self.page().await;
            if page.contains(text) {
                return;
            }
            assert!(Instant::now() < until, "the page does not say “{text}”:\n{page}");
            tokio::time::sleep(Duration::from_millis(50)).await;
        }
    }

    /// What the page says, no-break spaces as spaces.
    pub async fn page(&self) -> String {
        let text = self.client.execute("return document.body.innerText;", Vec::new()).await;
        text.ok()
            .and_then(|text| text.as_str().map(|text| text.replace('\u{a0}', " ")))
            .unwrap_or_default()
    }

    /// Goes to a screen by its address.
    pub async fn go(&self, hash: &str) {
        self.client
            .execute("location.hash = arguments[0];", vec![hash.into()])
            .await
            .unwrap_or_else(|error| panic!("{hash} does not open: {error}"));
        self.settle().await;
    }

    /// Two frames and a little more: what was typed has been answered and drawn.
    async fn settle(&self) {
        tokio::time::sleep(Duration::from_millis(120)).await;
    }
}
