//! What the app may do on a device, and what the screens may ask of it. Each line here is a promise to the person who
//! installs the app: a test that fails is not to be mended by widening it.

use std::fs;
use std::path::{Path, PathBuf};

use roxmltree::{Document, Node};
use serde_json::{Value, json};

const ANDROID: &str = "http://schemas.android.com/apk/res/android";
const TOOLS: &str = "http://schemas.android.com/tools";

fn here(path: &str) -> PathBuf {
    Path::new(env!("CARGO_MANIFEST_DIR")).join(path)
}

fn text(path: &str) -> String {
    fs::read_to_string(here(path)).unwrap_or_else(|fault| panic!("{path}: {fault}"))
}

fn android(path: &str) -> String {
    text(&format!("gen/android/app/src/{path}"))
}

fn value(path: &str) -> Value {
    serde_json::from_str(&text(path)).unwrap_or_else(|fault| panic!("{path}: {fault}"))
}

fn named<'a>(document: &'a Document<'a>, tag: &'a str) -> impl Iterator<Item = Node<'a, 'a>> {
    document.descendants().filter(move |node| node.has_tag_name(tag))
}

/// Every `uses-permission` of a manifest, in all its spellings, as its name and whether it is there to be removed.
fn permissions(manifest: &str) -> Vec<(String, bool)> {
    let document = Document::parse(manifest).expect("a manifest is well formed");
    document
        .descendants()
        .filter(|node| node.tag_name().name().starts_with("uses-permission"))
        .map(|node| {
            let name =
                node.attribute((ANDROID, "name")).expect("a permission has a name").to_owned();
            (name, node.attribute((TOOLS, "node")) == Some("remove"))
        })
        .collect()
}

#[test]
fn the_installed_app_asks_for_no_permission() {
    assert_eq!(permissions(&android("main/AndroidManifest.xml")), []);
}

#[test]
fn the_release_takes_the_network_from_every_library() {
    assert_eq!(
        permissions(&android("release/AndroidManifest.xml")),
        ["INTERNET", "ACCESS_NETWORK_STATE"]
            .map(|name| (format!("android.permission.{name}"), true))
    );
}

#[test]
fn a_debug_build_gets_the_network_and_nothing_more() {
    assert_eq!(
        permissions(&android("debug/AndroidManifest.xml")),
        [("android.permission.INTERNET".to_owned(), false)]
    );
}

#[test]
fn no_other_manifest_stands_beside_these() {
    let mut sets: Vec<_> = fs::read_dir(here("gen/android/app/src"))
        .unwrap()
        .map(|entry| entry.unwrap().file_name().into_string().unwrap())
        .collect();
    sets.sort();
    assert_eq!(sets, ["debug", "main", "release"], "a source set can bring a manifest of its own");
}

#[test]
fn only_the_launcher_can_start_a_part_of_the_app() {
    let manifest = android("main/AndroidManifest.xml");
    let document = Document::parse(&manifest).unwrap();
    let parts: Vec<_> = named(&document, "application")
        .flat_map(|application| application.children().filter(Node::is_element))
        .map(|part| {
            (
                part.tag_name().name(),
                part.attribute((ANDROID, "name")),
                part.attribute((ANDROID, "exported")),
            )
        })
        .collect();
    assert_eq!(
        parts,
        [
            ("activity", Some(".MainActivity"), Some("true")),
            ("provider", Some("androidx.core.content.FileProvider"), Some("false")),
        ]
    );

    let filters: Vec<_> = named(&document, "intent-filter")
        .flat_map(|filter| filter.children().filter(Node::is_element))
        .map(|part| (part.tag_name().name(), part.attribute((ANDROID, "name"))))
        .collect();
    assert_eq!(
        filters,
        [
            ("action", Some("android.intent.action.MAIN")),
            ("category", Some("android.intent.category.LAUNCHER")),
        ]
    );
}

#[test]
fn of_other_apps_only_the_camera_is_seen() {
    let manifest = android("main/AndroidManifest.xml");
    let document = Document::parse(&manifest).unwrap();
    let seen: Vec<_> = named(&document, "queries")
        .flat_map(|queries| queries.descendants().skip(1).filter(Node::is_element))
        .map(|node| (node.tag_name().name(), node.attribute((ANDROID, "name"))))
        .collect();
    assert_eq!(seen, [("intent", None), ("action", Some("android.media.action.IMAGE_CAPTURE"))]);
}

#[test]
fn only_photographs_can_be_handed_to_another_app() {
    let paths = android("main/res/xml/file_paths.xml");
    let document = Document::parse(&paths).unwrap();
    let shared: Vec<_> = document
        .root_element()
        .children()
        .filter(Node::is_element)
        .map(|node| (node.tag_name().name(), node.attribute("path")))
        .collect();
    assert_eq!(shared, [("external-files-path", Some("Pictures/"))]);
}

