//! How long a night's plan takes: the windows of ten thousand objects well under a second, the order of a hundred and ten
//! under 50 ms, ten thousand planned in under two seconds. The figures of the orders found are printed first.
#![allow(clippy::unwrap_used, missing_docs)]

use std::hint::black_box;
use std::path::Path;
use std::time::Duration;

use criterion::{Criterion, criterion_group, criterion_main};
use nonius::angle::{Declination, RightAscension};
use nonius::catalog::{Kind, Origin, Target};
use nonius::metal::{Mount, SideRequest};
use nonius::plan::order::List;
use nonius::plan::{Almanac, Plan, Site, Watch, Window, Wishes};
use nonius::site::Folders;
use nonius::sky::{CataloguePlace, Source};

const EACH_S: f64 = 300.0;

/// Spread evenly over the sky, a third each of what needs much, less and little of the night.
fn targets(count: usize) -> Vec<Target> {
    const GOLDEN_TURN_DEG: f64 = 137.507_764;
    let kinds = [Kind::Galaxy, Kind::OpenCluster, Kind::DoubleStar];
    (0..count)
        .map(|number| {
            let sine = 1.0 - 2.0 * (number as f64 + 0.5) / count as f64;
            let place = CataloguePlace::icrs(
                RightAscension::from_degrees(number as f64 * GOLDEN_TURN_DEG),
                Declination::from_degrees(sine.asin().to_degrees()),
            );
            Target {
                name: format!("object {number}"),
                also: Vec::new(),
                kind: kinds[number % kinds.len()],
                source: Source::Catalogue(place),
                magnitude: None,
                size_arcmin: None,
                constellation: None,
                catalogue: Origin::Given,
                note: String::new(),
            }
        })
        .collect()
}

fn station() -> (nonius::site::Site, Mount) {
    let nowhere = Path::new("no folder of anyone's");
    let folders = Folders::at(nowhere, nowhere, nowhere);
    let site = folders.site("tarn-hollow").unwrap();
    let mount = folders.mount_of(&site).unwrap().mount;
    (site.site, mount)
}

fn almanac(site: &nonius::site::Site) -> Almanac {
    let night = "2026-12-01".parse().unwrap();
    Almanac::of(&site.observer(), site.zone, night).unwrap()
}

fn windows(site: Site<'_>, almanac: &Almanac, targets: &[Target]) -> Vec<Vec<Window>> {
    let watch = Watch::new(site, almanac);
    let windows = |target| watch.prospect(target).windows;
    targets.iter().map(windows).collect()
}

fn plans(c: &mut Criterion) {
    let (station, mount) = station();
    let site = Site {
        horizon: &station.horizon,
        mount: &mount,
    };
    let night = almanac(&station);
    c.bench_function("the almanac of a night", |b| {
        b.iter(|| almanac(black_box(&station)));
    });
    let many = targets(10_000);
    c.bench_function("windows of 10,000 objects", |b| {
        b.iter(|| windows(site, &night, black_box(&many)));
    });
    for count in [10, 20, 40, 110, 1000, 10_000] {
        let windows = windows(site, &night, &targets(count));
        let windows: Vec<Vec<Window>> = windows.into_iter().filter(|w| !w.is_empty()).collect();
        let list = List::new(windows.iter().map(Vec::as_slice), night.whole.from, EACH_S);
        let (given, best) = (list.tally(&list.as_given()), list.tally(&list.in_order()));
        assert!(!given.is_better_than(&best), "{given:?} {best:?}");
        println!(
            "{} of {count} objects to be had; lost {} (given {}), price {:.0} (given {:.0}), swing {:.0}° ({:.0}°), turns {} ({})",
            windows.len(),
            best.lost,
            given.lost,
            best.price_deg(),
            given.price_deg(),
            best.swing.degrees(),
            given.swing.degrees(),
            best.turns_over,
            given.turns_over
        );
        c.bench_function(&format!("order of {count} objects"), |b| {
            b.iter(|| black_box(&list).in_order());
        });
    }
    let wishes = Wishes {
        each_s: EACH_S,
        keep_order: false,
        side: SideRequest::Auto,
    };
    for count in [110, 10_000] {
        let list: Vec<(String, Option<Target>)> = targets(count)
            .into_iter()
            .map(|target| (target.name.clone(), Some(target)))
            .collect();
        c.bench_function(&format!("plan of {count} objects"), |b| {
            b.iter(|| Plan::new(site, night.clone(), list.clone(), wishes));
        });
    }
}

criterion_group! {
    name = benches;
    config = Criterion::default().sample_size(10).measurement_time(Duration::from_secs(2)).warm_up_time(Duration::from_millis(500));
    targets = plans
}
criterion_main!(benches);
