//! Rows, index and accompanying tables into a GeoPackage that GDAL made.

use super::package::{GEOMETRY, GeometryKind, LayerToWrite, Package, STYLES, sql_type};
use super::rtree::{self, Bounds, Packed};
use super::{extras, rows};
use crate::notice::Progress;
use rusqlite::{Connection, OptionalExtension, Result, params};
use std::path::Path;

/// Fills the file.
///
/// # Errors
/// What was being written, and SQLite's error.
pub(super) fn fill(
    path: &Path,
    package: &Package<'_>,
    progress: &dyn Progress,
) -> std::result::Result<(), (String, rusqlite::Error)> {
    let during = |what: &str| {
        let what = what.to_owned();
        move |error| (what, error)
    };
    let db = Connection::open(path).map_err(during("the file"))?;
    // No journal: the draft is thrown away on any failure, and synced once when complete.
    db.execute_batch(
        "PRAGMA locking_mode=EXCLUSIVE; PRAGMA journal_mode=OFF; PRAGMA synchronous=OFF; PRAGMA cache_size=-65536; BEGIN",
    )
    .map_err(during("the file"))?;
    for layer in &package.layers {
        write_layer(&db, layer, progress).map_err(during(&format!("layer \"{}\"", layer.table.name)))?;
    }
    extras::schema(&db, package).map_err(during("the descriptions of columns"))?;
    extras::metadata(&db, package).map_err(during("the metadata"))?;
    extras::styles(&db, package).map_err(during(STYLES))?;
    db.execute("UPDATE gpkg_contents SET last_change = ?1", [&package.last_change]).map_err(during("the file"))?;
    db.execute_batch("COMMIT").map_err(during("the file"))?;
    db.close().map_err(|(_, error)| ("the file".to_owned(), error))
}

/// An identifier in SQL.
pub(super) fn quoted(name: &str) -> String {
    format!("\"{}\"", name.replace('"', "\"\""))
}

fn write_layer(db: &Connection, layer: &LayerToWrite<'_>, progress: &dyn Progress) -> Result<()> {
    let name = &layer.table.name;
    let triggers = drop_triggers(db, name)?;
    for field in &layer.table.fields {
        let (name, column, kind) = (quoted(name), quoted(&field.name), sql_type(&field.column));
        db.execute_batch(&format!("ALTER TABLE {name} ADD COLUMN {column} {kind}"))?;
    }
    if layer.geometry == GeometryKind::None {
        rows::insert(db, layer, 0, progress)?;
    } else {
        let index = format!("rtree_{name}_{GEOMETRY}");
        let table = |part: &str| quoted(&format!("{index}_{part}"));
        let srs_id =
            db.query_row("SELECT srs_id FROM gpkg_geometry_columns WHERE table_name = ?1", [name], |r| r.get(0))?;
        let sql = format!("SELECT length(data) FROM {} WHERE nodeno = 1", table("node"));
        let node_size: i64 = db.query_row(&sql, [], |r| r.get(0))?;
        let shapes = &layer.table.shapes;
        let packed = std::thread::scope(|threads| {
            let packing = threads.spawn(|| rtree::pack(shapes, node_size as usize));
            rows::insert(db, layer, srs_id, progress)?;
            Ok::<_, rusqlite::Error>(packing.join().unwrap_or_else(|panic| std::panic::resume_unwind(panic)))
        })?;
        write_index(db, &packed, table)?;
        if let Some(b) = Bounds::of_all(shapes) {
            db.execute(
                "UPDATE gpkg_contents SET min_x=?1, min_y=?2, max_x=?3, max_y=?4 WHERE table_name=?5",
                params![b.min.x, b.min.y, b.max.x, b.max.y, name],
            )?;
        }
    }
    db.execute(
        "UPDATE gpkg_ogr_contents SET feature_count = ?1 WHERE table_name = ?2",
        params![layer.table.len() as i64, name],
    )?;
    triggers.iter().try_for_each(|sql| db.execute_batch(sql))
}

/// Takes the triggers off a table and returns how to make them again.
fn drop_triggers(db: &Connection, table: &str) -> Result<Vec<String>> {
    let mut find =
        db.prepare("SELECT name, sql FROM sqlite_master WHERE type='trigger' AND tbl_name=?1 ORDER BY rowid")?;
    let triggers: Vec<(String, String)> =
        find.query_map([table], |r| Ok((r.get(0)?, r.get(1)?)))?.collect::<Result<_>>()?;
    for (name, _) in &triggers {
        db.execute_batch(&format!("DROP TRIGGER {}", quoted(name)))?;
    }
    Ok(triggers.into_iter().map(|(_, sql)| sql).collect())
}

/// Replaces the empty index that the module made.
fn write_index(db: &Connection, packed: &Packed, table: impl Fn(&str) -> String) -> Result<()> {
    let (nodes, parents, rowids) = (table("node"), table("parent"), table("rowid"));
    db.execute_batch(&format!("DELETE FROM {nodes}; DELETE FROM {parents}; DELETE FROM {rowids}"))?;
    let mut node = db.prepare(&format!("INSERT INTO {nodes}(nodeno, data) VALUES (?1, ?2)"))?;
    for n in &packed.nodes {
        node.execute(params![n.number, n.data])?;
    }
    let mut parent = db.prepare(&format!("INSERT INTO {parents}(nodeno, parentnode) VALUES (?1, ?2)"))?;
    for n in &packed.nodes {
        if let Some(above) = n.parent {
            parent.execute([n.number, above])?;
        }
    }
    let mut rowid = db.prepare(&format!("INSERT INTO {rowids}(rowid, nodeno) VALUES (?1, ?2)"))?;
    for &(key, leaf) in &packed.leaves {
        rowid.execute([key, leaf])?;
    }
    Ok(())
}

/// True where the table is there.
pub(super) fn has_table(db: &Connection, name: &str) -> Result<bool> {
    let found = db.query_row("SELECT 1 FROM sqlite_master WHERE type='table' AND name=?1", [name], |_| Ok(()));
    Ok(found.optional()?.is_some())
}
