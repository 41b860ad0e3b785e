//! A saved shortlist stands for the rail and the catalogs that it was made from.

use std::fs;
use std::path::Path;

use assert_cmd::Command;

fn wattsieve(folder: &Path, words: &[&str]) -> (Option<i32>, String) {
    let mut command = Command::cargo_bin("wattsieve").expect("the binary");
    let output = command.args(words).current_dir(folder).output().expect("a run");
    (output.status.code(), String::from_utf8_lossy(&output.stdout).into_owned())
}

#[test]
fn an_account_from_a_saved_list_is_that_of_its_own_rail() {
    let folder = tempfile::tempdir().expect("a folder");
    let here = folder.path();
    wattsieve(here, &["starter", "own"]);
    let path = here.join("own/rail.toml");
    let text = fs::read_to_string(&path).expect("a rail").replace("mast camera", "another supply");
    fs::write(&path, text).expect("written");
    let renamed = fs::read_to_string(here.join("own/inductors.csv")).expect("inductors").replace("knurlip", "mine");
    fs::write(here.join("own/inductors.csv"), renamed).expect("written");

    wattsieve(here, &["shortlist", "own/rail.toml", "--save", "list.json"]);
    let (status, account) = wattsieve(here, &["account", "--from", "list.json", "--rank", "2"]);
    assert_eq!(status, Some(0));
    assert!(account.starts_with("another supply"), "{account}");
    assert_eq!(wattsieve(here, &["account", "own/rail.toml", "--rank", "2"]).1, account);

    let (status, nothing) = wattsieve(here, &["account", "--from", "list.json", "--rank", "11"]);
    assert_eq!((status, nothing.as_str()), (Some(2), ""));
}

#[test]
fn a_saved_list_of_the_demo_stands_for_the_demo() {
    let folder = tempfile::tempdir().expect("a folder");
    wattsieve(folder.path(), &["shortlist", "--save", "list.json"]);
    let from_saved = wattsieve(folder.path(), &["account", "--from", "list.json", "--rank", "3"]);
    assert_eq!(from_saved, wattsieve(folder.path(), &["account", "--rank", "3"]));
    assert_eq!(from_saved.0, Some(0));
}

#[test]
fn a_list_can_be_saved_to_standard_output_if_nothing_else_goes_there() {
    let folder = tempfile::tempdir().expect("a folder");
    let both = wattsieve(folder.path(), &["shortlist", "--save", "-"]);
    assert_eq!(both, (Some(2), String::new()));
    let (status, saved) = wattsieve(folder.path(), &["shortlist", "--save", "-", "--out", "list.txt"]);
    assert_eq!(status, Some(0));
    assert!(saved.starts_with('{') && saved.contains("saved/1"), "{saved}");
    assert!(!folder.path().join("-").exists());
}
