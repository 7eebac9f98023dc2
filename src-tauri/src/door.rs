//! Where the window may go: to its own screens, and nowhere else.

use tauri::Url;

/// Whether an address is one of the app's own screens, which come out of the program itself.
///
/// The content security policy does not govern navigation, so a link, a dropped file or a script is stopped here.
pub(crate) fn is_own(address: &Url) -> bool {
    // Android's and Windows' web views know no scheme of the app's own and are given a host name in its place,
    // which is answered inside the process.
    let own = if cfg!(any(windows, target_os = "android")) {
        ("http", "tauri.localhost")
    } else {
        ("tauri", "localhost")
    };
    (address.scheme(), address.host_str().unwrap_or_default()) == own && address.port().is_none()
}

#[cfg(test)]
mod tests {
    use super::*;

    fn goes(address: &str) -> bool {
        is_own(&Url::parse(address).unwrap())
    }

    #[test]
    #[cfg(not(any(windows, target_os = "android")))]
    fn own_screens_open() {
        assert!(goes("tauri://localhost/"));
        assert!(goes("tauri://localhost/index.html#/checks/air_heat"));
    }

    #[test]
    fn everything_else_stays_shut() {
        for address in [
            "https://tauri.localhost/",
            "http://localhost/",
            "http://127.0.0.1:8080/",
            "https://example.com/",
            "tauri://localhost.example.com/",
            "tauri://example.com/localhost",
            "tauri://localhost:81/",
            "http://tauri.localhost:81/",
            "file:///etc/hostname",
            "data:text/html,x",
            "javascript:void(0)",
            "blob:tauri://localhost/0",
            "about:blank",
        ] {
            assert!(!goes(address), "{address} must not open");
        }
    }
}
