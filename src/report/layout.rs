//! Plain text in a page of fixed width: paragraphs, tables, styles.

use anstyle::{AnsiColor, Style};
use unicode_width::UnicodeWidthStr;

/// Longest line of a report, columns.
pub const PAGE: usize = 100;

/// Style of headings.
pub const HEADING: Style = Style::new().bold();
/// Style of what must not be overlooked: the governing limit.
pub const STRONG: Style = Style::new().bold();
/// Style of a good answer.
pub const GOOD: Style = AnsiColor::Green.on_default().bold();
/// Style of a bad answer.
pub const BAD: Style = AnsiColor::Red.on_default().bold();
/// Style of an open answer, and of warnings.
pub const OPEN: Style = AnsiColor::Yellow.on_default().bold();

/// `text` in `style`. Whoever prints it to something that takes no styles strips them.
pub fn styled(text: &str, style: Style) -> String {
    format!("{style}{text}{style:#}")
}

/// `text` broken at spaces into lines of at most [`PAGE`] columns. The first line starts with
/// `first`, the others with as many columns of space. A word longer than the line is cut.
pub fn paragraph(first: &str, text: &str) -> String {
    let indent = first.width();
    let room = PAGE.saturating_sub(indent).max(20);
    let mut lines: Vec<String> = Vec::new();
    let mut line = String::new();
    let text = printable(text);
    for word in text.split_whitespace().flat_map(|word| pieces(word, room)) {
        if !line.is_empty() && line.width() + 1 + word.width() > room {
            lines.push(std::mem::take(&mut line));
        }
        if !line.is_empty() {
            line.push(' ');
        }
        line.push_str(&word);
    }
    lines.push(line);
    let mut out = String::new();
    for (number, line) in lines.iter().enumerate() {
        let start = if number == 0 {
            first.to_string()
        } else {
            " ".repeat(indent)
        };
        out.push_str(format!("{start}{line}").trim_end());
        out.push('\n');
    }
    out
}

/// `text` without control characters: what a file says must not steer the terminal.
fn printable(text: &str) -> String {
    text.chars()
        .map(|c| {
            if c.is_control() && !c.is_whitespace() {
                '\u{fffd}'
            } else {
                c
            }
        })
        .collect()
}

/// A word in pieces no wider than `room`.
fn pieces(word: &str, room: usize) -> Vec<String> {
    let mut out = vec![String::new()];
    for character in word.chars() {
        let piece = out.len() - 1;
        let mut longer = out[piece].clone();
        longer.push(character);
        if longer.width() > room {
            out.push(character.to_string());
        } else {
            out[piece] = longer;
        }
    }
    out
}

/// One row of a table.
#[derive(Clone, Debug, Default)]
pub struct Row {
    /// What the row is about, left-aligned.
    pub label: String,
    /// Its cells, right-aligned; fewer than there are columns leave the rest empty.
    pub cells: Vec<String>,
    /// Words in place of the cells ("never").
    pub words: Option<String>,
    /// Words after the last column.
    pub remark: String,
    /// Whether the row is set off.
    pub strong: bool,
}

impl Row {
    /// A row of cells.
    pub fn of(label: impl Into<String>, cells: Vec<String>) -> Self {
        Row {
            label: label.into(),
            cells,
            ..Row::default()
        }
    }

    /// A row that says in words what no number can.
    pub fn words(label: impl Into<String>, words: impl Into<String>) -> Self {
        Row {
            label: label.into(),
            words: Some(words.into()),
            ..Row::default()
        }
    }
}

/// Between two columns of a table.
pub const GAP: &str = "  ";

/// A table: a heading with the names and units of the columns, then rows.
pub fn table(title: &str, columns: &[&str], units: &[&str], rows: &[Row]) -> String {
    let label_width = rows
        .iter()
        .map(|row| row.label.width())
        .chain([title.width()])
        .max()
        .unwrap_or(0);
    let width = |column: usize| {
        rows.iter()
            .filter_map(|row| row.cells.get(column))
            .map(|cell| cell.width())
            .chain([columns[column].width()])
            .chain(units.get(column).map(|unit| unit.width()))
            .max()
            .unwrap_or(0)
    };
    let widths: Vec<usize> = (0..columns.len()).map(width).collect();
    let line = |label: &str, cells: &[String]| {
        let mut out = pad_right(label, label_width);
        for (column, wide) in widths.iter().enumerate() {
            let cell = cells.get(column).map_or("", String::as_str);
            out.push_str(GAP);
            out.push_str(&pad_left(cell, *wide));
        }
        out
    };
    let own = |texts: &[&str]| texts.iter().map(ToString::to_string).collect::<Vec<_>>();
    let mut out = styled(line(title, &own(columns)).trim_end(), HEADING);
    out.push('\n');
    out.push_str(line("", &own(units)).trim_end());
    out.push('\n');
    for row in rows {
        let text = match &row.words {
            Some(words) => paragraph(
                &format!("{}{GAP}", pad_right(&row.label, label_width)),
                words,
            ),
            None => {
                let cells = line(&row.label, &row.cells);
                let gap = if cells.width() + GAP.len() + row.remark.width() > PAGE {
                    "\n    "
                } else {
                    GAP
                };
                format!("{}\n", format!("{cells}{gap}{}", row.remark).trim_end())
            }
        };
        let text = text.trim_end_matches('\n');
        out.push_str(&if row.strong {
            styled(text, STRONG)
        } else {
            text.to_string()
        });
        out.push('\n');
    }
    out
}

/// `text` filled up with spaces on the right.
pub fn pad_right(text: &str, width: usize) -> String {
    format!("{text}{}", " ".repeat(width.saturating_sub(text.width())))
}

fn pad_left(text: &str, width: usize) -> String {
    format!("{}{text}", " ".repeat(width.saturating_sub(text.width())))
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn paragraphs_keep_the_page() {
        let text = "Straße ".repeat(60) + &"x".repeat(250);
        let set = paragraph("  note: ", &text);
        assert!(set.lines().all(|line| line.width() <= PAGE));
        assert!(set.starts_with("  note: Straße"));
        assert!(
            set.lines()
                .nth(1)
                .is_some_and(|l| l.starts_with("        Straße"))
        );
        assert_eq!(set.matches('x').count(), 250);
    }

    #[test]
    fn columns_line_up_whatever_the_alphabet() {
        let rows = [
            Row::of("Ø α", vec!["1.0".into(), "2".into()]),
            Row::of("plain", vec!["10.0".into(), "3".into()]),
        ];
        let set = table("what", &["a", "b"], &["mm", "N"], &rows);
        let plain = anstream::adapter::strip_str(&set).to_string();
        let ends: Vec<usize> = plain.lines().map(|line| line.width()).collect();
        assert!(ends.iter().all(|end| *end == ends[0]), "{plain}");
    }
}
