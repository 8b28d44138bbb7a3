//! What holds for every panel: equilibrium, superposition, similarity, limits; and its strength.

use brimwright::material::{Material, named};
use brimwright::plates::{
    Bending, OutOfRange, PanelGeometry, PlateError, Profile, SolvedPanel, Strength, Strip, StripEnds, Support,
    strength,
};
use proptest::prelude::*;

const SUPPORTS: [Support; 4] = [Support::Simple, Support::Clamped, Support::SimpleFreeTop, Support::ClampedFreeTop];

fn panel(width_m: f64, height_m: f64, support: Support) -> SolvedPanel {
    solved(width_m, height_m, support, 0.3)
}

fn solved(width_m: f64, height_m: f64, support: Support, poisson: f64) -> SolvedPanel {
    SolvedPanel::new(PanelGeometry { width_m, height_m, support, poisson }).unwrap_or_else(|e| panic!("{e}"))
}

fn linear(height_m: f64, bottom_pa: f64, top_pa: f64) -> Profile {
    Profile::linear(height_m, bottom_pa, top_pa).unwrap()
}

fn assert_near(what: &str, got: f64, expected: f64, allowed: f64) {
    assert!((got - expected).abs() <= allowed, "{what}: {got}, expected {expected} within {allowed}");
}

#[test]
fn edges_and_corners_carry_all_of_the_load() {
    for support in SUPPORTS {
        for (width, height) in [(1.0, 1.0), (0.4, 1.0), (1.0, 0.3), (5.0, 1.0), (1.0, 8.0)] {
            let panel = panel(width, height, support);
            for (bottom, top) in [(2.0, 2.0), (3.0, 0.0), (0.0, 3.0)] {
                let bending = panel.bend(&linear(height, bottom, top)).unwrap().bending();
                let Bending { load_n, sides, bottom: below, top: above, .. } = &bending;
                let [below, above] = [below, above].map(|edge| edge.map_or(0.0, |edge| edge.mean_n_per_m));
                let edges = 2.0 * sides.mean_n_per_m * height + (below + above) * width;
                let carried = edges + 2.0 * (bending.bottom_corner_n + bending.top_corner_n);
                let what = format!("{support:?} {width} by {height}, {bottom} to {top}");
                assert_near(&what, *load_n, 0.5 * (bottom + top) * width * height, 1e-12 * load_n);
                // Reactions are third derivatives at the edge, good to about one in a hundred. (The sides of a
                // clamped panel with a free edge are had from equilibrium.)
                assert_near(&what, carried, *load_n, 0.01 * load_n);
            }
        }
    }
}

#[test]
fn pressures_superpose() {
    for support in SUPPORTS {
        let panel = panel(1.3, 0.9, support);
        let patch = Profile::new(vec![(0.2, 1.0), (0.5, -2.0), (0.5, 4.0), (0.7, 0.0)]).unwrap();
        let ramp = linear(0.9, -1.0, 2.5);
        let both = Profile::new(vec![
            (0.0, -1.0),
            (0.2, -1.0 + 3.5 * 0.2 / 0.9),
            (0.2, 3.5 * 0.2 / 0.9),
            (0.5, -3.0 + 3.5 * 0.5 / 0.9),
            (0.5, 3.0 + 3.5 * 0.5 / 0.9),
            (0.7, -1.0 + 3.5 * 0.7 / 0.9),
            (0.9, 2.5),
        ])
        .unwrap();
        let [patch, ramp, both] = [patch, ramp, both].map(|profile| panel.bend(&profile).unwrap().at(0.4, 0.6));
        for (what, parts, whole) in [
            ("deflection", patch.deflection_n_m2 + ramp.deflection_n_m2, both.deflection_n_m2),
            ("across", patch.across_n + ramp.across_n, both.across_n),
            ("along", patch.along_n + ramp.along_n, both.along_n),
            ("twist", patch.twist_n + ramp.twist_n, both.twist_n),
        ] {
            assert_near(&format!("{support:?}, {what}"), parts, whole, 1e-11);
        }
    }
}

