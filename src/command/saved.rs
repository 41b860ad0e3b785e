//! A saved shortlist: the rail, the options, the catalog rows that its stages use, and the list.

use std::path::{Path, PathBuf};

use serde::{Deserialize, Serialize};

use super::args::Common;
use super::failure::Failure;
use super::input::{Source, text_of};
use crate::answer::shortlist::{Pick, Shortlist};
use crate::catalog::{Catalog, RawTables};
use crate::part::{Identity, Parts};
use crate::stage::{NamedStage, RectifierKind};

/// The schema of the file.
const SCHEMA: &str = "saved/1";

/// A saved shortlist.
#[derive(Debug, Serialize, Deserialize)]
pub(super) struct Saved {
    schema: String,
    /// The rail.
    pub rail: SavedRail,
    /// How the list was asked for.
    pub options: SavedOptions,
    /// Catalog rows of every part in the list, as written.
    pub rows: Vec<SavedRow>,
    /// The list, best first.
    pub stages: Vec<SavedStage>,
}

/// The rail file of a saved shortlist.
#[derive(Debug, Serialize, Deserialize)]
pub(super) struct SavedRail {
    /// Its file.
    pub file: String,
    /// Its text.
    pub text: String,
    /// The folder of the catalogs as the user named it; `None` for the demo's.
    pub catalogs: Option<String>,
}

impl SavedRail {
    pub(super) fn of(source: Source) -> Self {
        let Source { name, text, catalogs } = source;
        Self { file: name, text, catalogs: catalogs.map(|folder| folder.to_string_lossy().into_owned()) }
    }

    /// The saved rail with the catalogs of today: those of `--catalogs`, else those of then.
    pub(super) fn source(&self, common: &Common) -> Source {
        let catalogs = common.catalogs.clone().or_else(|| self.catalogs.as_ref().map(PathBuf::from));
        Source { name: self.file.clone(), text: self.text.clone(), catalogs }
    }
}

/// The options of a saved shortlist.
#[derive(Debug, Serialize, Deserialize)]
pub(super) struct SavedOptions {
    /// How many stages.
    pub top: usize,
    /// Which count as different.
    pub distinct: String,
}

/// One catalog row.
#[derive(Debug, Serialize, Deserialize)]
pub(super) struct SavedRow {
    /// Catalog file name.
    pub catalog: String,
    /// Part name.
    pub part: String,
    /// Header text and cell, as written.
    pub cells: Vec<(String, String)>,
}

/// One stage.
#[derive(Debug, Serialize, Deserialize)]
pub(super) struct SavedStage {
    /// Place, from 1.
    pub rank: usize,
    /// The stage.
    pub stage: NamedStage,
    /// Its burden.
    pub burden: f64,
    /// Its weighted loss, W.
    pub weighted_loss_w: f64,
}

impl Saved {
    /// A shortlist with what it rests on.
    pub(super) fn new(
        rail: SavedRail,
        options: SavedOptions,
        list: &Shortlist,
        parts: &Parts,
        rows: &RawTables,
    ) -> Self {
        let used =
            |catalog: Catalog, identity: &Identity| list.picks.iter().any(|pick| uses(pick, catalog, &identity.part));
        let mut kept = Vec::new();
        let mut keep = |catalog: Catalog, identities: &mut dyn Iterator<Item = &Identity>| {
            let table = rows.of(catalog);
            for (identity, row) in identities.zip(&table.rows) {
                if used(catalog, identity) {
                    let cells = table
                        .headers
                        .iter()
                        .enumerate()
                        .map(|(place, header)| (header.clone(), row.cell(place).to_owned()));
                    kept.push(SavedRow {
                        catalog: catalog.file_name().to_owned(),
                        part: identity.part.clone(),
                        cells: cells.collect(),
                    });
                }
            }
        };
        keep(Catalog::Switches, &mut parts.switches.iter().map(|part| &part.identity));
        keep(Catalog::Diodes, &mut parts.diodes.iter().map(|part| &part.identity));
        keep(Catalog::Inductors, &mut parts.inductors.iter().map(|part| &part.identity));
        keep(Catalog::Capacitors, &mut parts.capacitors.iter().map(|part| &part.identity));
        let stages = list
            .picks
            .iter()
            .map(|pick| SavedStage {
                rank: pick.rank,
                stage: pick.stage.clone(),
                burden: pick.burden,
                weighted_loss_w: pick.weighted_loss_w,
            })
            .collect();
        Self { schema: SCHEMA.to_owned(), rail, options, rows: kept, stages }
    }

    /// As a file.
    pub(super) fn to_text(&self) -> Result<String, Failure> {
        serde_json::to_string_pretty(self)
            .map(|text| text + "\n")
            .map_err(|error| Failure::Machine(format!("cannot write the saved shortlist: {error}")))
    }

    /// Reads a file back.
    pub(super) fn read(path: &Path) -> Result<Self, Failure> {
        let name = path.display();
        let saved: Self = serde_json::from_str(&text_of(path)?)
            .map_err(|error| Failure::Usage(format!("{name} is not a saved shortlist: {error}")))?;
        if saved.schema != SCHEMA {
            return Err(Failure::Usage(format!(
                "{name} is `{}`, not `{SCHEMA}`: save the shortlist anew",
                saved.schema
            )));
        }
        Ok(saved)
    }
}

fn uses(pick: &Pick, catalog: Catalog, part: &str) -> bool {
    let stage = &pick.stage;
    let rectifier = |kind| stage.rectifier.kind == kind && stage.rectifier.part == part;
    match catalog {
        Catalog::Switches => stage.high_switch.part == part || rectifier(RectifierKind::Switch),
        Catalog::Diodes => rectifier(RectifierKind::Diode),
        Catalog::Inductors => stage.inductor.part == part,
        Catalog::Capacitors => stage.input_bank.part == part || stage.output_bank.part == part,
    }
}
