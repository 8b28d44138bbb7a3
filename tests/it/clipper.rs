//! The kernel against independent clippers: boundary quadrature, and the polygon library `geo`.

use brimwright::geom::Sublevel;
use brimwright::study::Fill;
use geo::Area;
use proptest::prelude::*;

use crate::support::clip::{geo_below, geo_measure, geo_region, quadrature};
use crate::support::n_pools;
use crate::support::random::{any, config, convex, direction, share, star};
use crate::support::{held, judge_case, settled, study};

#[test]
fn areas_agree_with_boundary_quadrature() {
    proptest!(config(200, 31), |(sample in any(), up in direction(), share in share())| {
        let edges = sample.edges();
        let (low, high) = sample.extent(up);
        let level = low + share * (high - low);
        let (got, want) = (Sublevel::new(&edges, up).area_below(level), quadrature(&edges, up, level).area);
        let whole = quadrature(&edges, up, high + 1.0).area;
        let allowed = whole * if sample.has_arcs() { 1e-11 } else { 1e-12 };
        prop_assert!((got - want).abs() <= allowed, "share {share}: got {got:e}, quadrature {want:e}, whole {whole:e}");
    });
}

#[test]
fn areas_and_pools_agree_with_a_polygon_library() {
    proptest!(config(150, 32), |(sample in star(5..=40, false), up in direction(), share in share())| {
        let region = geo_region(&sample.outline, &sample.obstacles);
        let sublevel = Sublevel::new(&sample.edges(), up);
        let (low, high) = sample.extent(up);
        let level = low + share * (high - low);
        let clear = sample.edges().iter().all(|e| (up.dot(&e.start.coords) - level).abs() > 1e-5 * (high - low));
        prop_assume!(clear);
        let pieces = geo_below(&region, up, level);
        let (got, want) = (sublevel.area_below(level), geo_measure(&pieces).0);
        let allowed = 1e-7 * sublevel.total_area();
        prop_assert!((got - want).abs() <= allowed, "share {share}: got {got:e}, clipped {want:e}");
        prop_assert_eq!(n_pools(&sublevel, level), pieces.0.len(), "pools at share {}", share);
    });
}

#[test]
fn levels_agree_with_clipping_and_bisection() {
    proptest!(config(24, 33), |(sample in star(5..=20, false), up in direction(), share in share())| {
        let region = geo_region(&sample.outline, &sample.obstacles);
        let area = share * region.unsigned_area();
        let (mut low, mut high) = sample.extent(up);
        let size = high - low;
        while high - low > 1e-10 * size {
            let middle = 0.5 * (low + high);
            if geo_measure(&geo_below(&region, up, middle)).0 < area { low = middle } else { high = middle }
        }
        let got = Sublevel::new(&sample.edges(), up).level_for_area(area);
        // The library's grid blurs the area; where the surface is short, the level is blurred more.
        let width: f64 = Sublevel::new(&sample.edges(), up).chords(got).iter().map(|c| (c.1 - c.0).norm()).sum();
        let allowed = 1e-9 * size + 1e-7 * area / width;
        prop_assert!((got - low).abs() <= allowed, "share {share}: got {got:e}, bisection {low:e}");
    });
}

#[test]
fn centroids_agree_with_quadrature_and_a_polygon_library() {
    proptest!(config(50, 34), |(sample in convex(true), share in share(), a_s in -30.0..30.0, a_z in -9.0..30.0)| {
        let case = judge_case(&study(sample.section(&[], 1.0), Fill::Share(share)), held(a_s, a_z));
        let (settled, up) = (settled(&case), case.gravity.up.unwrap());
        let (low, high) = sample.extent(up);
        let want = quadrature(&sample.edges(), up, settled.pools[0].level_m).centroid;
        let off = (settled.centroid - want).norm();
        // The level itself moves the centroid; both carry rounding of the section's place and size.
        prop_assert!(off <= 1e-9 * (high - low), "share {share}: got {}, quadrature {want}", settled.centroid);
        let region = geo_region(&sample.outline, &sample.obstacles);
        let clipped = geo_measure(&geo_below(&region, up, settled.pools[0].level_m)).1;
        let off = (settled.centroid - clipped).norm();
        // Chords for arcs: an area off by up to 1e-6 of the section's, seen from a body of its share.
        prop_assert!(off <= 1e-5 * (high - low) / share, "share {share}: got {}, clipped {clipped}", settled.centroid);
    });
}
