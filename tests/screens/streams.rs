//! `-`, pipes, and what goes to which stream.

use std::io::Write;
use std::process::{Command, Stdio};

use serde_json::Value;

use super::ground::{demo, edit, folder, run, run_with, text};

#[test]
fn a_rail_is_read_from_standard_input() {
    let folder = demo();
    let rail = text(folder.path(), "rail.toml");
    let piped = run_with(folder.path(), ["shortlist", "-", "--format", "csv"], &rail);
    let named = run(folder.path(), ["shortlist", "rail.toml", "--format", "csv"]);
    assert_eq!((piped.status, piped.out), (0, named.out));
}

#[test]
fn out_to_a_dash_is_standard_output() {
    let folder = demo();
    let dash = run(folder.path(), ["rail", "rail.toml", "--out", "-"]);
    assert_eq!((dash.status, dash.out), (0, run(folder.path(), ["rail", "rail.toml"]).out));
}

#[test]
fn the_stage_of_a_result_is_accounted_for_from_standard_input() {
    let folder = demo();
    let list = run(folder.path(), ["shortlist", "rail.toml", "--format", "json"]).out;
    let list: Value = serde_json::from_str(&list).expect("JSON");
    let third = &list["stages"][2];
    let arguments = ["account", "rail.toml", "--stage", "-", "--format", "json"];
    let said = run_with(folder.path(), arguments, &third["stage"].to_string());
    let account: Value = serde_json::from_str(&said.out).expect("JSON");
    for key in ["stage", "burden", "cost", "area_mm2", "weighted_loss_w", "weighted_efficiency"] {
        assert_eq!(account[key], third[key], "{key}");
    }
}

#[test]
fn a_saved_shortlist_gives_its_stages_back() {
    let folder = demo();
    assert_eq!(run(folder.path(), ["shortlist", "rail.toml", "--save", "saved.json"]).status, 0);
    for rank in ["1", "7"] {
        let saved = run(folder.path(), ["account", "rail.toml", "--from", "saved.json", "--rank", rank]);
        let fresh = run(folder.path(), ["account", "rail.toml", "--rank", rank]);
        assert_eq!((saved.status, saved.out), (0, fresh.out), "{}", saved.err);
    }
    let beyond = run(folder.path(), ["account", "rail.toml", "--from", "saved.json", "--rank", "11"]);
    assert_eq!(beyond.status, 2);
    assert!(beyond.err.contains("10 stages"), "{}", beyond.err);
}

#[test]
fn a_reader_who_leaves_early_is_no_error() {
    let folder = demo();
    let mut child = Command::new(assert_cmd::cargo::cargo_bin!("wattsieve"))
        .current_dir(folder.path())
        .args(["shortlist", "-", "--catalogs", "."])
        .stdin(Stdio::piped())
        .stdout(Stdio::piped())
        .stderr(Stdio::piped())
        .spawn()
        .expect("it starts");
    drop(child.stdout.take());
    let rail = text(folder.path(), "rail.toml");
    // The program waits for its rail, so its output is closed before it can begin to write.
    child.stdin.take().expect("its input").write_all(rail.as_bytes()).expect("it reads");
    let output = child.wait_with_output().expect("it ends");
    assert_eq!((output.status.code(), String::from_utf8_lossy(&output.stderr).as_ref()), (Some(0), ""));
}

#[test]
fn warnings_go_to_standard_error_and_quiet_keeps_them_back() {
    let folder = demo();
    edit(folder.path(), "diodes.csv", "part,maker,", "part,mood,");
    let loud = run(folder.path(), ["shortlist", "rail.toml", "--format", "csv"]);
    let quiet = run(folder.path(), ["shortlist", "rail.toml", "--format", "csv", "--quiet"]);
    assert!(loud.err.contains("diodes.csv:1:6: warning") && loud.err.contains("`mood`"), "{}", loud.err);
    assert_eq!((loud.status, quiet.status, quiet.err.as_str()), (0, 0, ""));
    assert_eq!(loud.out, quiet.out);
}

#[test]
fn colours_are_asked_for_or_absent() {
    let never = run(demo().path(), ["shortlist", "nowhere.toml", "--color", "never"]);
    assert!(!never.err.contains('\u{1b}'), "{}", never.err);
    let folder = folder();
    super::ground::write(folder.path(), "bad.toml", "name = 5\n");
    let arguments = ["rail", "bad.toml", "--color", "always"];
    let always = super::ground::command(folder.path()).args(arguments).output().expect("it runs");
    assert!(String::from_utf8_lossy(&always.stderr).contains('\u{1b}'));
}

#[test]
fn the_answer_does_not_depend_on_the_threads() {
    let folder = demo();
    let list = |threads| run(folder.path(), ["shortlist", "rail.toml", "--format", "csv", "--threads", threads]).out;
    let one = list("1");
    assert_eq!(one.lines().count(), 11);
    assert_eq!(one, list("2"));
    assert_eq!(one, list("7"));
}
