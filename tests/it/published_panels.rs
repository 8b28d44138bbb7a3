//! Published bending of rectangular panels, and series solutions that need none of the project's own method.

use std::f64::consts::PI;

use brimwright::plates::{Bending, PanelGeometry, PointState, Profile, SolvedPanel, Support};

use crate::support::table::{Findings, table};

/// Poisson's ratio of all tables.
const POISSON: f64 = 0.3;

fn panel(width_m: f64, height_m: f64, support: Support, poisson: f64) -> SolvedPanel {
    SolvedPanel::new(PanelGeometry { width_m, height_m, support, poisson }).unwrap_or_else(|e| panic!("{e}"))
}

/// Bends a panel by a linear pressure: the largest of everything, and its state at points given as shares of its
/// sides.
fn bend(panel: &SolvedPanel, bottom_pa: f64, top_pa: f64) -> (Bending, impl Fn(f64, f64) -> PointState) {
    let PanelGeometry { width_m, height_m, .. } = panel.geometry();
    let bent = panel.bend(&Profile::linear(height_m, bottom_pa, top_pa).unwrap()).unwrap();
    (bent.bending(), move |x, y| bent.at(x * width_m, y * height_m))
}

#[test]
fn simply_supported_under_uniform_pressure() {
    let mut findings = Findings::default();
    for row in &table("panel_simple_uniform.csv").rows {
        let panel = panel(1.0, row.number("b_over_a"), Support::Simple, POISSON);
        let (bending, at) = bend(&panel, 1.0, 1.0);
        let middle = at(0.5, 0.5);
        row.compare(&mut findings, "deflection", middle.deflection_n_m2);
        row.compare(&mut findings, "moment_short_span", middle.across_n);
        row.compare(&mut findings, "moment_long_span", middle.along_n);
        row.compare(&mut findings, "deflection", bending.summits.deflection_n_m2.value);
        row.compare(&mut findings, "moment_short_span", bending.across.high.value);
    }
    findings.report(55);
}

#[test]
fn clamped_under_uniform_pressure() {
    let mut findings = Findings::default();
    for row in &table("panel_clamped_uniform.csv").rows {
        let panel = panel(1.0, row.number("b_over_a"), Support::Clamped, POISSON);
        let (bending, at) = bend(&panel, 1.0, 1.0);
        let middle = at(0.5, 0.5);
        // A ratio of 20 stands for an endless panel.
        let share = if row.id() == "8b-limit" { 3e-4 } else { 1e-4 };
        for (column, got) in [
            ("deflection", middle.deflection_n_m2),
            ("moment_short_span", middle.across_n),
            ("moment_long_span", middle.along_n),
        ] {
            row.compare_within(&mut findings, column, got, share * row.number(column));
        }
        row.compare(&mut findings, "moment_long_edge", at(0.0, 0.5).across_n);
        row.compare(&mut findings, "moment_short_edge", at(0.5, 0.0).along_n);
        row.compare(&mut findings, "moment_short_edge", bending.bottom.expect("a held bottom").moment_n);
    }
    findings.report(52);
}

#[test]
fn simply_supported_under_hydrostatic_pressure() {
    let mut findings = Findings::default();
    for row in &table("panel_simple_hydrostatic.csv").rows {
        // The table's x runs along the height; its b lies across.
        let ratio = row.number("b_over_a");
        let panel = panel(ratio, 1.0, Support::Simple, POISSON);
        let (bending, at) = bend(&panel, 0.0, 1.0);
        let middle = at(0.5, 0.5);
        row.compare(&mut findings, "deflection_centre", middle.deflection_n_m2);
        row.compare(&mut findings, "mx_centre", middle.along_n);
        row.compare(&mut findings, "my_centre", middle.across_n);
        // In a wide panel the moment across is largest off the middle line, which alone is in the table.
        let heights = (0..=500).map(|i| f64::from(i) / 500.0);
        let across = heights.map(|y| (at(0.5, y).across_n, y)).max_by(|a, b| a.0.total_cmp(&b.0)).unwrap();
        let (deflection, along) = (bending.summits.deflection_n_m2, bending.along.high);
        for (value, y, column) in [
            (deflection.value, deflection.y_m, "deflection_max"),
            (along.value, along.y_m, "mx_max"),
            (across.0, across.1, "my_max"),
        ] {
            row.compare(&mut findings, column, value);
            row.compare_within(&mut findings, &format!("{column}_at"), y, 0.002);
        }
        assert!(
            bending.across.high.value >= across.0 * (1.0 - 1e-4),
            "{}: {:?} misses {across:?}",
            row.id(),
            bending.across
        );
    }
    findings.report(54);
}

