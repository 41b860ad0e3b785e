//! Which decimal mark a file uses, where it may use both: `1.234` among decimal commas may be a thousand and more.

use crate::fault::{Fault, Faults};

/// What one number says about the marks of its file.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
enum Evidence {
    None,
    Point,
    Comma,
    /// A point that might part thousands.
    DoubtfulPoint,
    /// A comma that might part thousands.
    DoubtfulComma,
}

/// The marks of one file.
#[derive(Debug, Default)]
pub(super) struct Marks {
    /// Line of the first sure decimal point.
    point: Option<usize>,
    /// Line of the first sure decimal comma.
    comma: Option<usize>,
    points: Doubts,
    commas: Doubts,
}

/// Cells with a doubtful mark.
#[derive(Debug, Default)]
struct Doubts {
    faults: Faults,
    lines: Vec<usize>,
}

impl Marks {
    /// Takes note of the number `text` in `line`; `fault` tells where it is, should it turn out to be ambiguous.
    pub(super) fn note(&mut self, text: &str, line: usize, fault: impl FnOnce(String) -> Fault) {
        let (doubts, mark) = match evidence(text) {
            Evidence::None => return,
            Evidence::Point => {
                self.point.get_or_insert(line);
                return;
            }
            Evidence::Comma => {
                self.comma.get_or_insert(line);
                return;
            }
            Evidence::DoubtfulPoint => (&mut self.points, '.'),
            Evidence::DoubtfulComma => (&mut self.commas, ','),
        };
        let number: String = text.chars().map(|letter| if letter == mark { '.' } else { letter }).collect();
        let whole: String = text.chars().filter(|letter| *letter != mark).collect();
        doubts.faults.push(fault(format!("can be read as {number} or as {whole}")));
        doubts.lines.push(line);
    }

    /// What turned out to be ambiguous at the end of the file, and in which lines.
    pub(super) fn ambiguous(self) -> (Faults, Vec<usize>) {
        let points_doubtful = !self.points.lines.is_empty();
        let commas_doubtful = !self.commas.lines.is_empty();
        let points_bad = self.comma.is_some() || (commas_doubtful && self.point.is_none());
        let commas_bad = self.point.is_some() || (points_doubtful && self.comma.is_none());
        let (mut faults, mut lines) = (Faults::new(), Vec::new());
        for (bad, doubts) in [(points_bad, self.points), (commas_bad, self.commas)] {
            if bad {
                faults.append(doubts.faults);
                lines.extend(doubts.lines);
            }
        }
        lines.sort_unstable();
        lines.dedup();
        (faults, lines)
    }
}

fn evidence(text: &str) -> Evidence {
    let number = text.trim_start_matches(['+', '-', '\u{2212}']);
    let length = number.bytes().take_while(|byte| byte.is_ascii_digit() || matches!(byte, b'.' | b',')).count();
    let (number, rest) = number.split_at(length);
    let (points, commas) = (number.matches('.').count(), number.matches(',').count());
    let Some((before, behind)) = number.split_once(['.', ',']) else { return Evidence::None };
    let whole_thousands = (1..=3).contains(&before.len())
        && !before.starts_with('0')
        && behind.len() == 3
        && !rest.starts_with(['e', 'E']);
    match (points, commas, whole_thousands) {
        (1, 0, false) => Evidence::Point,
        (1, 0, true) => Evidence::DoubtfulPoint,
        (0, 1, true) => Evidence::DoubtfulComma,
        (_, 1, _) => Evidence::Comma,
        _ => Evidence::None,
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn ambiguous(numbers: &[&str]) -> Vec<usize> {
        let mut marks = Marks::default();
        for (line, number) in (1..).zip(numbers) {
            marks.note(number, line, |found| Fault::of_file("a", found, ""));
        }
        marks.ambiguous().1
    }

    #[test]
    fn one_mark_in_a_file_is_the_decimal_one() {
        assert!(ambiguous(&["1.234", "4.7", "12"]).is_empty());
        assert!(ambiguous(&["1,234", "4,7", "12"]).is_empty());
        assert!(ambiguous(&["4.7", "4,7", "0.500", "0,500", "1.234e3"]).is_empty());
    }

    #[test]
    fn thousands_beside_the_other_mark_are_ambiguous() {
        assert_eq!(ambiguous(&["1.234 mΩ", "4,7"]), [1]);
        assert_eq!(ambiguous(&["4.7", "-1,234", "12,345"]), [2, 3]);
        assert_eq!(ambiguous(&["1.234", "1,234"]), [1, 2]);
        assert_eq!(ambiguous(&["1.234", "1,234", "4.7"]), [2]);
        assert_eq!(ambiguous(&["1.234,5", "1.234"]), [2]);
    }
}
