//! How long a key takes while something is searched for: over the built-in catalogues, and over one of the observer's own
//! with 2.5 million rows, its index in a file.
//!
//! Each phrase is typed letter by letter; shown are the slowest and the middle key, in milliseconds and as multiples of
//! one reading of the same run: adding up the bytes of the built-in table of the NGC.
//!
//! `cargo bench --bench search`; `-- ROWS` for another number of rows.
#![allow(clippy::unwrap_used, clippy::cast_possible_truncation, missing_docs)]

use std::hint::black_box;
use std::io::Write as _;
use std::time::Instant;

use nonius::angle::{Declination, RightAscension};
use nonius::catalog::index::{Builder, Bytes, Facts, Index, Stamp};
use nonius::catalog::{Catalogue, Filter, Kind, Origin, OwnCatalogue, Rows, Target};
use nonius::sky::{CataloguePlace, Source};

/// As many as the largest catalogues observers carry about.
const ROWS: u64 = 2_500_000;

/// Names, parts of names, slips, numbers, kinds; of the large catalogue's names too.
const PHRASES: [&str; 14] = [
    "m 37",
    "ngc 2099",
    "owl cluster",
    "andromeda galaxy",
    "wega",
    "betelguese",
    "alpha lyrae",
    "hip 91262",
    "galaxy virgo",
    "planetary nebula",
    "tyc 1234-1-1",
    "tyc 9537 2000 1",
    "1 2 3",
    "the double double",
];

fn name(row: u64) -> String {
    format!(
        "TYC {}-{}-{}",
        row % 9537 + 1,
        row / 9537 * 37 % 12_120 + 1,
        row % 3 + 1
    )
}

#[derive(Debug)]
struct Made;

impl Rows for Made {
    fn target(&self, reference: u64) -> Option<Target> {
        let place = CataloguePlace::icrs(
            RightAscension::from_degrees(0.0),
            Declination::from_degrees(0.0),
        );
        Some(Target {
            name: name(reference),
            also: Vec::new(),
            kind: Kind::Star,
            source: Source::Catalogue(place),
            magnitude: Some(magnitude(reference)),
            size_arcmin: None,
            constellation: None,
            catalogue: Origin::List,
            note: String::new(),
        })
    }
}

fn magnitude(row: u64) -> f64 {
    4.0 + (row * 7919 % 9000) as f64 / 1000.0
}

fn large(rows: u64) -> Index {
    let mut builder = Builder::default();
    for row in 0..rows {
        builder.row(Facts {
            reference: row,
            magnitude: Some(magnitude(row) as f32),
            direction: Some([1.0, 0.0, 0.0]),
            kinds: Kind::Star.bit(),
            constellation: None,
        });
        builder.name(&name(row));
    }
    let bytes = builder.finish(&Stamp::default());
    println!("its index: {:.1} MB", bytes.len() as f64 / 1e6);
    let mut file = tempfile::tempfile().unwrap();
    file.write_all(&bytes).unwrap();
    Index::open(Bytes::of_file(file)).unwrap()
}

fn milliseconds(work: impl FnOnce()) -> f64 {
    let start = Instant::now();
    work();
    start.elapsed().as_secs_f64() * 1e3
}

/// Of several goes, the middle one.
fn typical(mut work: impl FnMut()) -> f64 {
    let mut times: Vec<f64> = (0..7).map(|_| milliseconds(&mut work)).collect();
    times.sort_by(f64::total_cmp);
    times[times.len() / 2]
}

fn keys(what: &str, catalogue: &Catalogue, reference: f64) {
    let filter = Filter::default();
    let mut times: Vec<(f64, &str)> = Vec::new();
    for phrase in PHRASES {
        for (at, letter) in phrase.char_indices() {
            let typed = &phrase[..at + letter.len_utf8()];
            times.push((
                typical(|| drop(black_box(catalogue.search(typed, &filter)))),
                typed,
            ));
        }
    }
    times.sort_by(|a, b| a.0.total_cmp(&b.0));
    let (slowest, typed) = times[times.len() - 1];
    let middle = times[times.len() / 2].0;
    println!(
        "{what}: {} keys, the middle one {middle:.2} ms ({:.1} readings), the slowest {slowest:.2} ms ({:.1}): \"{typed}\"",
        times.len(),
        middle / reference,
        slowest / reference,
    );
}

fn main() {
    let rows = std::env::args()
        .find_map(|word| word.parse().ok())
        .unwrap_or(ROWS);
    let table = include_bytes!("../../catalogs/ngc.csv");
    let reference = typical(|| {
        black_box(
            black_box(table)
                .iter()
                .map(|&byte| u64::from(byte))
                .fold(0, |sum, byte| black_box(sum + byte)),
        );
    });
    println!("one reading of the table of the NGC: {reference:.3} ms");
    let made = milliseconds(|| Catalogue::builtin().prepare_search());
    println!("the index of the built-in tables: {made:.2} ms, once");
    let built_in = Catalogue::builtin();
    built_in.prepare_search();
    keys("built in", &built_in, reference);
    let mut index = None;
    let made = milliseconds(|| index = Some(large(rows)));
    println!("an index of {rows} rows: {:.1} s, once", made / 1e3);
    let own = OwnCatalogue::new(index.unwrap(), Box::new(Made));
    let with = built_in.with_catalogues([std::sync::Arc::new(own)]);
    keys("with the observer's own", &with, reference);
}
