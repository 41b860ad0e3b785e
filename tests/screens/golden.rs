//! The screens on the demo, kept whole.

use super::ground::{demo, edit, first_stage, folder, names, run, run_with, spoil};

/// Compares with `golden/NAME.snap`, all but how many full evaluations the search took: it may get better at that.
fn golden(name: &str, screen: &str) {
    let mut settings = insta::Settings::clone_current();
    settings.set_snapshot_path("golden");
    settings.set_prepend_module_to_snapshot(false);
    settings.set_omit_expression(true);
    settings.bind(|| insta::assert_snapshot!(name, without_evaluated(screen)));
}

fn without_evaluated(screen: &str) -> String {
    let Some((before, after)) = screen.split_once("the full model ran on ") else { return screen.to_owned() };
    format!("{before}the full model ran on N {}", after.trim_start_matches(|c: char| c.is_ascii_digit() || c == ' '))
}

fn printed(arguments: &[&str]) -> String {
    let folder = demo();
    let said = run(folder.path(), arguments);
    assert_eq!((said.status, said.err.as_str()), (0, ""));
    said.out
}

#[test]
fn shortlist() {
    golden("shortlist", &printed(&["shortlist", "rail.toml"]));
}

#[test]
fn shortlist_of_the_second_rail() {
    golden("shortlist_logic", &printed(&["shortlist", "logic.toml", "--top", "3", "--distinct", "switches"]));
}

#[test]
fn shortlist_without_a_rail_is_that_of_the_demo() {
    let said = run(folder().path(), ["shortlist"]);
    assert_eq!(said.status, 0);
    assert_eq!(without_evaluated(&said.out), without_evaluated(&printed(&["shortlist", "rail.toml"])));
}

#[test]
fn shortlist_where_nothing_passes() {
    let folder = demo();
    edit(folder.path(), "rail.toml", "cost = 4.00", "cost = 0.20");
    let said = run(folder.path(), ["shortlist", "rail.toml"]);
    assert_eq!(said.status, 1, "{}", said.err);
    golden("shortlist_nothing", &said.out);
}

#[test]
fn shortlist_for_spreadsheets() {
    golden("shortlist_csv", &printed(&["shortlist", "rail.toml", "--format", "csv", "--top", "3"]));
}

#[test]
fn account() {
    golden("account", &printed(&["account", "rail.toml"]));
}

#[test]
fn account_of_a_stage_that_breaks_a_limit_says_so_first() {
    let folder = demo();
    edit(folder.path(), "rail.toml", "area = \"400 mm²\"", "area = \"50 mm²\"");
    edit(folder.path(), "rail.toml", "junction_margin = \"15 K\"", "junction_margin = \"80 K\"");
    let said = run_with(folder.path(), ["account", "rail.toml", "--stage", "-"], &first_stage());
    assert_eq!(said.status, 1, "{}", said.err);
    let broken = said.out.split("LOSSES").next().expect("what stands before the losses");
    assert!(broken.contains("junction  high switch") && broken.contains("area      stage"), "{broken}");
    golden("account_broken", &said.out);
}

#[test]
fn account_for_spreadsheets() {
    golden("account_csv", &printed(&["account", "rail.toml", "--format", "csv"]));
}

#[test]
fn rail() {
    golden("rail", &printed(&["rail", "rail.toml"]));
}

#[test]
fn rail_of_five_values_shows_every_default_and_its_reason() {
    let folder = folder();
    let text = "name = \"few\"\ninput.voltage = \"12 V\"\noutput = { voltage = \"5 V\", current = \"2 A\" }\n";
    super::ground::write(folder.path(), "few.toml", text);
    let said = run(folder.path(), ["rail", "few.toml"]);
    assert_eq!((said.status, said.err.as_str()), (0, ""));
    golden("rail_defaults", &said.out);
}

#[test]
fn starter() {
    let folder = folder();
    let said = run(folder.path(), ["starter", "mine"]);
    assert_eq!((said.status, said.out.as_str()), (0, ""));
    assert_eq!(
        names(&folder.path().join("mine")),
        ["capacitors.csv", "diodes.csv", "inductors.csv", "logic.toml", "rail.toml", "switches.csv"]
    );
    golden("starter", &said.err);
}

#[test]
fn audit_of_faulty_cells() {
    let folder = demo();
    spoil(folder.path(), "capacitors.csv", 3, "cost", "zero");
    spoil(folder.path(), "diodes.csv", 3, "area [mm²]", "-26");
    spoil(folder.path(), "diodes.csv", 4, "kind", "shotky");
    let said = run(folder.path(), ["audit", "--catalogs", "."]);
    assert_eq!(said.status, 2, "{}", said.out);
    golden("audit_faults", &said.out);
}
