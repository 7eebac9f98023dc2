//! Lists the screens of `ui/` so that the program carries them.

use std::fmt::Write as _;
use std::path::{Path, PathBuf};
use std::{env, fs};

fn main() {
    let root =
        PathBuf::from(env::var_os("CARGO_MANIFEST_DIR").expect("cargo sets it")).join("../../ui");
    let root = root.canonicalize().unwrap_or(root);
    println!("cargo::rerun-if-changed={}", root.display());
    let mut files = Vec::new();
    collect(&root, &mut files);
    files.sort();
    let mut code = String::from(
        "/// Path below the root and content of every file of the screens.\npub(crate) static FILES: &[(&str, &[u8])] = &[\n",
    );
    for file in files {
        println!("cargo::rerun-if-changed={}", file.display());
        let path =
            file.strip_prefix(&root).expect("found below it").to_string_lossy().replace('\\', "/");
        writeln!(code, "    ({path:?}, include_bytes!({:?})),", file.display().to_string())
            .expect("a string takes it");
    }
    code.push_str("];\n");
    let out = PathBuf::from(env::var_os("OUT_DIR").expect("cargo sets it")).join("screens.rs");
    fs::write(out, code).expect("the build folder can be written");
}

fn collect(folder: &Path, files: &mut Vec<PathBuf>) {
    let Ok(entries) = fs::read_dir(folder) else { return };
    for entry in entries.flatten() {
        let path = entry.path();
        if path.is_dir() {
            println!("cargo::rerun-if-changed={}", path.display());
            collect(&path, files);
        } else {
            files.push(path);
        }
    }
}
