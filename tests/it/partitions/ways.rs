//! More of the same theorems: ways back, scales, and what a plate changes.

use super::*;

#[test]
fn the_mirror_image_does_the_same_in_the_mirror() {
    proptest!(config(6, 108), |(section in sections(), pull in pull(), share in share())| {
        let (one, image) = (Tank::new(section.clone(), share), Tank::new(moved(&section, -1.0, 1.0), share));
        let (a, b) = (states(&one, pull)?, states(&image, Vec2::new(-pull.x, pull.y))?);
        for (a, b) in a.iter().zip(&b) {
            same(&a.settled, &b.settled, -1.0, 1.0, one.capacity_m3(), 1e-9)?;
        }
    });
}

#[test]
fn a_larger_tank_does_the_same_at_its_size() {
    proptest!(config(6, 109), |(section in sections(), pull in pull(), share in share(), log in -3.0..3.0)| {
        let scale = 10.0_f64.powf(log);
        let (one, image) = (Tank::new(section.clone(), share), Tank::new(moved(&section, 1.0, scale), share));
        let (a, b) = (states(&one, pull)?, states(&image, pull)?);
        for (a, b) in a.iter().zip(&b) {
            same(&a.settled, &b.settled, 1.0, scale, one.capacity_m3(), 1e-9)?;
        }
    });
}

#[test]
fn tight_compartments_keep_what_they_hold_whatever_the_acceleration() {
    proptest!(config(6, 110), |(section in sections(), pull in pull(), share in share(), s in 0.2..0.8)| {
        // All shut, and cut once more from side to side.
        let mut section = without_openings(&section);
        section.outline.iter_mut().for_each(|e| e.kind = EdgeKind::Wall);
        let outline = Path::new(section.edges());
        let (left, right) = outline.extent(Vec2::x());
        let x = left + s * (right - left);
        let mut hits: Vec<Point> =
            section.edges().iter().flat_map(|e| e.crossings(Vec2::x(), x).into_iter().map(|t| e.point_at(t))).collect();
        hits.sort_by(|a, b| a.y.total_cmp(&b.y));
        section.obstacles.clear();
        section.plates.retain(|p| p.points.iter().all(|q| q.x < x) || p.points.iter().all(|q| q.x > x));
        section.plates.push(plate(&hits[..2]));
        let tank = Tank::new(section, share);
        prop_assert!(tank.region.open().n_parts() >= 2);
        let held = |state: &State| {
            let mut held = vec![0.0; tank.region.open().n_parts()];
            state.settled.pools.iter().for_each(|p| held[p.compartment] += p.volume_m3);
            held
        };
        let state = |pull: Vec2| tank.state(Bound::Settled, pull * GRAVITY).map(|s| held(&s));
        let (Some(before), Some(after)) = (state(-Vec2::y()), state(pull)) else {
            return Err(TestCaseError::fail("the way was lost"));
        };
        for (before, after) in before.iter().zip(&after) {
            near(*after, *before, 1e-8 * tank.liquid_m3() + 1e-12 * tank.capacity_m3(), "a compartment")?;
        }
    });
}

#[test]
fn back_at_rest_all_is_as_it_was_where_nothing_parted_or_left() {
    let n_back = std::cell::Cell::new(0);
    proptest!(config(10, 111), |(section in sections(), pull in pull(), share in share())| {
        let tank = Tank::new(section, share);
        for bound in BOUNDS {
            let at = |pull: Vec2| tank.state(bound, pull * GRAVITY);
            let (Some(rest), Some(case)) = (at(-Vec2::y()), at(pull)) else {
                return Err(TestCaseError::fail("the way was lost"));
            };
            let Some(back) = tank.released(bound, &case) else { return Err(TestCaseError::fail("lost on the way back")) };
            let capacity = tank.capacity_m3();
            let sum = back.settled.volume_m3 + back.settled.spilled_m3;
            near(sum, tank.liquid_m3(), 1e-10 * capacity, "stays and spilled, back at rest")?;
            let is_one_body = !case.stop.had_several && case.stop.spilled.is_empty() && case.stop.pours.is_empty();
            if is_one_body {
                n_back.set(n_back.get() + 1);
                for (before, after) in rest.settled.cells_m3.iter().zip(&back.settled.cells_m3) {
                    near(*after, *before, 1e-10 * capacity, "a cell, back at rest")?;
                }
            }
        }
    });
    assert!(n_back.get() >= 4, "only {n_back:?} came back as they were");
}

/// Every arc cut into as many chords.
fn with_chords(plated: &Plated, n: usize) -> Plated {
    let chords = |edges: &[Edge]| -> Vec<Edge> {
        let cut = |e: &Edge| {
            let (e, n) = (*e, if e.is_arc() { n } else { 1 });
            (0..n).map(move |k| Edge::line(e.point_at(k as f64 / n as f64), e.point_at((k + 1) as f64 / n as f64)))
        };
        edges.iter().flat_map(cut).collect()
    };
    let mut mouths = vec![];
    let mut outline = vec![];
    for (i, e) in plated.outline.iter().enumerate() {
        let part = chords(&[*e]);
        if plated.mouths.contains(&i) {
            mouths.extend(outline.len()..outline.len() + part.len());
        }
        outline.extend(part);
    }
    let obstacles = plated.obstacles.iter().map(|o| chords(o)).collect();
    Plated { outline, mouths, obstacles, plates: plated.plates.clone() }
}