#[test]
fn clamped_under_hydrostatic_pressure() {
    let mut findings = Findings::default();
    for row in &table("panel_clamped_hydrostatic.csv").rows {
        let panel = panel(row.number("b_over_a"), 1.0, Support::Clamped, POISSON);
        let (bending, at) = bend(&panel, 0.0, 1.0);
        let middle = at(0.5, 0.5);
        for (column, got, last_digit) in [
            ("deflection", middle.deflection_n_m2, 1e-8),
            ("mx_centre", middle.along_n, 1e-6),
            ("my_centre", middle.across_n, 1e-6),
        ] {
            let allowed = (1e-4 * row.number(column)).max(0.6 * last_digit);
            row.compare_within(&mut findings, column, got, allowed);
        }
        row.compare(&mut findings, "moment_loaded_edge", at(0.5, 1.0).along_n);
        row.compare(&mut findings, "moment_loaded_edge", bending.top.expect("a held top").moment_n);
        row.compare(&mut findings, "moment_other_edge", at(0.5, 0.0).along_n);
        row.compare(&mut findings, "moment_y_edges", at(0.0, 0.5).across_n);
    }
    findings.report(28);
}

#[test]
fn free_top_under_hydrostatic_pressure() {
    let mut findings = Findings::default();
    for row in &table("panel_free_top.csv").rows {
        let is_clamped = row.text("support") == "clamped";
        let support = if is_clamped { Support::ClampedFreeTop } else { Support::SimpleFreeTop };
        let panel = panel(row.number("a_over_b"), 1.0, support, POISSON);
        let (bending, at) = bend(&panel, 1.0, 0.0);
        let (middle, free_edge) = (at(0.5, 0.5), at(0.5, 1.0));
        let deflection = free_edge.deflection_n_m2;
        row.compare_within(&mut findings, "deflection", deflection, (1e-3 * deflection).max(0.6e-7));
        let share = if is_clamped { 5e-3 } else { 1e-3 };
        row.compare_within(&mut findings, "mx_free_edge", free_edge.across_n, share * free_edge.across_n);
        row.compare(&mut findings, "mx_middle", middle.across_n);
        row.compare(&mut findings, "my_middle", middle.along_n);
        row.compare(&mut findings, "moment_bottom", bending.bottom.expect("a held bottom").moment_n);
        row.compare(&mut findings, "moment_side", at(0.0, 0.5).across_n);
        assert!(bending.top.is_none(), "{}: a free edge hands nothing on", row.id());
    }
    findings.report(52);
}

#[test]
fn handbook_coefficients() {
    let mut findings = Findings::default();
    // Rows for the same panel stand together.
    let mut solved: Option<SolvedPanel> = None;
    for row in &table("panel_printed.csv").rows {
        let support = match row.text("support") {
            "simple" => Support::Simple,
            "clamped" => Support::Clamped,
            "simple_free_top" => Support::SimpleFreeTop,
            "simple_sides" => Support::SimpleSides,
            other => panic!("{}: support {other}", row.id()),
        };
        let bottom_pa = if row.text("load") == "rising" { 0.0 } else { 1.0 };
        let geometry = PanelGeometry { width_m: 1.0, height_m: row.number("b_over_a"), support, poisson: POISSON };
        let kept = solved.take().filter(|panel| panel.geometry() == geometry);
        let panel = solved.insert(kept.unwrap_or_else(|| SolvedPanel::new(geometry).unwrap()));
        let (bending, at) = bend(panel, bottom_pa, 1.0);
        let middle = at(0.5, 0.5);
        let got = match row.text("quantity") {
            "stress" => 6.0 * bending.summits.principal.value.abs(),
            "stress_centre" => 6.0 * middle.across_n,
            "deflection" => middle.deflection_n_m2,
            "deflection_by_e_t3" => 12.0 * (1.0 - POISSON * POISSON) * middle.deflection_n_m2,
            "deflection_free_edge" => at(0.5, 1.0).deflection_n_m2,
            "moment_free_edge" => at(0.5, 1.0).across_n,
            "moment_short_span" => middle.across_n,
            "moment_long_span" => middle.along_n,
            "moment_long_edge" => bending.sides.moment_n,
            "moment_short_edge" | "moment_bottom" => bending.bottom.expect("a held bottom").moment_n,
            "moment_top" => bending.top.expect("a held top").moment_n,
            "moment_sides" => at(0.0, 0.5).across_n,
            "reaction" => bending.sides.peak_n_per_m,
            other => panic!("{}: quantity {other}", row.id()),
        };
        row.compare(&mut findings, "value", got);
    }
    findings.report(110);
}

