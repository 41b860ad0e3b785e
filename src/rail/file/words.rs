//! Words, names and counts.

use std::ops::Range;

use toml::de::DeValue;

use super::nearest::nearest;
use super::reader::{Node, Reader, kind_of};
use crate::rail::defaults::{Key, Kind, Preset};
use crate::rail::origin::Value;

/// A word of the file and its place.
pub(super) type Placed<'t> = (&'t str, Range<usize>);

/// Every answer is `None` once a fault is reported for its key.
impl<'t> Reader<'t> {
    /// The user's own words on one line.
    pub(super) fn text(&mut self, key: &Key) -> Option<String> {
        let Some(node) = self.find(key.path) else {
            self.missing(key);
            return None;
        };
        let (text, span) = self.name_at(key, node)?;
        self.written(key, Value::Text(text.to_owned()), span.start);
        Some(text.to_owned())
    }

    /// One of the words that `key` takes.
    pub(super) fn word(&mut self, key: &Key) -> Option<&'static str> {
        let Some(node) = self.find(key.path) else {
            let Preset::Word(word) = key.preset else { return None };
            self.default(key, Value::Text(word.to_owned()));
            return Some(word);
        };
        let word = self.word_at(key, node)?;
        self.written(key, Value::Text(word.to_owned()), node.span().start);
        Some(word)
    }

    /// Some of the words that `key` takes, in its own order.
    pub(super) fn words(&mut self, key: &Key) -> Option<Vec<&'static str>> {
        let list = |words: &[&str]| Value::Texts(words.iter().map(|word| (*word).to_owned()).collect());
        let Some(node) = self.find(key.path) else {
            let Preset::Words(words) = key.preset else { return None };
            self.default(key, list(words));
            return Some(words.to_vec());
        };
        let items = self.items(key, node)?;
        let read: Vec<_> = items.iter().map(|item| self.word_at(key, item).map(|word| (word, item.span()))).collect();
        let found: Vec<_> = read.into_iter().collect::<Option<_>>()?;
        self.distinct(key, &found)?;
        let Kind::Words(known) = key.kind else { return None };
        let words: Vec<_> = known.iter().copied().filter(|word| found.iter().any(|(found, _)| found == word)).collect();
        self.written(key, list(&words), node.span().start);
        Some(words)
    }

    /// Names, in a list or alone; each once. The place is that of each name.
    pub(super) fn names(&mut self, key: &Key, node: Node<'t>) -> Option<Vec<Placed<'t>>> {
        let items = self.items(key, node)?;
        let read: Vec<_> = items.iter().map(|item| self.name_at(key, item)).collect();
        let names: Vec<_> = read.into_iter().collect::<Option<_>>()?;
        self.distinct(key, &names)?;
        Some(names)
    }

    /// A whole number from 1 to the greatest that `key` takes; one by default.
    pub(super) fn count(&mut self, key: &Key) -> Option<u32> {
        let Some(node) = self.find(key.path) else {
            let Preset::Count(count) = key.preset else {
                self.missing(key);
                return None;
            };
            self.default(key, Value::Count(count));
            return Some(count);
        };
        let count = self.count_at(key, node)?;
        self.written(key, Value::Count(count), node.span().start);
        Some(count)
    }

    /// The same, of a key that must be written and is not noted as an entry of its own.
    pub(super) fn count_at(&mut self, key: &Key, node: Node<'t>) -> Option<u32> {
        let Kind::Count(most) = key.kind else { return None };
        let expected = format!("a whole number from 1 to {most}");
        let DeValue::Integer(number) = node.get_ref() else {
            let found = format!("`{}` is {}", key.path, kind_of(node.get_ref()));
            self.refuse(node.span(), found, expected);
            return None;
        };
        let count = u32::from_str_radix(number.as_str(), number.radix()).ok();
        let count = count.filter(|count| (1..=most).contains(count));
        if count.is_none() {
            self.refuse(node.span(), format!("`{}` is {}", key.path, self.source(node)), expected);
        }
        count
    }

    /// The items of a list that is not empty, or the one value that stands alone.
    pub(super) fn items(&mut self, key: &Key, node: Node<'t>) -> Option<Vec<Node<'t>>> {
        let DeValue::Array(list) = node.get_ref() else {
            return Some(vec![node]);
        };
        if list.is_empty() {
            self.refuse_with(
                node.span(),
                format!("`{}` is an empty list", key.path),
                "at least one entry",
                "leave the key out to get its default",
            );
            return None;
        }
        Some(list.iter().collect())
    }

    fn word_at(&mut self, key: &Key, node: Node<'t>) -> Option<&'static str> {
        let (Kind::Word(known) | Kind::Words(known)) = key.kind else { return None };
        let (text, span) = self.string(key, node)?;
        let word = known.iter().copied().find(|word| *word == text);
        if word.is_none() {
            let found = format!("`{}` does not know \"{text}\"", key.path);
            match nearest(text, known.iter().copied()) {
                Some(near) => self.refuse_with(span, found, quoted(known), format!("did you mean \"{near}\"?")),
                None => self.refuse(span, found, quoted(known)),
            }
        }
        word
    }

    fn name_at(&mut self, key: &Key, node: Node<'t>) -> Option<Placed<'t>> {
        let (text, span) = self.string(key, node)?;
        let text = text.trim();
        if text.is_empty() {
            self.refuse(span, format!("`{}` has an empty name", key.path), "a name");
            return None;
        }
        if text.chars().any(char::is_control) {
            let found = format!("`{}` has a line break or another control character in it", key.path);
            self.refuse(span, found, "a name on one line");
            return None;
        }
        Some((text, span))
    }

    fn string(&mut self, key: &Key, node: Node<'t>) -> Option<Placed<'t>> {
        if let DeValue::String(text) = node.get_ref() {
            return Some((text, node.span()));
        }
        let expected = match key.kind {
            Kind::Word(known) | Kind::Words(known) => quoted(known),
            _ => "a name in quotes".to_owned(),
        };
        self.refuse(node.span(), format!("`{}` has {} here", key.path, kind_of(node.get_ref())), expected);
        None
    }

    fn distinct(&mut self, key: &Key, words: &[Placed<'_>]) -> Option<()> {
        let mut all = Some(());
        for (at, (word, span)) in words.iter().enumerate() {
            if words[..at].iter().any(|(earlier, _)| earlier == word) {
                self.refuse(span.clone(), format!("`{}` lists \"{word}\" twice", key.path), "each entry once");
                all = None;
            }
        }
        all
    }
}

/// `"a" or "b"`
pub(super) fn quoted(words: &[&str]) -> String {
    let words: Vec<_> = words.iter().map(|word| format!("\"{word}\"")).collect();
    words.join(" or ")
}
