//! Aligned columns of text.

use unicode_width::UnicodeWidthStr;

use crate::fault::visible;

/// Blanks between columns.
const GAP: usize = 2;
/// Columns of a screen that nobody has to widen.
const SCREEN_WIDTH: usize = 100;
/// Longest cell that its column is made wide enough for.
const LONGEST_ALIGNED: usize = 40;

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
    /// A table with these columns; there must be one.
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
        let columns: Vec<usize> = (0..self.sides.len()).collect();
        self.block(indent, &columns, &self.widths())
    }

    /// The table, cut into blocks below each other that are no wider than a screen, each of which begins with the first column.
    pub fn render_blocks(&self) -> String {
        let widths = self.widths();
        let mut blocks: Vec<Vec<usize>> = vec![vec![0]];
        let mut used = widths[0];
        for (column, width) in widths.iter().enumerate().skip(1) {
            if used + GAP + width > SCREEN_WIDTH && blocks.last().is_some_and(|block| block.len() > 1) {
                blocks.push(vec![0]);
                used = widths[0];
            }
            used += GAP + width;
            if let Some(block) = blocks.last_mut() {
                block.push(column);
            }
        }
        let blocks: Vec<String> = blocks.iter().map(|columns| self.block(0, columns, &widths)).collect();
        blocks.join("\n")
    }

    /// How wide each column is; a cell longer than most does not push the others' neighbours away.
    fn widths(&self) -> Vec<usize> {
        let width = |column: usize| {
            let cells = self.rows.iter().filter_map(|row| row.get(column)).map(|cell| cell.width());
            cells.filter(|width| *width <= LONGEST_ALIGNED).max().unwrap_or(0)
        };
        (0..self.sides.len()).map(width).collect()
    }

    fn block(&self, indent: usize, columns: &[usize], widths: &[usize]) -> String {
        let mut text = String::new();
        for row in &self.rows {
            let mut line = " ".repeat(indent);
            for &column in columns {
                let Some(cell) = row.get(column) else { continue };
                let gap = " ".repeat(widths[column].saturating_sub(cell.width()));
                let (before, after) = match self.sides[column] {
                    Side::Left => ("", gap.as_str()),
                    Side::Right => (gap.as_str(), ""),
                };
                line.push_str(before);
                line.push_str(cell);
                line.push_str(after);
                line.push_str(&" ".repeat(GAP));
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
    fn a_wide_table_is_cut_into_blocks_that_begin_alike() {
        let titles: Vec<String> = (0..9).map(|place| format!("{place:<20}")).collect();
        let mut columns = vec![("rank", Side::Right)];
        columns.extend(titles.iter().map(|title| (title.as_str(), Side::Left)));
        let mut grid = Grid::new(&columns);
        grid.row((0..10).map(|cell| cell.to_string()));
        let text = grid.render_blocks();
        assert!(text.lines().all(|line| line.width() <= SCREEN_WIDTH), "{text}");
        assert_eq!(text.matches("rank").count(), 3, "{text}");
        let cells: Vec<&str> = text.split_whitespace().filter(|word| *word != "rank").collect();
        assert_eq!(cells, "0 1 2 3 0 1 2 3 4 4 5 6 7 0 5 6 7 8 8 0 9".split(' ').collect::<Vec<_>>(), "{text}");
    }

    #[test]
    fn one_long_cell_does_not_push_all_others_away() {
        let mut grid = Grid::new(&[("a", Side::Left), ("b", Side::Left)]);
        grid.row(["x".repeat(41), "1".to_owned()]);
        grid.row(["y".to_owned(), "2".to_owned()]);
        assert_eq!(grid.render(0), format!("a  b\n{}  1\ny  2\n", "x".repeat(41)));
    }

    #[test]
    fn control_characters_do_not_reach_the_terminal() {
        let mut grid = Grid::new(&[("part", Side::Left)]);
        grid.row(["a\u{1b}[31mb".to_owned()]);
        assert!(!grid.render(0).contains('\u{1b}'));
    }
}
