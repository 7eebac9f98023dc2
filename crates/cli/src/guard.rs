//! Who may ask the server: this machine, this page, with the key.

/// The key of one run of the server: 256 random bits, in hexadecimal.
#[derive(Debug, Clone)]
pub(crate) struct Key(String);

impl Key {
    /// A new one from the system's random source.
    pub(crate) fn new() -> Result<Self, getrandom::Error> {
        use std::fmt::Write as _;
        let mut random = [0_u8; 32];
        getrandom::fill(&mut random)?;
        let mut text = String::with_capacity(64);
        for byte in random {
            // Writing to a string cannot fail.
            let _ = write!(text, "{byte:02x}");
        }
        Ok(Self(text))
    }

    /// The key as it stands in the address.
    pub(crate) fn text(&self) -> &str {
        &self.0
    }

    /// Whether a header brings it; takes as long for a wrong key as for the right one.
    pub(crate) fn opens(&self, brought: Option<&str>) -> bool {
        let brought = brought.unwrap_or("").as_bytes();
        let own = self.0.as_bytes();
        let differing =
            own.iter().zip(brought).fold(0_u8, |sum, (own, brought)| sum | (own ^ brought));
        brought.len() == own.len() && differing == 0
    }
}

/// Whether a request is meant for this server: a page on another name that leads here (DNS rebinding) is not.
pub(crate) fn for_this_host(host: Option<&str>, port: u16) -> bool {
    host.is_some_and(|host| {
        host == format!("127.0.0.1:{port}") || host == format!("localhost:{port}")
    })
}

/// Whether a request comes from the server's own page, or from no page at all.
pub(crate) fn from_own_page(origin: Option<&str>, port: u16) -> bool {
    origin.is_none_or(|origin| {
        origin == format!("http://127.0.0.1:{port}") || origin == format!("http://localhost:{port}")
    })
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn only_the_key_opens() {
        let key = Key::new().unwrap();
        assert_eq!(key.text().len(), 64);
        assert!(key.opens(Some(key.text())));
        assert!(!key.opens(None));
        assert!(!key.opens(Some("")));
        assert!(!key.opens(Some(&key.text()[..63])));
        assert!(!key.opens(Some(Key::new().unwrap().text())));
    }

    #[test]
    fn other_hosts_and_pages_are_not_served() {
        assert!(for_this_host(Some("127.0.0.1:8080"), 8080));
        for host in [
            None,
            Some("127.0.0.1"),
            Some("127.0.0.1:8081"),
            Some("evil.example:8080"),
            Some("[::1]:8080"),
        ] {
            assert!(!for_this_host(host, 8080), "{host:?}");
        }
        assert!(from_own_page(None, 8080));
        assert!(from_own_page(Some("http://localhost:8080"), 8080));
        for origin in
            ["null", "http://evil.example", "https://127.0.0.1:8080", "http://127.0.0.1:1"]
        {
            assert!(!from_own_page(Some(origin), 8080), "{origin}");
        }
    }
}