#[test]
fn a_ramp_bends_the_middle_half_as_much_as_its_peak_everywhere() {
    // Superposition with its mirror image: Timoshenko & Woinowsky-Krieger, article 29.
    for support in [Support::Simple, Support::Clamped] {
        let panel = panel(0.8, 1.7, support);
        let [ramp, mirrored, whole] =
            [(0.0, 1.0), (1.0, 0.0), (1.0, 1.0)].map(|(q, p)| panel.bend(&linear(1.7, q, p)).unwrap());
        let (half, full) = (ramp.at(0.4, 0.85), whole.at(0.4, 0.85));
        assert_near("deflection", half.deflection_n_m2, 0.5 * full.deflection_n_m2, 1e-14);
        assert_near("across", half.across_n, 0.5 * full.across_n, 1e-14);
        let (low, high) = (ramp.bending(), mirrored.bending());
        assert_near("mirrored moment", low.along.low.value, high.along.low.value, 1e-13);
        assert_near("mirrored place", low.summits.deflection_n_m2.y_m, 1.7 - high.summits.deflection_n_m2.y_m, 1e-9);
        assert_near("mirrored edge", low.bottom.unwrap().peak_n_per_m, high.top.unwrap().peak_n_per_m, 1e-11);
    }
}

#[test]
fn panels_of_one_shape_are_alike() {
    for support in SUPPORTS {
        let [small, large] =
            [1.0, 2.0].map(|k| panel(0.7 * k, 1.1 * k, support).bend(&linear(1.1 * k, 3.0, 1.0)).unwrap().bending());
        let near = |what, got: f64, expected: f64| assert_near(what, got, expected, 1e-11 * expected.abs());
        near("deflection", large.summits.deflection_n_m2.value, 16.0 * small.summits.deflection_n_m2.value);
        near("moment", large.summits.governing().value, 4.0 * small.summits.governing().value);
        near("edge moment", large.sides.moment_n, 4.0 * small.sides.moment_n);
        near("reaction", large.sides.peak_n_per_m, 2.0 * small.sides.peak_n_per_m);
        near("corner", large.bottom_corner_n, 4.0 * small.bottom_corner_n);
        near("place", large.summits.governing().y_m, 2.0 * small.summits.governing().y_m);
    }
}

#[test]
fn a_clamped_panels_deflection_does_not_know_poissons_ratio() {
    // Times the rigidity: the energy's Gaussian curvature integrates to nothing where the edge cannot turn.
    let deflection =
        |poisson| solved(1.0, 1.4, Support::Clamped, poisson).bend(&linear(1.4, 1.0, 2.0)).unwrap().at(0.5, 0.6);
    let [none, some] = [0.0, 0.45].map(|poisson| deflection(poisson).deflection_n_m2);
    assert_near("deflection", some, none, 1e-12 * none);
}

#[test]
fn a_wide_panel_is_a_strip() {
    // In its middle, and beyond the ratio that is solved for as well.
    for width in [19.0, 60.0] {
        for (support, ends) in [
            (Support::Clamped, StripEnds::Clamped),
            (Support::Simple, StripEnds::Hinged),
            (Support::ClampedFreeTop, StripEnds::HeldAtStart),
        ] {
            let load = linear(1.0, 5.0, 1.0);
            let (panel, strip) = (panel(width, 1.0, support), Strip::load(1.0, ends, &load).unwrap());
            let bent = panel.bend(&load).unwrap();
            let at_bottom = bent.at(0.5 * width, 0.0).along_n;
            assert_near(&format!("{support:?}, {width} m, bottom"), at_bottom, strip.start.moment_n, 3e-4);
            if let (high @ 0.01.., at_m) = strip.high {
                let in_field = bent.at(0.5 * width, at_m).along_n;
                assert_near(&format!("{support:?}, {width} m, field"), in_field, high, 3e-4);
            }
            let force = bent.bending().bottom.unwrap().peak_n_per_m;
            assert_near(&format!("{support:?}, {width} m, force"), force, strip.start.force_n_per_m, 0.1);
        }
    }
}

