//! The built-in rail and catalogs.
