//! A folder with the demo in it, and the program run there.

use std::ffi::OsStr;
use std::path::Path;

use assert_cmd::Command;
use assert_cmd::cargo::cargo_bin_cmd;
use tempfile::TempDir;

/// What came of one run.
#[derive(Debug)]
pub struct Said {
    /// Exit status.
    pub status: i32,
    /// Standard output.
    pub out: String,
    /// Standard error.
    pub err: String,
}

/// A new folder.
pub fn folder() -> TempDir {
    TempDir::new().expect("a temporary folder")
}

/// A new folder with the demo rails and catalogs.
pub fn demo() -> TempDir {
    let folder = folder();
    assert_eq!(run(folder.path(), ["starter", "."]).status, 0);
    folder
}

/// The program, to be run in `folder` without colours.
pub fn command(folder: &Path) -> Command {
    let mut command = cargo_bin_cmd!("wattsieve");
    command.current_dir(folder).env_remove("CLICOLOR_FORCE").env("NO_COLOR", "1");
    command
}

/// Runs the program in `folder`.
pub fn run<S: AsRef<OsStr>>(folder: &Path, arguments: impl IntoIterator<Item = S>) -> Said {
    said(command(folder).args(arguments))
}

/// Runs the program in `folder` with `text` on standard input.
pub fn run_with<S: AsRef<OsStr>>(folder: &Path, arguments: impl IntoIterator<Item = S>, text: &str) -> Said {
    said(command(folder).args(arguments).write_stdin(text))
}

fn said(command: &mut Command) -> Said {
    let output = command.output().expect("the program runs");
    let text = |bytes: Vec<u8>| String::from_utf8(bytes).expect("UTF-8");
    Said {
        status: output.status.code().expect("it ended by itself"),
        out: text(output.stdout),
        err: text(output.stderr),
    }
}

/// The text of a file in `folder`.
pub fn text(folder: &Path, name: &str) -> String {
    std::fs::read_to_string(folder.join(name)).expect("a file of text")
}

/// Writes a file in `folder`.
pub fn write(folder: &Path, name: &str, text: &str) {
    std::fs::write(folder.join(name), text).expect("a file is written");
}

/// Replaces the only `old` in a file of `folder`.
pub fn edit(folder: &Path, name: &str, old: &str, new: &str) {
    let before = text(folder, name);
    assert_eq!(before.matches(old).count(), 1, "`{old}` in {name}");
    write(folder, name, &before.replace(old, new));
}

/// The names in a folder, sorted.
pub fn names(folder: &Path) -> Vec<String> {
    let entries = std::fs::read_dir(folder).expect("a folder");
    let mut names: Vec<_> =
        entries.map(|entry| entry.expect("an entry").file_name().to_string_lossy().into_owned()).collect();
    names.sort();
    names
}

/// Replaces the cell of `column` in the line `line` of a catalog without quotes; the column at which the cell begins.
pub fn spoil(folder: &Path, catalog: &str, line: usize, column: &str, cell: &str) -> usize {
    let before = text(folder, catalog);
    let mut lines: Vec<String> = before.lines().map(str::to_owned).collect();
    let place = lines[0].split(',').position(|name| name == column).expect("the column");
    let mut cells: Vec<&str> = lines[line - 1].split(',').collect();
    cells[place] = cell;
    let at = cells[..place].iter().map(|before| before.chars().count() + 1).sum::<usize>() + 1;
    lines[line - 1] = cells.join(",");
    write(folder, catalog, &(lines.join("\n") + "\n"));
    at
}

/// The stage that comes first in the demo, as JSON.
pub fn first_stage() -> String {
    let list = run(folder().path(), ["shortlist", "--format", "json", "--top", "1"]).out;
    let list: serde_json::Value = serde_json::from_str(&list).expect("JSON");
    list["stages"][0]["stage"].to_string()
}
