//! Which known word a misspelt one is nearest to.

/// The known word nearest to `word`, unless none is near: at most a third of its letters may be wrong.
///
/// Letters are compared without case; hyphens and blanks count as underscores.
pub fn nearest<'k>(word: &str, known: impl IntoIterator<Item = &'k str>) -> Option<&'k str> {
    let word = plain(word);
    known
        .into_iter()
        .filter_map(|candidate| {
            let letters = plain(candidate);
            let most = (word.len().max(letters.len()) / 3).max(1);
            if word.len().abs_diff(letters.len()) > most || letters.len() < 2 {
                return None;
            }
            let wrong = distance(&word, &letters);
            (wrong <= most).then_some((wrong, candidate))
        })
        .min_by_key(|(wrong, _)| *wrong)
        .map(|(_, candidate)| candidate)
}

fn plain(word: &str) -> Vec<char> {
    let letters = word.trim().chars().flat_map(char::to_lowercase);
    letters.map(|letter| if matches!(letter, '-' | ' ') { '_' } else { letter }).collect()
}

/// Fewest insertions, deletions, substitutions and swaps of neighbours between two words
/// (optimal string alignment, Damerau 1964).
fn distance(from: &[char], to: &[char]) -> usize {
    let mut before_last = vec![0; to.len() + 1];
    let mut last: Vec<usize> = (0..=to.len()).collect();
    for (row, letter) in from.iter().enumerate() {
        let mut now = vec![row + 1];
        for (column, other) in to.iter().enumerate() {
            let substituted = last[column] + usize::from(letter != other);
            let mut least = substituted.min(last[column + 1] + 1).min(now[column] + 1);
            if row > 0 && column > 0 && *letter == to[column - 1] && from[row - 1] == *other {
                least = least.min(before_last[column - 1] + 1);
            }
            now.push(least);
        }
        before_last = last;
        last = now;
    }
    last[to.len()]
}

#[cfg(test)]
mod tests {
    use super::*;

    const KNOWN: [&str; 4] = ["pull_up", "pull_down", "dead_time", "supply"];

    #[test]
    fn slips_of_the_finger_find_their_word() {
        for (slip, meant) in [
            ("pullup", "pull_up"),
            ("pull-up", "pull_up"),
            ("Pull_Down", "pull_down"),
            ("dead_tmie", "dead_time"),
            ("deadtime", "dead_time"),
            ("suply", "supply"),
        ] {
            assert_eq!(nearest(slip, KNOWN), Some(meant), "{slip}");
        }
    }

    #[test]
    fn a_strange_word_finds_nothing() {
        for strange in ["colour", "", "x", "a_very_long_word_that_is_near_to_nothing"] {
            assert_eq!(nearest(strange, KNOWN), None, "{strange}");
        }
    }

    #[test]
    fn a_swap_of_neighbours_is_one_slip() {
        let letters = |word: &str| word.chars().collect::<Vec<_>>();
        assert_eq!(distance(&letters("ab"), &letters("ba")), 1);
        assert_eq!(distance(&letters("kitten"), &letters("sitting")), 3);
        assert_eq!(distance(&letters(""), &letters("abc")), 3);
    }
}
