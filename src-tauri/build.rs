//! Embeds the screens and writes the permission of the one command.

use tauri_build::{AppManifest, Attributes};

fn main() {
    // Naming the command makes it refuse every window whose capability does not list `allow-ask`.
    let manifest = AppManifest::new().commands(&["ask"]);
    tauri_build::try_build(Attributes::new().app_manifest(manifest))
        .expect("tauri.conf.json, the capability and the icon are part of this folder");
}
