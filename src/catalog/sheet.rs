//! Catalogs kept in a spreadsheet file: one sheet a catalog, read as the table that it is.

use std::path::{Path, PathBuf};

use calamine::{Data, Reader, open_workbook_auto};

use super::Catalog;

/// Endings of the spreadsheet files that can be read.
const ENDINGS: [&str; 3] = ["xlsx", "xlsb", "ods"];
/// A workbook that may hold several catalogs, each in a sheet of its name.
const WORKBOOK: &str = "catalogs";
/// No spreadsheet file is read beyond this, bytes.
const LONGEST: u64 = 256 << 20;

/// A sheet as the text of a comma-separated table.
#[derive(Debug, Clone, PartialEq, Eq)]
pub(super) struct Sheet {
    /// File and sheet.
    pub name: String,
    /// The table.
    pub text: String,
}

/// The sheet of a catalog: in a workbook named after it (`switches.xlsx`, its sheet of that name or else the first), or in
/// `catalogs.xlsx` (the sheet of that name). `None` where there is none.
///
/// # Errors
/// The file that cannot be read, and why.
pub(super) fn find(folder: &Path, catalog: Catalog) -> Option<Result<Sheet, (String, String)>> {
    let file = |stem: &str, ending: &&str| Some(folder.join(format!("{stem}.{ending}"))).filter(|path| path.is_file());
    if let Some(path) = ENDINGS.iter().find_map(|ending| file(catalog.name(), ending)) {
        return read(&path, catalog, true).transpose();
    }
    let path = ENDINGS.iter().find_map(|ending| file(WORKBOOK, ending))?;
    read(&path, catalog, false).transpose()
}

fn read(path: &PathBuf, catalog: Catalog, or_first: bool) -> Result<Option<Sheet>, (String, String)> {
    let file = path.display().to_string();
    let failed = |why: String| (file.clone(), why);
    let length = std::fs::metadata(path).map_err(|error| failed(error.to_string()))?.len();
    if length > LONGEST {
        return Err(failed(format!("it is longer than {} mebibytes", LONGEST >> 20)));
    }
    let mut workbook = open_workbook_auto(path).map_err(|error| failed(error.to_string()))?;
    let sheets = workbook.sheet_names();
    let named = sheets.iter().find(|name| name.trim().eq_ignore_ascii_case(catalog.name()));
    let Some(sheet) = named.or(sheets.first().filter(|_| or_first)).cloned() else { return Ok(None) };
    let range = workbook.worksheet_range(&sheet).map_err(|error| failed(error.to_string()))?;
    let (first_row, first_column) = range.start().unwrap_or_default();
    let mut writer = csv::WriterBuilder::new().flexible(true).from_writer(Vec::new());
    let written = (0..first_row).try_for_each(|_| writer.write_record([""])).and_then(|()| {
        range.rows().try_for_each(|row| {
            let before = (0..first_column).map(|_| String::new());
            writer.write_record(before.chain(row.iter().map(cell)))
        })
    });
    written.map_err(|error| failed(error.to_string()))?;
    let bytes = writer.into_inner().map_err(|error| failed(error.to_string()))?;
    let text = String::from_utf8(bytes).map_err(|error| failed(error.to_string()))?;
    Ok(Some(Sheet { name: format!("{file}[{sheet}]"), text }))
}

/// A cell as text, on one line so that a row stays a line.
fn cell(data: &Data) -> String {
    match data {
        Data::Empty => String::new(),
        Data::String(text) => text.replace(['\n', '\r'], " "),
        other => other.to_string(),
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn numbers_keep_their_shortest_text() {
        assert_eq!(cell(&Data::Float(4.7)), "4.7");
        assert_eq!(cell(&Data::Float(12.0)), "12");
        assert_eq!(cell(&Data::Int(3)), "3");
        assert_eq!(cell(&Data::String("4.7\nmΩ".to_owned())), "4.7 mΩ");
        assert_eq!(cell(&Data::Empty), "");
    }

    #[test]
    fn a_folder_without_spreadsheets_has_none() {
        assert!(find(Path::new("no-such-folder"), Catalog::Switches).is_none());
    }
}