#[test]
fn a_panel_held_at_its_sides_alone_is_a_beam() {
    // Statics: across the middle of the width, the moments of all heights together are q b a^2 / 8 for simple
    // sides; clamped sides take two thirds of it. A low panel's moment is alike at all heights.
    for (support, share) in [(Support::SimpleSides, 1.0), (Support::ClampedSides, 1.0 / 3.0)] {
        let bent = panel(12.0, 1.0, support);
        let middle = bent.bend(&linear(1.0, 2.0, 2.0)).unwrap().at(6.0, 0.5);
        let expected = share * 2.0 * 144.0 / 8.0;
        assert_near(&format!("{support:?}"), middle.across_n, expected, 0.02 * expected);
    }
    // The same with the pressure all in one half: it twists as well.
    let step = Profile::new(vec![(0.0, 4.0), (0.5, 4.0)]).unwrap();
    let bending = panel(3.0, 1.0, Support::SimpleSides).bend(&step).unwrap().bending();
    assert!(bending.bottom.is_none() && bending.top.is_none());
    assert_near(
        "force of a side",
        bending.sides.mean_n_per_m + bending.bottom_corner_n + bending.top_corner_n,
        3.0,
        0.01,
    );
}

#[test]
fn stiffeners_set_the_width() {
    let width = |spacing| PanelGeometry::of_plate(2.4, spacing, 1.0, Support::Clamped, 0.3).width_m;
    assert_eq!([width(None), width(Some(0.5)), width(Some(3.0))], [2.4, 0.5, 2.4]);
}

#[test]
fn nothing_on_a_grid_is_larger_than_the_largest() {
    for support in SUPPORTS {
        for (width, height) in [(0.5, 1.0), (2.0, 0.8)] {
            let panel = panel(width, height, support);
            let bent = panel.bend(&linear(height, 2.0, 0.5)).unwrap();
            let bending = bent.bending();
            let mut most = [0.0_f64; 5];
            for i in 0..=20 {
                for j in 0..=40 {
                    let state = bent.at(width * f64::from(i) / 40.0, height * f64::from(j) / 40.0);
                    let values = [
                        state.deflection_n_m2.abs(),
                        state.across_n,
                        -state.along_n,
                        state.principal_n().abs(),
                        state.von_mises_n(),
                    ];
                    most = [0, 1, 2, 3, 4].map(|k| most[k].max(values[k]));
                }
            }
            let found = [
                bending.summits.deflection_n_m2.value.abs(),
                bending.across.high.value,
                -bending.along.low.value,
                bending.summits.principal.value.abs(),
                bending.summits.von_mises.value,
            ];
            for (k, (found, sampled)) in found.into_iter().zip(most).enumerate() {
                let what = format!("{support:?} {width} by {height}, value {k}");
                // Sampled coarsely, peaks are missed by little, but for those that are next to nothing.
                let scale = sampled.max(most[3]);
                assert!(found >= sampled - 5e-4 * scale, "{what}: {found} misses {sampled}");
                assert_near(&what, found, sampled, 0.02 * scale);
            }
        }
    }
}

#[test]
fn twist_governs_only_where_corners_are_held_down() {
    let governing = |width, support| {
        let bending = panel(width, 1.0, support).bend(&linear(1.0, 1.0, 1.0)).unwrap().bending();
        (bending.summits.governing(), bending)
    };
    // The square: corner force 0.065 q a^2 (Timoshenko & Woinowsky-Krieger, table 8, from memory), so the corner's
    // twist is half of it and von Mises's moment sqrt(3) times that; the middle has 0.0479 (table 8).
    let (most, square) = governing(1.0, Support::Simple);
    assert_near("corner force", square.bottom_corner_n, -0.065, 5e-4);
    assert_near("corner moment", most.value, 3.0_f64.sqrt() * 0.0325, 3e-4);
    assert!(most.x_m == 0.0 && [0.0, 1.0].contains(&most.y_m), "{most:?} is not in a corner");
    assert_near("principal", square.summits.principal.value, 0.0479, 1e-4);
    let (most, long) = governing(2.0, Support::Simple);
    assert_eq!(most, long.summits.principal);
    let (most, clamped) = governing(1.0, Support::Clamped);
    assert_eq!(most.value, -clamped.summits.principal.value);
    assert_eq!((clamped.bottom_corner_n, clamped.top_corner_n), (0.0, 0.0));
}

