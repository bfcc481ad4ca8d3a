//! Geometries as GeoPackage binary: a header, then well-known binary.
//!
//! Source: OGC 12-128r17 (GeoPackage 1.3), clause 2.1.3.

use super::package::GeometryKind;
use super::rtree::Bounds;
use geo_types::{Coord, Geometry, LineString, MultiLineString, MultiPolygon};
use wkb::Endianness;
use wkb::writer::{WriteOptions, write_geometry};

/// Little-endian header, no envelope.
const PLAIN: u8 = 0b0000_0001;
/// The same with an envelope of x and y.
const WITH_ENVELOPE: u8 = PLAIN | 0b0000_0010;
const WKB: WriteOptions = WriteOptions { endianness: Endianness::LittleEndian };

/// Makes blobs for one layer.
pub(super) struct BlobWriter {
    srs_id: i32,
    kind: GeometryKind,
    buffer: Vec<u8>,
}

impl BlobWriter {
    pub fn new(srs_id: i32, kind: GeometryKind) -> Self {
        Self { srs_id, kind, buffer: Vec::new() }
    }

    fn header(&mut self, flags: u8) {
        self.buffer.clear();
        self.buffer.extend_from_slice(&[b'G', b'P', 0, flags]);
        self.buffer.extend_from_slice(&self.srs_id.to_le_bytes());
    }

    /// A point.
    pub fn point(&mut self, point: Coord<f64>) -> &[u8] {
        self.header(PLAIN);
        self.buffer.push(1); // little-endian
        self.buffer.extend_from_slice(&1_u32.to_le_bytes()); // wkbPoint
        self.buffer.extend_from_slice(&point.x.to_le_bytes());
        self.buffer.extend_from_slice(&point.y.to_le_bytes());
        &self.buffer
    }

    /// Any geometry, promoted to the layer's kind; nothing for an empty one, which is written as a null.
    ///
    /// # Errors
    /// What is wrong with the geometry.
    pub fn any(&mut self, geometry: &Geometry<f64>) -> Result<Option<&[u8]>, String> {
        let promoted = match (self.kind, geometry) {
            (GeometryKind::Point, Geometry::Point(p)) => return Ok(Some(self.point(p.0))),
            (GeometryKind::MultiPolygon, Geometry::Polygon(p)) => &MultiPolygon(vec![p.clone()]).into(),
            (GeometryKind::MultiLineString, Geometry::LineString(l)) => &MultiLineString(vec![l.clone()]).into(),
            (GeometryKind::MultiLineString, Geometry::Line(l)) => {
                &MultiLineString(vec![LineString::from(vec![l.start, l.end])]).into()
            }
            (GeometryKind::MultiPolygon, Geometry::MultiPolygon(_))
            | (GeometryKind::MultiLineString, Geometry::MultiLineString(_)) => geometry,
            _ => return Err(format!("a shape is not of the layer's kind {:?}", self.kind)),
        };
        let Some(b) = Bounds::of(promoted) else { return Ok(None) };
        self.header(WITH_ENVELOPE);
        for v in [b.min.x, b.max.x, b.min.y, b.max.y] {
            self.buffer.extend_from_slice(&v.to_le_bytes());
        }
        write_geometry(&mut self.buffer, promoted, &WKB).map_err(|e| format!("a shape cannot be encoded: {e}"))?;
        Ok(Some(&self.buffer))
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use geo_types::polygon;

    #[test]
    fn a_point_is_laid_out_as_the_standard_says() {
        let mut w = BlobWriter::new(4326, GeometryKind::Point);
        let blob = w.point(Coord { x: 1.0, y: -2.0 });
        let mut expected = b"GP\x00\x01\xe6\x10\x00\x00\x01\x01\x00\x00\x00".to_vec();
        expected.extend_from_slice(&[0, 0, 0, 0, 0, 0, 0xf0, 0x3f, 0, 0, 0, 0, 0, 0, 0, 0xc0]);
        assert_eq!(blob, expected);
    }

    #[test]
    fn a_polygon_is_promoted_and_has_its_envelope_in_front() {
        let mut w = BlobWriter::new(1, GeometryKind::MultiPolygon);
        let square = polygon![(x: 0.0, y: 10.0), (x: 5.0, y: 10.0), (x: 5.0, y: 20.0), (x: 0.0, y: 10.0)];
        let blob = w.any(&square.into()).unwrap().unwrap();
        assert_eq!(blob[3], 3);
        let double = |i: usize| f64::from_le_bytes(blob[8 + 8 * i..16 + 8 * i].try_into().unwrap());
        assert_eq!([double(0), double(1), double(2), double(3)], [0.0, 5.0, 10.0, 20.0]);
        assert_eq!(blob[40..45], [1, 6, 0, 0, 0]); // little-endian, wkbMultiPolygon
    }

    #[test]
    fn an_empty_shape_is_none_and_a_shape_of_another_kind_an_error() {
        let mut w = BlobWriter::new(1, GeometryKind::MultiPolygon);
        assert_eq!(w.any(&MultiPolygon::<f64>(vec![]).into()), Ok(None));
        assert!(w.any(&Geometry::Point((1.0, 2.0).into())).is_err());
    }
}
