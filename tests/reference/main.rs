//! The model against the outside world, one file a source.

mod edges;
mod published;
mod stages;
mod table;
mod thermal;
