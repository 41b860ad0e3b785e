//! The arrows between the rooms: a room imports only rooms above it in the list of `src/lib.rs`, and some rooms less than that.

use std::collections::BTreeSet;
use std::fs;
use std::path::{Path, PathBuf};

/// A source file without its comments and its tests.
struct Source {
    /// Relative to `src`, with `/`.
    path: String,
    room: String,
    code: String,
}

/// A room that may import less than everything above it: only these, and in the listed files these as well, for the reason given.
struct Narrow {
    room: &'static str,
    only: &'static [&'static str],
    also: &'static [Exception],
}

struct Exception {
    files: &'static str,
    room: &'static str,
    because: &'static str,
}

const NARROW: [Narrow; 8] = [
    Narrow { room: "quantity", only: &[], also: &[] },
    Narrow { room: "fault", only: &["quantity"], also: &[] },
    Narrow { room: "part", only: &["quantity"], also: &[] },
    Narrow { room: "catalog", only: &["quantity", "fault", "part"], also: &[] },
    Narrow { room: "rail", only: &["quantity", "fault", "part"], also: &[] },
    Narrow {
        room: "model",
        only: &["quantity", "part"],
        also: &[Exception {
            files: "model/conditions.rs",
            room: "rail",
            because: "it turns the typed rail into points and drive; no other formula sees the rail",
        }],
    },
    Narrow {
        room: "search",
        only: &["quantity", "part", "rail", "stage", "footing", "burden", "limit", "account"],
        also: &[
            Exception { files: "search/bound/", room: "model", because: "a bound is made of the formulas it bounds" },
            Exception {
                files: "search/field.rs",
                room: "model",
                because: "it fits every part to the points of the rail once, before crossing",
            },
            Exception {
                files: "search/trial.rs",
                room: "model",
                because: "it solves a core once and judges many banks around it, as an account would; tests compare the two",
            },
        ],
    },
    Narrow { room: "show", only: &["quantity", "fault", "rail", "stage", "account", "answer"], also: &[] },
];

/// What a room never says in its code.
const NEVER: [(&str, &[&str], &str); 5] = [
    ("model", &["Box<", "String", "format!", "std::fs", "std::io", "print"], "formulas read, print and build no text"),
    (
        "part",
        &["std::fs", "std::io", "print", "csv::", "toml::", "serde_json"],
        "parts know no files, columns or printing",
    ),
    (
        "search",
        &["std::fs", "std::io", "print", "csv::", "toml::", "serde_json"],
        "the search knows no files or printing",
    ),
    ("answer", &["std::fs", "std::io", "print", "csv::"], "an answer is plain data"),
    ("show", &["std::fs", "std::io", "println!"], "screens are text; the command writes them"),
];

fn files_below(folder: &Path, found: &mut Vec<PathBuf>) {
    for entry in fs::read_dir(folder).expect("a folder of sources") {
        let path = entry.expect("an entry").path();
        if path.is_dir() {
            files_below(&path, found);
        } else if path.extension().is_some_and(|ending| ending == "rs") {
            found.push(path);
        }
    }
}

/// All sources but files of tests.
fn sources() -> Vec<Source> {
    let root = Path::new(env!("CARGO_MANIFEST_DIR")).join("src");
    let mut paths = Vec::new();
    files_below(&root, &mut paths);
    let mut sources: Vec<_> = paths
        .iter()
        .map(|file| {
            let path = file.strip_prefix(&root).expect("below src").to_string_lossy().replace('\\', "/");
            let room = path.split('/').next().expect("a first part").trim_end_matches(".rs").to_owned();
            Source { room, code: without_tests(&fs::read_to_string(file).expect("UTF-8")), path }
        })
        .filter(|source| !["lib", "main"].contains(&source.room.as_str()))
        .collect();
    let of_tests: BTreeSet<String> = paths.iter().flat_map(|file| files_of_tests(&root, file)).collect();
    sources.retain(|source| !of_tests.contains(&source.path));
    sources
}

/// The files that `file` declares as modules of tests.
fn files_of_tests(root: &Path, file: &Path) -> Vec<String> {
    let text = fs::read_to_string(file).expect("UTF-8");
    let stem = file.with_extension("");
    let folder = if stem.ends_with("mod") { file.parent().expect("a folder") } else { &stem };
    let folder = folder.strip_prefix(root).expect("below src").to_string_lossy().replace('\\', "/");
    let declared = text.split("#[cfg(test)]\nmod ").skip(1).filter(|rest| rest[name(rest).len()..].starts_with(';'));
    declared.map(|rest| format!("{folder}/{}.rs", name(rest))).collect()
}

/// The code before the module of tests, without comments.
fn without_tests(text: &str) -> String {
    let code = text.split("#[cfg(test)]\nmod tests {").next().unwrap_or(text);
    code.lines().filter(|line| !line.trim_start().starts_with("//")).collect::<Vec<_>>().join("\n")
}