#[test]
fn arcs_are_what_fine_polygons_tend_to() {
    let bent = plated().prop_filter("arcs", |p| p.outline.iter().any(Edge::is_arc));
    proptest!(config(3, 112), |(plated in bent, pull in pull(), share in 0.1..0.9)| {
        // The area between arc and chords falls with the square of their number: at most r2 theta3 / 12 n2 an arc.
        let n = 60;
        let off: f64 = plated
            .outline
            .iter()
            .chain(plated.obstacles.iter().flatten())
            .filter(|e| e.is_arc())
            .map(|e| e.radius().powi(2) * e.sweep.abs().powi(3) / (12.0 * (n * n) as f64))
            .sum();
        let [exact, fine] = [Tank::new(plated.section(), share), Tank::new(with_chords(&plated, n).section(), share)];
        let gravity = pull * GRAVITY;
        let (Some(a), Some(b)) = (exact.state(Bound::Settled, gravity), fine.state(Bound::Settled, gravity)) else {
            return Err(TestCaseError::fail("the way was lost"));
        };
        near(fine.capacity_m3(), exact.capacity_m3(), off, "capacity")?;
        near(b.settled.volume_m3, a.settled.volume_m3, 2.0 * off, "volume")?;
        near(b.settled.spilled_m3, a.settled.spilled_m3, 2.0 * off, "spilled")?;
        let volumes = |s: &State| -> Vec<f64> {
            s.settled.pools.iter().map(|p| p.volume_m3).filter(|v| *v > 4.0 * off).collect()
        };
        let (one, other) = (volumes(&a), volumes(&b));
        let is_near = one.len() == other.len() && one.iter().zip(&other).all(|(a, b)| (a - b).abs() <= 4.0 * off);
        prop_assert!(is_near, "pools {one:?}, with chords {other:?}, allowed {off:e}");
    });
}

/// The same, where the answer is in closed form: a round tank with a plate along a diameter.
#[test]
fn half_a_round_tank_holds_half_of_it_however_it_is_pulled() {
    let tank = Plated::tank(circle(1.0)).with_plate(&[(0.0, 0.0), (0.0, 2.0)]).section();
    for share in [0.1, 0.5, 0.9] {
        for pull in [(0.3, -1.0), (-1.0, -1.0), (2.0, -0.4), (-4.0, 0.5)] {
            let state = Tank::new(tank.clone(), share).state(Bound::Settled, Vec2::new(pull.0, pull.1) * GRAVITY);
            let volumes: Vec<f64> = state.expect("a way").settled.pools.iter().map(|p| p.volume_m3).collect();
            let half = 0.5 * share * std::f64::consts::PI;
            let is_near = volumes.len() == 2 && volumes.iter().all(|v| (v - half).abs() < 1e-12);
            assert!(is_near, "{pull:?}, share {share}: {volumes:?}, expected {half} twice");
        }
    }
}

/// The facade gives the kernel's states.
#[test]
fn a_judgement_shows_both_bounds_and_the_way_back() {
    let mut section = Plated::tank(rectangle(4.0, 2.0)).with_plate(&[(2.0, 0.0), (2.0, 2.0)]).section();
    section.plates[0].openings = vec![open(0.0, 0.1, 2.0)];
    let case = LoadCase { release: true, ..held(3.0, 0.0) };
    let results = judge(&brimwright::study::Study { cases: vec![case], ..study(section.clone(), Fill::Level(1.0)) });
    let case = &results.cases[0];
    // Settled, the surface is a line through the middle; sealed, each half tilts about its own.
    let slope = 3.0 / GRAVITY;
    let pools = |s: &Settled| -> Vec<f64> { s.pools.iter().map(|p| p.volume_m3).collect() };
    assert_eq!(pools(settled(case)), [4.0]);
    let left_m3 = settled(case).cells_m3.iter().fold(0.0, |a: f64, b| a.max(*b));
    assert!((left_m3 - (2.0 + 2.0 * slope)).abs() < 1e-12, "{left_m3}");
    let sealed = case.sealed.as_ref().expect("a sealed bound").as_ref().expect("a state");
    assert!(pools(sealed).iter().all(|v| (v - 2.0).abs() < 1e-12) && sealed.pools.len() == 2, "{:?}", pools(sealed));
    assert_eq!((case.routes[0], case.trapped.len()), ((Bound::Settled, Route::One), 0));
    let back = case.released.as_ref().expect("a release").as_ref().expect("a state");
    assert!(back.cells_m3.iter().all(|v| (v - 2.0).abs() < 1e-12), "{:?}", back.cells_m3);
    // Across the plate, settled: none. Sealed: 2 m times 2 m of water, tilted alike, stand higher by the slope's 2 m.
    assert_eq!(settled(case).plates[0].net_n, 0.0);
    let net = sealed.plates[0].net_n.abs();
    let (right, left) = (1.0 + slope, 1.0 - slope);
    let want = 0.5 * WATER * GRAVITY * (right * right - left * left);
    assert!((net - want).abs() < 1e-8 * want, "{net}, expected {want}");
}