fn steel() -> &'static Material {
    named("structural steel S235").expect("a row of the table")
}

fn strong(panel: &SolvedPanel, pressure_pa: f64, thickness_m: f64, allowance_m: f64) -> Result<Strength, PlateError> {
    let pressure = linear(panel.geometry().height_m, pressure_pa, pressure_pa);
    strength(panel, &pressure, steel(), thickness_m, allowance_m)
}

#[test]
fn strength_by_the_handbook() {
    // Roark, 7th ed., table 11.4 case 1a, b/a = 2 (seen): stress 0.6102 q b^2 / t^2, deflection 0.1110 q b^4 / (E
    // t^3), for a side b of 0.5 m, 20 kPa, 5 mm of S235: 122.0 MPa, 5.29 mm. Required: b sqrt(0.6102 q / 156.67 MPa)
    // = 4.413 mm.
    let panel = panel(0.5, 1.0, Support::Simple);
    let s = strong(&panel, 20e3, 0.005, 0.0).unwrap();
    assert_near("stress", s.stress_pa, 122.04e6, 0.03e6);
    assert_near("principal stress", s.principal_stress_pa, 122.04e6, 0.03e6);
    assert_near("allowable", s.allowable_pa, 235e6 / 1.5, 1.0);
    assert_near("utilisation", s.utilisation, 122.04 / 156.667, 2e-4);
    assert_near("deflection", s.deflection_m, 5.29e-3, 0.03e-3);
    assert_near("required", s.required_thickness_m, 4.413e-3, 0.001e-3);
    // More than half of its thickness: not small.
    let [OutOfRange::LargeDeflection { deflection_m, most_m }] = s.out_of_range[..] else {
        panic!("{:?}", s.out_of_range)
    };
    assert_eq!((deflection_m, most_m), (s.deflection_m, 0.0025));
}

#[test]
fn the_allowance_never_counts() {
    let panel = panel(0.5, 0.8, Support::Clamped);
    let bare = strong(&panel, 15e3, 0.006, 0.0).unwrap();
    let coated = strong(&panel, 15e3, 0.008, 0.002).unwrap();
    assert_near("net", coated.net_thickness_m, 0.006, 1e-18);
    assert_near("stress", coated.stress_pa, bare.stress_pa, 1e-6);
    assert_near("deflection", coated.deflection_m, bare.deflection_m, 1e-15);
    assert_near("required", coated.required_thickness_m, bare.required_thickness_m + 0.002, 1e-15);
    for (thickness, allowance) in [(0.002, 0.002), (0.002, 0.003), (0.0, 0.0)] {
        let error = strong(&panel, 15e3, thickness, allowance).expect_err("nothing left");
        assert!(matches!(error, PlateError::NothingLeft { .. }), "{error}");
        assert!(error.to_string().contains("nothing is left of the plate"), "{error}");
    }
}

#[test]
fn at_the_required_thickness_stress_is_the_allowable_one() {
    for support in SUPPORTS {
        let panel = panel(0.45, 0.9, support);
        let s = strong(&panel, 30e3, 0.01, 0.001).unwrap();
        let again = strong(&panel, 30e3, s.required_thickness_m, 0.001).unwrap();
        assert_near(&format!("{support:?}, utilisation"), again.utilisation, 1.0, 1e-12);
        let at_limit = strong(&panel, 30e3, s.in_range_from_m, 0.001).unwrap();
        let share = at_limit.deflection_m / at_limit.net_thickness_m;
        assert_near(&format!("{support:?}, deflection over thickness"), share, 0.5, 1e-12);
    }
}