/// Levy's series for a simply supported panel of width 1 and height h under a uniform pressure of 1: deflection and
/// moments across and along at the centre, reaction at the middle of the bottom edge, corner force.
///
/// Source: Timoshenko & Woinowsky-Krieger, article 30 (from memory, re-derived): each sine across times
/// 1 + A cosh + B y sinh along, with A and B from w = w_yy = 0 at the edges y = -h/2 and h/2.
fn levy(h: f64, poisson: f64) -> [f64; 5] {
    let mut sums = [0.0; 5];
    for m in (1..=4001).step_by(2) {
        let k = f64::from(m) * PI;
        let sign = if m % 4 == 1 { 1.0 } else { -1.0 };
        let (c, alpha) = (4.0 / k.powi(5), 0.5 * k * h);
        // Divided by cosh(alpha), so that nothing overflows.
        let (tanh, at_centre) = (alpha.tanh(), 1.0 / alpha.cosh());
        let (a, b) = (-0.5 * (alpha * tanh + 2.0), 0.5);
        let w = c * (1.0 + a * at_centre);
        let w_yy = c * k * k * (a + 2.0 * b) * at_centre;
        // At the edge: derivatives of A cosh(ky) + B ky sinh(ky), over cosh(alpha).
        let w_y = c * k * (a * tanh + b * (tanh + alpha));
        let w_yyy = c * k.powi(3) * (a * tanh + b * (3.0 * tanh + alpha));
        sums[0] += sign * w;
        sums[1] += sign * (k * k * w - poisson * w_yy);
        sums[2] += sign * (poisson * k * k * w - w_yy);
        sums[3] += sign * (w_yyy - (2.0 - poisson) * k * k * w_y);
        sums[4] += 2.0 * (1.0 - poisson) * k * w_y;
    }
    sums
}

#[test]
fn levys_series_at_other_ratios_of_poisson() {
    for (height, poisson) in [(1.0, 0.3), (1.3, 0.0), (0.45, 0.33), (2.7, 0.42), (4.0, 0.3)] {
        let panel = panel(1.0, height, Support::Simple, poisson);
        let (bending, at) = bend(&panel, 1.0, 1.0);
        let middle = at(0.5, 0.5);
        let got = [
            middle.deflection_n_m2,
            middle.across_n,
            middle.along_n,
            bending.bottom.expect("a held bottom").peak_n_per_m,
            bending.bottom_corner_n,
        ];
        let expected = levy(height, poisson);
        // The reaction is a third derivative at the edge, and converges as such.
        for (i, tolerance) in [1e-7, 1e-6, 1e-6, 1e-3, 1e-4].into_iter().enumerate() {
            let (got, expected) = (got[i], expected[i]);
            let near = (got - expected).abs() <= tolerance * expected.abs();
            assert!(near, "h {height}, nu {poisson}, value {i}: {got}, expected {expected} within {tolerance}");
        }
    }
}

/// Navier's series for a simply supported panel of width 1 and height h: deflection at a point, for a pressure along
/// the height whose sine coefficients are `q(n)`. Source: Timoshenko & Woinowsky-Krieger, article 28 (from memory).
fn navier(h: f64, x: f64, y: f64, q: impl Fn(f64) -> f64) -> f64 {
    let mut sum = 0.0;
    for n in 1..400 {
        let ky = f64::from(n) * PI / h;
        let load = q(ky) * (ky * y).sin();
        for m in (1..200).step_by(2) {
            let kx = f64::from(m) * PI;
            sum += 4.0 / kx * load * (kx * x).sin() / (kx * kx + ky * ky).powi(2);
        }
    }
    sum
}

#[test]
fn naviers_series_for_a_panel_that_is_wet_halfway_up() {
    // Pressure 1 at the bottom, falling to nothing at d: (2 / h) times the integral of (1 - y/d) sin(k y) up to d.
    let (h, d) = (1.6, 0.7);
    let wet = Profile::new(vec![(0.0, 1.0), (d, 0.0)]).unwrap();
    let panel = panel(1.0, h, Support::Simple, 0.3);
    let bent = panel.bend(&wet).unwrap();
    // The bend in the pressure is what polynomials follow least well.
    for (x, y) in [(0.5, 0.4), (0.5, 0.8), (0.2, 1.2), (0.1, 0.1)] {
        let expected = navier(h, x, y, |k| 2.0 / h * (1.0 / k - (k * d).sin() / (k * k * d)));
        let got = bent.at(x, y).deflection_n_m2;
        assert!((got - expected).abs() < 1e-5 * expected, "at {x}, {y}: {got}, expected {expected}");
    }
    assert_eq!(bent.bending().load_n, 0.5 * d);
}
