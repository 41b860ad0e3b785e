//! Files written all or nothing, and names of every kind.

use super::ground::{demo, edit, folder, names, run, text, write};

#[test]
fn out_writes_what_would_have_been_printed_and_nothing_else() {
    let folder = demo();
    let before = names(folder.path());
    let printed = run(folder.path(), ["shortlist", "rail.toml", "--format", "csv"]);
    let written = run(folder.path(), ["shortlist", "rail.toml", "--format", "csv", "--out", "list.csv"]);
    assert_eq!((written.status, written.out.as_str()), (0, ""));
    assert_eq!(text(folder.path(), "list.csv"), printed.out);
    let mut after = names(folder.path());
    after.retain(|name| name != "list.csv");
    assert_eq!(after, before);
}

#[test]
fn out_replaces_a_file_only_when_all_went_well() {
    let folder = demo();
    write(folder.path(), "list.csv", "kept\n");
    edit(folder.path(), "rail.toml", "voltage = \"5 V\"\ncurrent", "voltage = \"5 A\"\ncurrent");
    let said = run(folder.path(), ["shortlist", "rail.toml", "--out", "list.csv"]);
    assert_eq!(said.status, 2);
    assert_eq!(text(folder.path(), "list.csv"), "kept\n");
}

#[test]
fn out_to_what_is_not_a_file_fails_and_leaves_nothing_behind() {
    let folder = demo();
    std::fs::create_dir(folder.path().join("taken")).expect("a folder");
    let before = names(folder.path());
    for name in ["taken", "not/there/list.csv"] {
        let said = run(folder.path(), ["rail", "rail.toml", "--out", name]);
        assert!([2, 3].contains(&said.status), "{name}: {}", said.err);
        assert!(said.err.starts_with("error: cannot write"), "{}", said.err);
        assert_eq!(names(folder.path()), before);
    }
}

#[test]
fn starter_overwrites_nothing_and_completes_nothing() {
    let folder = folder();
    write(folder.path(), "diodes.csv", "mine\n");
    let said = run(folder.path(), ["starter", "."]);
    assert_eq!(said.status, 2);
    assert!(said.err.contains("diodes.csv"), "{}", said.err);
    assert_eq!((names(folder.path()), text(folder.path(), "diodes.csv")), (vec!["diodes.csv".into()], "mine\n".into()));
}

#[test]
fn skip_bad_ranks_without_the_bad_row_and_says_so() {
    let folder = demo();
    let inductors = text(folder.path(), "inductors.csv");
    let with_bad = format!("{inductors}bad-one,,dear\n");
    write(folder.path(), "inductors.csv", &with_bad);
    let said = run(folder.path(), ["shortlist", "rail.toml", "--skip-bad", "--format", "csv"]);
    assert_eq!(said.status, 0, "{}", said.err);
    assert!(said.err.contains("1 bad row left out"), "{}", said.err);
    write(folder.path(), "inductors.csv", &inductors);
    assert_eq!(said.out, run(folder.path(), ["shortlist", "rail.toml", "--format", "csv"]).out);
}

#[cfg(target_os = "linux")]
#[test]
fn names_that_are_not_utf_8_work() {
    use std::ffi::OsStr;
    use std::os::unix::ffi::OsStrExt;

    let folder = folder();
    let name = OsStr::from_bytes(b"caf\xe9");
    assert_eq!(run(folder.path(), [OsStr::new("starter"), name]).status, 0);
    let rail = folder.path().join(name).join("rail.toml");
    let out = folder.path().join(OsStr::from_bytes(b"list\xff.csv"));
    let arguments = [OsStr::new("shortlist"), rail.as_os_str(), OsStr::new("--out"), out.as_os_str()];
    let said = run(folder.path(), arguments);
    assert_eq!((said.status, said.err.as_str()), (0, ""));
    assert!(std::fs::read_to_string(out).expect("the list").starts_with("mast camera 5 V"));
}
