//! Aligned columns of text.

use unicode_width::UnicodeWidthStr;

use crate::fault::visible;

/// Which side of a column its cells keep to.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Side {
    /// Words.
    Left,
    /// Numbers.
    Right,
}

/// A table under construction.
#[derive(Debug, Clone)]
pub struct Grid {
    sides: Vec<Side>,
    rows: Vec<Vec<String>>,
}

impl Grid {
    /// A table with these columns.
    pub fn new(columns: &[(&str, Side)]) -> Self {
        Self {
            sides: columns.iter().map(|(_, side)| *side).collect(),
            rows: vec![columns.iter().map(|(title, _)| (*title).to_owned()).collect()],
        }
    }

    /// Adds a row. Text from files is made harmless to the terminal.
    pub fn row(&mut self, cells: impl IntoIterator<Item = String>) {
        self.rows.push(cells.into_iter().map(|cell| visible(&cell)).collect());
    }

    /// The table, each line indented by `indent` blanks, without blanks at line ends.
    pub fn render(&self, indent: usize) -> String {
        let widths: Vec<usize> = (0..self.sides.len())
            .map(|column| {
                self.rows.iter().filter_map(|row| row.get(column)).map(|cell| cell.width()).max().unwrap_or(0)
            })
            .collect();
        let mut text = String::new();
        for row in &self.rows {
            let mut line = " ".repeat(indent);
            for ((cell, side), width) in row.iter().zip(&self.sides).zip(&widths) {
                let gap = " ".repeat(width - cell.width());
                let (before, after) = match side {
                    Side::Left => ("", gap.as_str()),
                    Side::Right => (gap.as_str(), ""),
                };
                line.push_str(before);
                line.push_str(cell);
                line.push_str(after);
                line.push_str("  ");
            }
            text.push_str(line.trim_end());
            text.push('\n');
        }
        text
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn columns_line_up_whatever_the_script() {
        let mut grid = Grid::new(&[("part", Side::Left), ("R", Side::Right)]);
        grid.row(["Q1".to_owned(), "4.70 mΩ".to_owned()]);
        grid.row(["部品".to_owned(), "10 mΩ".to_owned()]);
        assert_eq!(grid.render(1), " part        R\n Q1    4.70 mΩ\n 部品    10 mΩ\n");
    }

    #[test]
    fn control_characters_do_not_reach_the_terminal() {
        let mut grid = Grid::new(&[("part", Side::Left)]);
        grid.row(["a\u{1b}[31mb".to_owned()]);
        assert!(!grid.render(0).contains('\u{1b}'));
    }
}
