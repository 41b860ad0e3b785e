//! One wrong cell far down a catalog, and several at once.

use std::path::Path;

use serde_json::Value;

use super::ground::{demo, run, spoil, text, write};

/// Makes `inductors.csv` 45 lines long.
fn lengthen(folder: &Path) {
    let demo = text(folder, "inductors.csv");
    let rows: Vec<&str> = demo.lines().skip(1).filter_map(|row| row.split_once(',')).map(|(_, rest)| rest).collect();
    let header = demo.lines().next().expect("a header");
    let rows = (2..=45).map(|line| format!("line-{line},{}\n", rows[line % rows.len()]));
    write(folder, "inductors.csv", &format!("{header}\n{}", rows.collect::<String>()));
}

/// The same with one wrong cell.
fn long_and_spoilt(folder: &Path, line: usize, column: &str, cell: &str) -> usize {
    lengthen(folder);
    spoil(folder, "inductors.csv", line, column, cell)
}

#[test]
fn a_wrong_cell_in_line_37_is_named_with_line_column_header_and_text() {
    for (column, cell) in [
        ("dcr [mΩ]", "9.5 mH"),
        ("saturation_current [A] @ 100 °C", "about 7"),
        ("inductance [µH]", "4.7.1"),
        ("tolerance [%]", "-20"),
        ("dcr [mΩ]", ""),
    ] {
        let folder = demo();
        let at = long_and_spoilt(folder.path(), 37, column, cell);
        let said = run(folder.path(), ["shortlist", "rail.toml"]);
        assert_eq!((said.status, said.out.as_str()), (2, ""), "{column} {cell}");
        let place = format!("inductors.csv:37:{at}: error: ");
        let first = said.err.lines().find(|line| line.contains(&place));
        let first = first.unwrap_or_else(|| panic!("`{place}` of {column} {cell} is not in: {}", said.err));
        assert!(first.contains(&format!("`{column}`")), "{first}");
        assert!(first.contains(cell), "{first}");
        assert_eq!(said.err.matches(": error: ").count(), 1, "{}", said.err);
        assert!(said.err.contains("expected"), "{}", said.err);
    }
}

#[test]
fn the_same_cell_in_the_audit() {
    let folder = demo();
    let at = long_and_spoilt(folder.path(), 37, "dcr [mΩ]", "9.5 mH");
    let said = run(folder.path(), ["audit", "--catalogs", ".", "--format", "json"]);
    assert_eq!(said.status, 2);
    let audit: Value = serde_json::from_str(&said.out).expect("JSON");
    let finding = audit["findings"]
        .as_array()
        .expect("findings")
        .iter()
        .find(|finding| finding["line"] == 37)
        .expect("a finding in line 37");
    assert!(finding["catalog"].as_str().is_some_and(|name| name.contains("inductors")), "{finding}");
    assert!(finding["value"] == "9.5 mH" && at > 1, "{finding}");
}

#[test]
fn faults_of_all_files_are_told_in_one_run() {
    let folder = demo();
    long_and_spoilt(folder.path(), 37, "dcr [mΩ]", "9.5 mH");
    write(folder.path(), "diodes.csv", "part,forward_drop\n");
    write(folder.path(), "rail.toml", "name = \"x\"\n[outputs]\n");
    let said = run(folder.path(), ["shortlist", "rail.toml"]);
    assert_eq!((said.status, said.out.as_str()), (2, ""));
    for told in ["rail.toml:2:", "`output`", "diodes.csv:1:", "inductors.csv:37:", "`9.5 mH`"] {
        assert!(said.err.contains(told), "`{told}` is not in: {}", said.err);
    }
}
