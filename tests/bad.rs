//! Bad files: each must be refused, with the messages that stand beside it. Odd files: each must read as its plain sister.
//!
//! The name of a file in `tests/bad` says what is wrong with it; the file of the same name with `.txt` holds what is reported.
//! `BLESS=1 cargo test --test bad` writes those again, to be looked through before they are committed.

use std::fs;
use std::path::{Path, PathBuf};

use wattsieve::catalog::{Catalog, Read, ReadOptions, read_texts};
use wattsieve::demo;
use wattsieve::fault::Severity;

const ALIASES: &str = r#"
"Choke" = "part"
"L/µH" = "inductance [µH]"
"R dc (mOhm), typ" = "dcr [mΩ]"
[inductors]
"Isat" = "saturation_current [A]"
"#;

/// The files of one folder below `tests`, but for the expected messages.
fn cases(folder: &str) -> Vec<PathBuf> {
    let root = Path::new(env!("CARGO_MANIFEST_DIR")).join("tests").join(folder);
    let mut files: Vec<PathBuf> = fs::read_dir(&root)
        .expect("the folder of cases")
        .flat_map(|kind| fs::read_dir(kind.expect("a folder").path()).expect("a folder of one catalog"))
        .map(|file| file.expect("a file").path())
        .filter(|path| path.extension().is_some_and(|extension| extension != "txt"))
        .collect();
    files.sort();
    files
}

/// The demo with the file at `path` in place of the catalog, or of `columns.toml`, that its folder is named after.
fn read_in_demo(path: &Path, aliases: &str) -> Read {
    let kind = path.parent().and_then(Path::file_name).and_then(|kind| kind.to_str()).expect("a folder name");
    let name = if kind == "columns" { "columns.toml".to_owned() } else { format!("{kind}.csv") };
    let bytes = fs::read(path).expect("a case");
    let mut files: Vec<(&str, &[u8])> = vec![(&name, &bytes)];
    let rest = demo::CATALOGS.iter().copied().chain([("columns.toml", aliases)]);
    files.extend(rest.filter(|(file, _)| *file != name).map(|(file, text)| (file, text.as_bytes())));
    read_texts(files, ReadOptions::default())
}

/// Compares `text` with the file of messages beside `path`; no file stands for no messages.
fn compare(path: &Path, text: &str) -> Result<(), String> {
    let golden = path.with_extension("txt");
    if std::env::var_os("BLESS").is_some() {
        return match text {
            "" => Ok(()),
            text => fs::write(&golden, text).map_err(|error| error.to_string()),
        };
    }
    match fs::read_to_string(&golden).unwrap_or_default() {
        expected if expected == text => Ok(()),
        expected => Err(format!("{}\nexpected:\n{expected}\nfound:\n{text}", path.display())),
    }
}

#[test]
fn every_bad_file_is_refused_with_its_messages() {
    let cases = cases("bad");
    assert!(cases.len() >= 150, "only {} cases", cases.len());
    let wrong: Vec<String> = cases
        .iter()
        .filter_map(|path| {
            let read = read_in_demo(path, "");
            if !read.faults.has_errors() {
                return Some(format!("{} is not refused", path.display()));
            }
            compare(path, &read.faults.render(false)).err()
        })
        .collect();
    assert!(wrong.is_empty(), "{}", wrong.join("\n"));
}

#[test]
fn every_odd_file_reads_as_its_plain_sister() {
    for path in cases("odd") {
        let (odd, plain) = (read_in_demo(&path, ALIASES), read_in_demo(&path.with_file_name("plain.csv"), ""));
        assert_eq!(odd.faults.count(Severity::Error), 0, "{}\n{}", path.display(), odd.faults.render(false));
        assert_eq!(format!("{:?}", odd.parts), format!("{:?}", plain.parts), "{}", path.display());
        if let Err(wrong) = compare(&path, &odd.faults.render(false)) {
            panic!("{wrong}");
        }
    }
}

#[test]
fn messages_can_be_sent_to_a_terminal() {
    for path in cases("bad") {
        let text = read_in_demo(&path, "").faults.render(false);
        let obeyed = text.chars().find(|letter| letter.is_control() && *letter != '\n');
        assert_eq!(obeyed, None, "{}", path.display());
        for line in text.lines() {
            assert!(line.chars().count() <= 700, "{}", path.display());
        }
    }
}

#[test]
fn every_catalog_has_bad_files() {
    for catalog in Catalog::ALL {
        let folder = format!("bad/{}", catalog.name());
        assert!(cases("bad").iter().any(|path| path.to_string_lossy().contains(&folder)), "{folder}");
    }
}
