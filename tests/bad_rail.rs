//! One wrong rail file for each fault: where it is reported, what is said, and how it looks.
//!
//! Each file of `bad_rail` begins with what must come of it: `# at LINE:COLUMN` for every fault in the order of the text
//! (0:0 for the file as a whole), `# says TEXT` for what must be said. The screens beside them are kept by insta.

use std::fs::{read_dir, read_to_string};
use std::path::{Path, PathBuf};

use wattsieve::fault::Faults;
use wattsieve::rail::read;

fn files() -> Vec<PathBuf> {
    let folder = Path::new(env!("CARGO_MANIFEST_DIR")).join("tests/bad_rail");
    let entries = read_dir(folder).expect("the folder");
    let mut files: Vec<_> = entries.map(|entry| entry.expect("an entry").path()).collect();
    files.retain(|file| file.extension().is_some_and(|extension| extension == "toml"));
    files.sort();
    files
}

/// File name, text and faults of every wrong rail.
fn refused() -> Vec<(String, String, Faults)> {
    let each = files().into_iter().map(|file| {
        let name = file.file_name().and_then(|name| name.to_str()).expect("a name").to_owned();
        let text = read_to_string(&file).expect("text");
        let faults = read(&name, &text).err().unwrap_or_else(|| panic!("{name} was taken for good"));
        (name, text, faults)
    });
    each.collect()
}

fn wanted<'t>(text: &'t str, word: &str) -> Vec<&'t str> {
    text.lines().filter_map(|line| line.strip_prefix(word)).collect()
}

#[test]
fn every_fault_is_found_where_it_is() {
    let all = refused();
    assert!(all.len() >= 90, "{} files", all.len());
    let mut wrong = String::new();
    for (name, text, faults) in all {
        let found: Vec<_> = faults.errors().map(|fault| format!("{}:{}", fault.line, fault.column)).collect();
        assert!(faults.errors().all(|fault| fault.file == name));
        let wanted = wanted(&text, "# at ");
        if found != wanted {
            wrong += &format!("{name}: {wanted:?} wanted, {found:?} found\n{}\n", faults.render(false));
        }
    }
    assert!(wrong.is_empty(), "{wrong}");
}

#[test]
fn every_fault_says_what_to_do() {
    let mut unsaid = String::new();
    for (name, text, faults) in refused() {
        let said = faults.render(false);
        let wanted = wanted(&text, "# says ");
        assert!(!wanted.is_empty(), "{name} wants nothing");
        for words in wanted.into_iter().filter(|words| !said.contains(words)) {
            unsaid += &format!("{name} should say `{words}`:\n{said}\n");
        }
    }
    assert!(unsaid.is_empty(), "{unsaid}");
}

#[test]
fn every_fault_looks_as_it_should() {
    let mut settings = insta::Settings::clone_current();
    settings.set_snapshot_path("bad_rail");
    settings.set_prepend_module_to_snapshot(false);
    settings.set_omit_expression(true);
    settings.bind(|| {
        for (name, _, faults) in refused() {
            insta::assert_snapshot!(name.trim_end_matches(".toml"), faults.render(false));
        }
    });
}
