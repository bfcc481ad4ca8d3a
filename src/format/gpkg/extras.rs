//! What a GeoPackage holds besides layers: meanings of columns, metadata, styles.
//!
//! Table definitions: OGC 12-128r17 (GeoPackage 1.3), annexes F.8 (metadata) and F.9 (schema). `layer_styles` is no
//! standard but what desktop GIS and GDAL agree on.

use super::content::has_table;
use super::package::{GEOMETRY, Package, STYLES};
use rusqlite::{Connection, Result, params};

const EXTENSION: &str = "INSERT INTO gpkg_extensions(table_name, column_name, extension_name, definition, scope) \
                         VALUES (?1, NULL, ?2, ?3, 'read-write')";

/// Registers tables of an extension.
fn register(db: &Connection, tables: [&str; 2], extension: &str, annex: &str) -> Result<()> {
    if !has_table(db, "gpkg_extensions")? {
        db.execute_batch(
            "CREATE TABLE gpkg_extensions (table_name TEXT, column_name TEXT, extension_name TEXT NOT NULL, \
             definition TEXT NOT NULL, scope TEXT NOT NULL, \
             CONSTRAINT ge_tce UNIQUE (table_name, column_name, extension_name))",
        )?;
    }
    let definition = format!("http://www.geopackage.org/spec130/#{annex}");
    tables.iter().try_for_each(|table| db.execute(EXTENSION, [table, extension, &definition]).map(|_| ()))
}

/// Title and description of every column that has them.
pub(super) fn schema(db: &Connection, package: &Package<'_>) -> Result<()> {
    db.execute_batch(
        "CREATE TABLE gpkg_data_columns (table_name TEXT NOT NULL, column_name TEXT NOT NULL, name TEXT, title TEXT, \
         description TEXT, mime_type TEXT, constraint_name TEXT, \
         CONSTRAINT pk_gdc PRIMARY KEY (table_name, column_name), CONSTRAINT gdc_tn UNIQUE (table_name, name));
         CREATE TABLE gpkg_data_column_constraints (constraint_name TEXT NOT NULL, constraint_type TEXT NOT NULL, \
         value TEXT, min NUMERIC, min_is_inclusive BOOLEAN, max NUMERIC, max_is_inclusive BOOLEAN, description TEXT, \
         CONSTRAINT gdcc_ntv UNIQUE (constraint_name, constraint_type, value))",
    )?;
    register(db, ["gpkg_data_columns", "gpkg_data_column_constraints"], "gpkg_schema", "extension_schema")?;
    let mut insert = db.prepare(
        "INSERT INTO gpkg_data_columns(table_name, column_name, name, title, description) VALUES (?1, ?2, ?2, ?3, ?4)",
    )?;
    for layer in &package.layers {
        for field in layer.table.fields.iter().filter(|f| !f.title.is_empty() || !f.description.is_empty()) {
            let given = |text: &'_ str| Some(text.to_owned()).filter(|t| !t.is_empty());
            let (title, description) = (given(&field.title), given(&field.description));
            insert.execute(params![layer.table.name, field.name, title, description])?;
        }
    }
    Ok(())
}

/// Metadata about the whole package.
pub(super) fn metadata(db: &Connection, package: &Package<'_>) -> Result<()> {
    if package.metadata.is_empty() {
        return Ok(());
    }
    db.execute_batch(
        "CREATE TABLE gpkg_metadata (id INTEGER CONSTRAINT m_pk PRIMARY KEY ASC NOT NULL, \
         md_scope TEXT NOT NULL DEFAULT 'dataset', md_standard_uri TEXT NOT NULL, \
         mime_type TEXT NOT NULL DEFAULT 'text/xml', metadata TEXT NOT NULL DEFAULT '');
         CREATE TABLE gpkg_metadata_reference (reference_scope TEXT NOT NULL, table_name TEXT, column_name TEXT, \
         row_id_value INTEGER, timestamp DATETIME NOT NULL DEFAULT (strftime('%Y-%m-%dT%H:%M:%fZ','now')), \
         md_file_id INTEGER NOT NULL, md_parent_id INTEGER, \
         CONSTRAINT crmr_mfi_fk FOREIGN KEY (md_file_id) REFERENCES gpkg_metadata(id), \
         CONSTRAINT crmr_mpi_fk FOREIGN KEY (md_parent_id) REFERENCES gpkg_metadata(id))",
    )?;
    register(db, ["gpkg_metadata", "gpkg_metadata_reference"], "gpkg_metadata", "extension_metadata")?;
    for (record, id) in package.metadata.iter().zip(1_i64..) {
        db.execute(
            "INSERT INTO gpkg_metadata(id, md_scope, md_standard_uri, mime_type, metadata) VALUES (?1, 'dataset', ?2, ?3, ?4)",
            params![id, record.standard_uri, record.mime_type, record.text],
        )?;
        db.execute(
            "INSERT INTO gpkg_metadata_reference(reference_scope, timestamp, md_file_id) VALUES ('geopackage', ?1, ?2)",
            params![package.last_change, id],
        )?;
    }
    Ok(())
}

/// Styles beside their layers.
pub(super) fn styles(db: &Connection, package: &Package<'_>) -> Result<()> {
    if package.styles.is_empty() {
        return Ok(());
    }
    db.execute_batch(&format!(
        "CREATE TABLE {STYLES} (id INTEGER PRIMARY KEY AUTOINCREMENT NOT NULL, f_table_catalog TEXT(256), \
         f_table_schema TEXT(256), f_table_name TEXT(256), f_geometry_column TEXT(256), styleName TEXT(30), \
         styleQML TEXT, styleSLD TEXT, useAsDefault BOOLEAN, description TEXT, owner TEXT(30), ui TEXT(30), \
         update_time DATETIME DEFAULT (strftime('%Y-%m-%dT%H:%M:%fZ','now')))"
    ))?;
    db.execute(
        "INSERT INTO gpkg_contents(table_name, data_type, identifier, description, last_change, srs_id) \
         VALUES (?1, 'attributes', ?1, '', ?2, 0)",
        params![STYLES, package.last_change],
    )?;
    for style in &package.styles {
        // Readers find a style by an empty catalogue and schema and the exact geometry column; nulls hide it.
        db.execute(
            &format!(
                "INSERT INTO {STYLES}(f_table_catalog, f_table_schema, f_table_name, f_geometry_column, styleName, \
                 styleQML, styleSLD, useAsDefault, description, owner, update_time) \
                 VALUES ('', '', ?1, ?2, ?3, ?4, ?5, ?6, ?7, '', ?8)"
            ),
            params![
                style.layer,
                GEOMETRY,
                style.name,
                style.qml,
                style.sld,
                style.default,
                style.description,
                package.last_change
            ],
        )?;
    }
    Ok(())
}
