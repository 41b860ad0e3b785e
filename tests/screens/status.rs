//! Exit statuses: 0 done, 1 nothing meets the limits, 2 bad input or usage, 3 the machine failed.

use super::ground::{demo, edit, first_stage, folder, run, run_with, spoil, text};

#[test]
fn done_is_0() {
    let folder = demo();
    for arguments in [
        &["shortlist"][..],
        &["shortlist", "logic.toml"],
        &["account"],
        &["account", "rail.toml", "--rank", "2"],
        &["rail"],
        &["--help"],
        &["shortlist", "--help"],
        &["--version"],
    ] {
        let said = run(folder.path(), arguments);
        assert_eq!(said.status, 0, "{arguments:?}: {}", said.err);
        assert_eq!(said.err, "", "{arguments:?}");
        assert!(!said.out.is_empty(), "{arguments:?}");
    }
}

#[test]
fn nothing_meets_the_limits_is_1() {
    let folder = demo();
    edit(folder.path(), "rail.toml", "[limits]\n", "[limits]\nefficiency = 0.999\n");
    for command in ["shortlist", "account"] {
        let said = run(folder.path(), [command, "rail.toml"]);
        assert_eq!(said.status, 1, "{command}: {}", said.err);
    }
}

#[test]
fn bad_usage_is_2_and_says_what_would_be_right() {
    let folder = demo();
    let cases: [(&[&str], &str); 15] = [
        (&[], "Usage: wattsieve"),
        (&["shortlst"], "'shortlist'"),
        (&["shortlist", "--formt", "json"], "'--format'"),
        (&["shortlist", "--format", "yaml"], "table, csv, json"),
        (&["shortlist", "--top", "0"], "1..=10000"),
        (&["shortlist", "--top", "many"], "'many'"),
        (&["shortlist", "nowhere.toml"], "nowhere.toml"),
        (&["shortlist", "."], "."),
        (&["shortlist", "--catalogs", "nowhere"], "nowhere"),
        (&["account", "--stage", "nowhere.json"], "nowhere.json"),
        (&["account", "--parts", "high=x"], "--frequency"),
        (&["account", "--rank", "3", "--stage", "stage.json"], "--rank"),
        (&["account", "--parts", "high=x", "--frequency", "400 kHz", "--from", "saved.json"], "--from"),
        (&["account", "--from", "rail.toml"], "rail.toml"),
        (&["starter", "."], "nothing is overwritten"),
    ];
    for (arguments, told) in cases {
        let said = run(folder.path(), arguments);
        assert_eq!(said.status, 2, "{arguments:?}: {}", said.err);
        assert_eq!(said.out, "", "{arguments:?}");
        assert!(said.err.contains(told), "{arguments:?} should tell `{told}`: {}", said.err);
    }
}

#[test]
fn parts_that_are_not_there_are_2_with_the_nearest_name() {
    let folder = demo();
    let known =
        text(folder.path(), "inductors.csv").lines().nth(1).and_then(|row| row.split(',').next()).map(str::to_owned);
    let known = known.expect("a first part");
    let stage = first_stage();
    let (before, after) = stage.split_once("\"inductor\":{\"part\":\"").expect("its inductor");
    let (_, after) = after.split_once('"').expect("the end of the name");
    let stage = format!("{before}\"inductor\":{{\"part\":\"{known}x\"{after}");
    let said = run_with(folder.path(), ["account", "rail.toml", "--stage", "-"], &stage);
    assert_eq!((said.status, said.out.as_str()), (2, ""));
    assert!(said.err.contains(&format!("`{known}x`")) && said.err.contains(&format!("`{known}`")), "{}", said.err);
}

#[test]
fn bad_input_is_2_and_nothing_is_ranked() {
    let folder = demo();
    let said = run_with(folder.path(), ["shortlist", "-", "--catalogs", "."], "name = 5\n");
    assert_eq!((said.status, said.out.as_str()), (2, ""));
    assert!(said.err.contains("-:1:"), "{}", said.err);
    spoil(folder.path(), "switches.csv", 2, "cost", "cheap");
    let said = run(folder.path(), ["shortlist", "rail.toml"]);
    assert_eq!((said.status, said.out.as_str()), (2, ""));
    assert!(said.err.contains("`cheap`"), "{}", said.err);
}

#[cfg(target_os = "linux")]
#[test]
fn a_full_disk_is_3() {
    let full = std::fs::File::create("/dev/full").expect("the device that is always full");
    let mut program = std::process::Command::new(assert_cmd::cargo::cargo_bin!("wattsieve"));
    let output = program.current_dir(folder().path()).arg("shortlist").stdout(full).output().expect("it runs");
    assert_eq!(output.status.code(), Some(3));
    let told = String::from_utf8(output.stderr).expect("UTF-8");
    assert!(told.starts_with("error: cannot write to standard output"), "{told}");
}
