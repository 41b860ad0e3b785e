//! Keys and sections that the rail file does not have.

use toml::de::{DeTable, DeValue};

use super::nearest::nearest;
use super::reader::{Reader, kind_of};
use crate::rail::defaults::KEYS;

/// Keys that take one value as well as a table.
const EITHER: [&str; 2] = ["input.voltage", "stage.frequency"];

/// Other names of known keys, from the names of the slots on screens.
const ALSO: [(&str, &str); 2] = [("parts.pin.input_bank", "input"), ("parts.pin.output_bank", "output")];

/// Reports every unknown key, and every section that is none.
pub(super) fn refuse_unknown(reader: &mut Reader<'_>) {
    walk(reader, reader.root(), "");
}

fn walk<'t>(reader: &mut Reader<'t>, table: &'t DeTable<'t>, section: &str) {
    for (key, node) in table {
        let name = key.get_ref().as_ref();
        let path = joined(section, name);
        let is_key = KEYS.iter().any(|key| key.path == path) || ALSO.iter().any(|(also, _)| *also == path);
        if is_key && !name.contains('.') {
            continue;
        }
        if name.contains('.') || !is_section(&path) {
            let found = format!("`{}` is no key of the rail file", shortened(&path));
            let (expected, help) = suggestion(section, name);
            match help {
                Some(help) => reader.refuse_with(key.span(), found, expected, help),
                None => reader.refuse(key.span(), found, expected),
            }
            continue;
        }
        match node.get_ref() {
            DeValue::Table(inner) if path != "load" => walk(reader, inner, &path),
            DeValue::Array(list) if path == "load" && list.iter().all(|item| item.get_ref().is_table()) => {
                for inner in list.iter().filter_map(|item| item.get_ref().as_table()) {
                    walk(reader, inner, &path);
                }
            }
            _ if EITHER.contains(&path.as_str()) => {}
            other => {
                let expected = match path.as_str() {
                    "load" => "a list of tables: write [[load]] above the keys of each load".to_owned(),
                    _ => format!("a section: write [{path}] above its keys"),
                };
                reader.refuse(node.span(), format!("`{path}` is {}", kind_of(other)), expected);
            }
        }
    }
}

fn joined(section: &str, name: &str) -> String {
    if section.is_empty() { name.to_owned() } else { format!("{section}.{name}") }
}

fn is_section(path: &str) -> bool {
    KEYS.iter().any(|key| key.path.strip_prefix(path).is_some_and(|rest| rest.starts_with('.')))
}

/// The names that may stand in a section, sections included, each once.
fn names_in(section: &str) -> Vec<&'static str> {
    let mut names: Vec<&'static str> = Vec::new();
    for key in KEYS {
        let rest = if section.is_empty() {
            Some(key.path)
        } else {
            key.path.strip_prefix(section).and_then(|rest| rest.strip_prefix('.'))
        };
        if let Some(name) = rest.and_then(|rest| rest.split('.').next())
            && !names.contains(&name)
        {
            names.push(name);
        }
    }
    names
}

/// What was expected, and the nearest known key: in this section, else in another one.
fn suggestion(section: &str, name: &str) -> (String, Option<String>) {
    let here = names_in(section);
    if let Some(near) = nearest(name, here.iter().copied()) {
        let expected = if section.is_empty() { "a section".to_owned() } else { format!("a key of [{section}]") };
        return (expected, Some(format!("did you mean `{near}`?")));
    }
    let expected = format!("one of {}", here.join(", "));
    let elsewhere = || KEYS.iter().flat_map(|key| [key.path, key.section()]).filter(|path| path.contains('.'));
    let last = |path: &'static str| path.rsplit('.').next().unwrap_or(path);
    let near = nearest(name, elsewhere().map(last));
    let path = near.and_then(|near| elsewhere().find(|path| last(path) == near));
    (expected, path.map(|path| format!("did you mean `{path}`?")))
}

/// Long names are cut: the place is shown anyway.
fn shortened(path: &str) -> String {
    const MOST: usize = 60;
    if path.chars().count() <= MOST { path.to_owned() } else { path.chars().take(MOST).chain(['…']).collect() }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_section_knows_its_own_names() {
        assert_eq!(names_in("output.step"), ["current", "deviation", "crossover"]);
        assert_eq!(names_in("parts"), ["pin", "ban"]);
        assert_eq!(names_in("")[..3], ["name", "input", "output"]);
    }

    #[test]
    fn a_key_of_another_section_is_named_with_its_section() {
        let (_, help) = suggestion("stage", "dead_time");
        assert_eq!(help.as_deref(), Some("did you mean `drive.dead_time`?"));
        let (_, help) = suggestion("input", "temprature");
        assert_eq!(help.as_deref(), Some("did you mean `ambient.temperature`?"));
        let (_, help) = suggestion("", "colour");
        assert_eq!(help, None);
    }
}
