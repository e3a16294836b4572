//! The extension for VS Code: packaged, unpacked, and loaded by Node beside a stand-in for the
//! editor's own module. The extension, its language client and the server are the real ones.

use std::path::Path;
use std::process::{Command, Stdio};

use crate::desk::{self, Desk, LICENCE, LICENSED, MEND, MENDED, PARALLEL_FIFTHS};
use crate::said::Said;

#[test]
fn the_extension_for_vs_code() {
    let Some(npm) = std::env::var_os("PARTWRIGHT_NPM") else {
        println!("left out: no npm; `cargo xtask test` looks for it");
        return;
    };
    let desk = Desk::new();
    let packed = package(npm.as_ref(), &desk);
    let mut said = run(&packed, &desk);

    said.exactly("packed [Content_Types].xml");
    said.exactly("packed extension.vsixmanifest");
    said.exactly("packed extension/dist/extension.js");
    said.exactly("packed extension/dist/notices.txt");
    said.exactly("packed extension/language-configuration.json");
    said.exactly("packed extension/package.json");
    said.exactly("packed extension/readme.md");
    let bundled = said.after("bundled ");
    assert!(
        ["vscode-languageclient", "vscode-jsonrpc", "semver"]
            .iter()
            .all(|name| bundled.split(' ').any(|word| word == *name)),
        "{bundled}"
    );
    said.exactly("without a notice: none");
    said.exactly("manifest partwright.voicesheet, depends on 0");
    said.exactly("language voicesheet, .voices, comment //");
    said.exactly("words S F♯4 Bb2 C 𝄪");
    said.exactly("activation onLanguage:voicesheet");

    said.exactly("started partwright serve");
    said.exactly("commands without a declaration 0");
    said.exactly("findings 1");
    said.exactly("finding 6:21 severity 0 partwright parallel-fifths");
    said.exactly(&format!("message {PARALLEL_FIFTHS}"));

    let offered = said.all("offered ");
    assert_eq!(offered.first().unwrap(), &format!("first {MEND}"));
    assert_eq!(offered.last().unwrap(), LICENCE);
    said.exactly(&format!("chose {MEND}"));
    said.exactly(&format!("changed {MENDED}"));
    said.exactly(&format!("chose {LICENCE}"));
    for line in LICENSED {
        said.exactly(&format!("changed {line}"));
    }
    said.exactly("as a motet opening-interval, parallel-fifths, spacing");

    let error = said.after("error ");
    assert!(error.contains("\"no-such-program\""), "{error}");
    said.exactly("findings 0");
    said.exactly("started partwright serve");
    said.exactly("another true");
    said.exactly("started partwright serve");
    said.exactly("errors 0");
    said.exactly("commands left 0");
    said.end();
}

/// Packages it as its page says, but for the place of the package.
fn package(npm: &Path, desk: &Desk) -> std::path::PathBuf {
    let folder = desk::root().join("editors/vscode");
    assert!(
        folder.join("node_modules").is_dir(),
        "Run `npm ci` in editors/vscode first, or `cargo xtask test`."
    );
    let packed = desk.path().join("voicesheet.vsix");
    let output = Command::new(npm)
        .args(["run", "package", "--", "--out"])
        .arg(&packed)
        .current_dir(&folder)
        .stdin(Stdio::null())
        .output()
        .unwrap();
    assert!(
        output.status.success(),
        "{}{}",
        String::from_utf8_lossy(&output.stdout),
        String::from_utf8_lossy(&output.stderr)
    );
    packed
}

fn run(packed: &Path, desk: &Desk) -> Said {
    let empty = desk.path().join("unpacked");
    std::fs::create_dir(&empty).unwrap();
    let child = Command::new("node")
        .arg(desk::root().join("tests/editors/vscode/composer.cjs"))
        .arg(packed)
        .arg(empty)
        .arg(desk.sheet())
        .arg(desk::program())
        .arg(desk::root().join("editors/vscode/node_modules"))
        .env("PATH", desk::path_with_program())
        .current_dir(desk.path())
        .stdin(Stdio::null())
        .stdout(std::fs::File::create(desk.path().join("out")).unwrap())
        .stderr(std::fs::File::create(desk.path().join("err")).unwrap())
        .spawn()
        .unwrap();
    let status = desk::end(child);
    let out = desk.read("out");
    assert!(
        status.is_some_and(|status| status.success()),
        "Node ended with {status:?}.\n{out}\n-- standard error\n{}",
        desk.read("err"),
    );
    Said::new(&out)
}
