//! The reference part of the user guide is made from the program's own lists. `WATTSIEVE_WRITE_DOCS=1` writes it anew.

use std::fmt::Write;
use std::path::Path;

use wattsieve::catalog::Catalog;
use wattsieve::limit::LimitName;
use wattsieve::rail::defaults::KEYS;

const BEGIN: &str = "<!-- made by tests/guide.rs: begin -->\n";

fn reference() -> String {
    let mut text = String::from("## Rail file\n\n| key | meaning | without it |\n|---|---|---|\n");
    for key in KEYS {
        let without = if key.reason.is_empty() { "must be written" } else { key.reason };
        let _ = writeln!(text, "| `{}` | {} | {without} |", key.path, key.meaning);
    }
    for catalog in Catalog::ALL {
        let _ = write!(text, "\n## `{}`\n\n| column | meaning | without it |\n|---|---|---|\n", catalog.file_name());
        for column in catalog.columns() {
            let without = if column.required { "required" } else { column.default };
            let _ = writeln!(text, "| `{}` | {} | {without} |", column.example(), column.meaning);
        }
    }
    let names: Vec<String> = LimitName::ALL.iter().map(|limit| format!("`{}`", limit.name())).collect();
    let _ = write!(text, "\n## Limits\n\n{}.\n", names.join(", "));
    text
}

#[test]
fn the_guide_lists_what_the_program_knows() {
    let path = Path::new(env!("CARGO_MANIFEST_DIR")).join("docs/guide.md");
    let guide = std::fs::read_to_string(&path).expect("the guide");
    let (words, listed) = guide.split_once(BEGIN).expect("the mark where the reference begins");
    if std::env::var_os("WATTSIEVE_WRITE_DOCS").is_some() {
        std::fs::write(&path, format!("{words}{BEGIN}\n{}", reference())).expect("a writable guide");
        return;
    }
    assert_eq!(listed.trim(), reference().trim(), "stale: run this test with WATTSIEVE_WRITE_DOCS=1");
}