/// The rooms that a source names by `crate::`, one by one or in braces.
fn imports(code: &str) -> BTreeSet<String> {
    let mut rooms = BTreeSet::new();
    for (at, _) in code.match_indices("crate::") {
        let rest = &code[at + "crate::".len()..];
        match rest.strip_prefix('{') {
            None => drop(rooms.insert(name(rest))),
            Some(tree) => rooms.extend(branches(tree).into_iter().map(name)),
        }
    }
    rooms
}

fn name(text: &str) -> String {
    text.trim_start().chars().take_while(|c| c.is_alphanumeric() || *c == '_').collect()
}

/// The branches at the first level of a use tree, up to its closing brace.
fn branches(tree: &str) -> Vec<&str> {
    let (mut depth, mut start, mut found) = (0_u32, 0, Vec::new());
    for (at, c) in tree.char_indices() {
        match c {
            '{' => depth += 1,
            '}' if depth == 0 => {
                found.push(&tree[start..at]);
                break;
            }
            '}' => depth -= 1,
            ',' if depth == 0 => {
                found.push(&tree[start..at]);
                start = at + 1;
            }
            _ => {}
        }
    }
    found.retain(|branch| !branch.trim().is_empty());
    found
}

/// The rooms in the order of the numbered list at the head of `src/lib.rs`.
fn order() -> Vec<String> {
    let text = fs::read_to_string(Path::new(env!("CARGO_MANIFEST_DIR")).join("src/lib.rs")).expect("src/lib.rs");
    text.lines()
        .filter_map(|line| line.strip_prefix("//! ").filter(|line| line.starts_with(|c: char| c.is_ascii_digit())))
        .flat_map(|line| line.split("[`").skip(1).map(name))
        .collect()
}

#[test]
fn the_list_of_rooms_is_the_list_of_modules() {
    let text = fs::read_to_string(Path::new(env!("CARGO_MANIFEST_DIR")).join("src/lib.rs")).expect("src/lib.rs");
    let modules: BTreeSet<_> = text.lines().filter_map(|line| line.strip_prefix("pub mod ")).map(name).collect();
    let rooms = order();
    assert_eq!(rooms.len(), modules.len(), "a room is listed twice or not at all: {rooms:?}");
    assert_eq!(rooms.into_iter().collect::<BTreeSet<_>>(), modules);
    let of_files: BTreeSet<_> = sources().into_iter().map(|source| source.room).collect();
    assert_eq!(of_files, modules);
}

#[test]
fn a_room_imports_only_rooms_above_it() {
    let rooms = order();
    let place = |room: &str| rooms.iter().position(|other| other == room);
    for source in sources() {
        for room in imports(&source.code).into_iter().filter(|room| *room != source.room) {
            let above = place(&room).unwrap_or_else(|| panic!("{}: no room `{room}`", source.path));
            assert!(Some(above) < place(&source.room), "src/{} imports `{room}`, which is below it", source.path);
        }
    }
}

#[test]
fn some_rooms_import_less() {
    for source in sources() {
        let Some(narrow) = NARROW.iter().find(|narrow| narrow.room == source.room) else { continue };
        for room in imports(&source.code).into_iter().filter(|room| *room != source.room) {
            let excepted = narrow.also.iter().any(|one| one.room == room && source.path.starts_with(one.files));
            assert!(
                excepted || narrow.only.contains(&room.as_str()),
                "src/{} imports `{room}`: `{}` may import {:?} only",
                source.path,
                narrow.room,
                narrow.only
            );
        }
    }
}

#[test]
fn every_exception_is_still_needed() {
    let sources = sources();
    for one in NARROW.iter().flat_map(|narrow| narrow.also) {
        let used = |source: &Source| source.path.starts_with(one.files) && imports(&source.code).contains(one.room);
        assert!(sources.iter().any(used), "nothing in src/{} imports `{}` ({})", one.files, one.room, one.because);
    }
}

#[test]
fn no_path_leaves_its_room_by_the_back_door() {
    for source in sources() {
        let depth = source.path.trim_end_matches("/mod.rs").matches('/').count() + 1;
        let out = "super::".repeat(depth);
        assert!(!source.code.contains(&out), "src/{} reaches another room by `{out}`", source.path);
        assert!(!source.code.contains("wattsieve::"), "src/{} names its own library", source.path);
    }
}

#[test]
fn rooms_keep_their_silence() {
    for source in sources() {
        for (_, words, because) in NEVER.iter().filter(|(room, ..)| *room == source.room) {
            for word in *words {
                assert!(!source.code.contains(word), "src/{} says `{word}`: {because}", source.path);
            }
        }
    }
}

#[test]
fn the_reader_of_imports_reads_them() {
    let code =
        "use crate::part::{Bank, Choke};\nuse crate::{limit::{name, own}, stage};\nlet x = crate::model::solve();";
    assert_eq!(imports(code).into_iter().collect::<Vec<_>>(), ["limit", "model", "part", "stage"]);
}