#[test]
fn a_thick_panel_is_out_of_range() {
    let s = strong(&panel(0.1, 0.3, Support::Clamped), 1e3, 0.012, 0.001).unwrap();
    let [OutOfRange::ThickPlate { net_thickness_m, most_m }] = s.out_of_range[..] else {
        panic!("{:?}", s.out_of_range)
    };
    assert_near("net", net_thickness_m, 0.011, 1e-15);
    assert_near("most", most_m, 0.01, 1e-15);
    // The corroded plate is the one that is judged.
    assert_eq!(strong(&panel(0.1, 0.3, Support::Clamped), 1e3, 0.011, 0.0015).unwrap().out_of_range, []);
}

#[test]
fn senseless_strength_inputs_are_refused_in_words() {
    let panel = panel(1.0, 1.0, Support::Clamped);
    let load = linear(1.0, 1.0, 1.0);
    let with = |change: fn(&mut Material)| {
        let mut material = steel().clone();
        change(&mut material);
        strength(&panel, &load, &material, 0.005, 0.0).expect_err("a senseless material").to_string()
    };
    for (error, word) in [
        (with(|m| m.yield_pa = 0.0), "yield stress"),
        (with(|m| m.modulus_pa = f64::NAN), "modulus"),
        (with(|m| m.factor = -1.5), "factor"),
        (with(|m| m.poisson = 0.33), "solve it for the material's"),
        (strong(&panel, 1.0, -0.005, 0.0).expect_err("thickness").to_string(), "thickness"),
        (strong(&panel, 1.0, 0.005, f64::INFINITY).expect_err("allowance").to_string(), "allowance"),
        (strong(&panel, 1e300, 1e-9, 0.0).expect_err("too large").to_string(), "too large"),
        (strong(&panel, f64::MAX, 0.005, 0.0).expect_err("too large").to_string(), "too large"),
    ] {
        assert!(error.contains(word), "`{error}` has no `{word}`");
    }
    for size in [1e-150, 1e150] {
        let bent = SolvedPanel::new(PanelGeometry { width_m: size, height_m: size, ..panel.geometry() }).unwrap();
        assert_eq!(bent.bend(&load).err(), Some(PlateError::OutOfNumbers), "{size} m");
    }
}

proptest! {
    #![proptest_config(ProptestConfig::with_cases(24))]

    #[test]
    fn any_panel_gives_numbers_or_says_why_not(
        width in 0.01..50.0_f64,
        height in 0.01..50.0_f64,
        support in prop::sample::select(SUPPORTS.to_vec()),
        poisson in 0.0..0.5_f64,
        points in prop::collection::vec((0.0..60.0_f64, -1e6..1e6_f64), 2..6),
    ) {
        let mut points = points;
        points.sort_by(|a, b| a.0.total_cmp(&b.0));
        let pressure = Profile::new(points).unwrap();
        let material = Material { poisson, ..steel().clone() };
        match SolvedPanel::new(PanelGeometry { width_m: width, height_m: height, support, poisson }) {
            Err(e) => prop_assert!(height / width > 20.0 || width / height > 20.0, "{e}"),
            Ok(panel) => {
                let s = strength(&panel, &pressure, &material, 0.01, 0.001).unwrap();
                prop_assert!(s.utilisation >= 0.0 && s.deflection_m >= 0.0, "{s:?}");
                prop_assert!(s.stress_pa >= s.principal_stress_pa, "{s:?}");
                let b = &panel.bend(&pressure).unwrap().bending();
                let edges = [b.sides, b.bottom.unwrap_or(b.sides), b.top.unwrap_or(b.sides)];
                prop_assert!(edges.iter().all(|e| e.peak_n_per_m.is_finite() && e.mean_n_per_m.is_finite()), "{b:?}");
                let places = [b.summits.deflection_n_m2, b.summits.principal, b.summits.von_mises, b.across.high, b.along.low];
                let inside = |p: &brimwright::plates::Peak| {
                    (0.0..=0.500_001 * width).contains(&p.x_m) && (0.0..=height * 1.000_001).contains(&p.y_m)
                };
                prop_assert!(places.iter().all(inside), "{b:?}");
            }
        }
    }
}