#[test]
fn the_ledger_never_goes_to_a_cloud_account_but_moves_to_a_new_phone() {
    let manifest = android("main/AndroidManifest.xml");
    let document = Document::parse(&manifest).unwrap();
    let application = named(&document, "application").next().unwrap();
    assert_eq!(
        application.attribute((ANDROID, "dataExtractionRules")),
        Some("@xml/data_extraction_rules")
    );
    assert_eq!(application.attribute((ANDROID, "fullBackupContent")), Some("@xml/backup_rules"));

    let old = android("main/res/xml/backup_rules.xml");
    let old = Document::parse(&old).unwrap();
    assert_all_excluded(
        old.root_element(),
        &["root", "file", "database", "sharedpref", "external"],
    );

    let new = android("main/res/xml/data_extraction_rules.xml");
    let new = Document::parse(&new).unwrap();
    let cloud = named(&new, "cloud-backup").next().unwrap();
    assert_all_excluded(
        cloud,
        &[
            "root",
            "file",
            "database",
            "sharedpref",
            "external",
            "device_root",
            "device_file",
            "device_database",
            "device_sharedpref",
        ],
    );

    let carried: Vec<_> = named(&new, "device-transfer")
        .flat_map(|transfer| transfer.children().filter(Node::is_element))
        .map(|rule| {
            (
                rule.tag_name().name(),
                rule.attribute("domain"),
                rule.attribute("path").unwrap().to_owned(),
            )
        })
        .collect();
    let ledger = dewledger_window::LEDGER_FILE;
    assert_eq!(
        carried,
        [
            ("include", Some("root"), ledger.to_owned()),
            ("include", Some("root"), format!("{ledger}-wal"))
        ]
    );
}

/// Each domain is excluded whole, and nothing is let back in.
fn assert_all_excluded(rules: Node<'_, '_>, domains: &[&str]) {
    let found: Vec<_> = rules
        .children()
        .filter(Node::is_element)
        .map(|rule| (rule.tag_name().name(), rule.attribute("domain"), rule.attribute("path")))
        .collect();
    let wanted: Vec<_> =
        domains.iter().map(|domain| ("exclude", Some(*domain), Some("."))).collect();
    assert_eq!(found, wanted);
}

#[test]
fn the_screens_may_call_the_one_command_and_nothing_else() {
    let files: Vec<_> = fs::read_dir(here("capabilities"))
        .unwrap()
        .map(|entry| entry.unwrap().file_name())
        .collect();
    assert_eq!(files, ["main.json"]);

    let capability = value("capabilities/main.json");
    assert_eq!(capability["permissions"], json!(["allow-ask"]));
    assert_eq!(capability["windows"], json!(["main"]));
    assert_eq!(capability.get("remote"), None, "no page from elsewhere may call it");

    let security = &value("tauri.conf.json")["app"]["security"];
    assert_eq!(security["capabilities"], json!(["main"]));
}

#[test]
fn the_content_policy_lets_nothing_in_from_outside() {
    let security = &value("tauri.conf.json")["app"]["security"];
    assert_eq!(security["freezePrototype"], json!(true));
    assert_eq!(
        security["csp"],
        json!({
            "default-src": "'none'",
            "script-src": "'self'",
            "style-src": "'self'",
            "img-src": "'self' data:",
            "font-src": "'self'",
            "connect-src": "ipc: http://ipc.localhost",
            "base-uri": "'none'",
            "form-action": "'none'",
            "frame-ancestors": "'none'",
        })
    );
    for loosening in [
        "devCsp",
        "assetProtocol",
        "dangerousDisableAssetCspModification",
        "dangerousRemoteDomainIpcAccess",
    ] {
        assert_eq!(security.get(loosening), None, "{loosening}");
    }
    assert_eq!(
        value("tauri.conf.json")["build"].get("devUrl"),
        None,
        "the screens come out of the program"
    );
}

#[test]
fn the_android_build_calls_the_same_app() {
    let gradle = text("gen/android/app/build.gradle.kts");
    let config = value("tauri.conf.json");
    let identifier = config["identifier"].as_str().unwrap();
    assert!(gradle.contains(&format!("applicationId = \"{identifier}\"")));
    assert!(gradle.contains(&format!("minSdk = {}", config["bundle"]["android"]["minSdkVersion"])));

    // The tauri command from the npm registry writes its own runtime here; the project is built by cargo alone.
    let task = text("gen/android/buildSrc/src/main/java/app/dewledger/field/kotlin/BuildTask.kt");
    assert!(task.contains("val executable = \"\"\"cargo\"\"\""));
}
