//! Plate strength: the largest surface stress in any panel of a plate under its settled net load, against yield over the
//! material's factor, at the thickness that corrosion leaves.
//!
//! Panels lie between stiffeners or side walls; bends and attached ends hold them, free ends and rims do not. An opening
//! of up to half of a panel's width weakens it: moments pass what it leaves. A larger one cuts the plate. The load is the
//! net pressure as it is along the plate, alike all across. Not judged outside thin plates and small deflections; absent
//! without a material. Stress beside holes, stiffeners and welds are not judged: their loads are listed.
//! Source: [PlateBending], [PanelRitz].

use crate::material::Material;
use crate::plates::{OutOfRange, PanelStrength};
use crate::problem::Place;
use crate::section::Plate;
use crate::sources::Source;
use crate::units::{Measure, Phrase, Quantity, fixed, number};

use super::{Absent, Context, Criterion, Outcome, RestsOn, Sense, State, Trust, Verdict, View, WorkLine};

pub(super) const CRITERION: Criterion = Criterion { name: NAME, rests_on: RestsOn::Size, judge };

const NAME: &str = "Plate strength";

fn judge(context: &Context) -> Outcome {
    let study = context.study.study();
    let mut outcome = Outcome::default();
    for (plate_idx, plate) in study.section.plates.iter().enumerate() {
        let absent = |reason: &str| Absent {
            criterion: NAME,
            place_words: plate.label(plate_idx),
            reason: Phrase::new(reason.to_owned(), []),
        };
        match study.material(&plate.material) {
            Some(material) => {
                let verdict = |view: &View| verdict(context, view, plate_idx, plate, material);
                outcome.verdicts.push(context.worse(verdict));
            }
            None if plate.material.is_empty() => outcome.absent.push(absent("it has no material")),
            None => outcome.absent.push(absent("its material is neither in the scenario nor in the table")),
        }
    }
    outcome
}

fn verdict(context: &Context, view: &View, plate_idx: usize, plate: &Plate, material: &Material) -> Verdict {
    let place = |verdict: Verdict| Verdict {
        place: Place::Plate { plate_idx, opening_idx: None },
        place_words: plate.label(plate_idx),
        source: Source::PlateBending,
        trust: trust(context),
        ..verdict
    };
    let not_judged = |reason: String| place(context.not_judged(NAME, Sense::AtMost, reason));
    if let Err(reason) = view.judged() {
        return not_judged(reason.to_owned());
    }
    let borne = view.plates.get(plate_idx);
    let (panel, load_used) = match borne.and_then(|p| Some((p.panel.as_ref()?, p.load_used))) {
        Some((Ok(panel), load_used)) => (panel, load_used),
        Some((Err(reason), _)) => return not_judged(reason.clone()),
        None => return not_judged("there is no load to judge by".to_owned()),
    };
    let stress = |pa: f64| Measure::new(Quantity::Stress, pa);
    let (demand, limit) = (panel.strength.stress_pa, panel.strength.allowable_pa);
    let mut verdict = if panel.strength.out_of_range.is_empty() {
        let judged = context.verdict(NAME, stress(demand), stress(limit), Sense::AtMost);
        Verdict { remark: treatment(panel, plate), ..place(judged) }
    } else {
        let reasons: Vec<String> = panel.strength.out_of_range.iter().map(out_of_range).collect();
        not_judged(reasons.join("; "))
    };
    verdict.at = Some(panel.at);
    verdict.gravity_used = Some(load_used);
    if context.is_brief {
        return verdict;
    }
    verdict.working = working(panel, plate, material);
    // Rounded up to half a millimetre, so that the plate shown holds.
    let in_range = panel.strength.required_thickness_m.max(panel.strength.in_range_from_m);
    let thickness = Measure::new(Quantity::Length, (in_range * 2e3).ceil() / 2e3);
    let is_thick = panel.strength.out_of_range.iter().any(|o| matches!(o, OutOfRange::ThickPlate { .. }));
    match verdict.state {
        State::Fails => verdict.mend = vec![Phrase::new("To hold, plate {} thick", [thickness])],
        State::NotJudged if !is_thick => {
            verdict.mend = vec![Phrase::new("To be judged, plate {} thick", [thickness])]
        }
        _ => {}
    }
    verdict
}

/// Why the method does not reach.
fn out_of_range(out: &OutOfRange) -> String {
    let mm = |m: f64| number(m * 1e3, 3);
    match *out {
        OutOfRange::LargeDeflection { deflection_m, most_m } => format!(
            "deflects {} mm, more than {} mm, half of its thickness: it stretches too, and bending alone does not tell its stress",
            mm(deflection_m),
            mm(most_m)
        ),
        OutOfRange::ThickPlate { net_thickness_m, most_m } => format!(
            "{} mm thick, more than {} mm, a tenth of its panel's shorter side: it shears too",
            mm(net_thickness_m),
            mm(most_m)
        ),
    }
}

/// What was taken how, where it matters.
fn treatment(panel: &PanelStrength, plate: &Plate) -> String {
    if panel.strength.stress_pa == 0.0 {
        return "no side of it bears more than the other".to_owned();
    }
    let mut words = vec!["stiffeners, stress beside holes and welds are not judged".to_owned()];
    if panel.span.open_share > 0.0 {
        words.insert(0, format!("openings take {} % of its width", number(panel.span.open_share * 100.0, 3)));
    }
    let ends_inside = panel.span.from_m > 0.0 || panel.span.to_m < plate.length_m() * (1.0 - 1e-6);
    if ends_inside && panel.span.is_held != [true; 2] {
        words.insert(0, "its free edge is at an opening".to_owned());
    }
    words.join("; ")
}

fn working(panel: &PanelStrength, plate: &Plate, material: &Material) -> Vec<WorkLine> {
    let strength = &panel.strength;
    let mm = |m: f64| number(m * 1e3, 3);
    let (size, moment) = (format!("{} × {} mm", mm(panel.span.width_m), mm(panel.span.length_m())), panel.moment_n());
    let net = mm(strength.net_thickness_m);
    let open = panel.span.open_share;
    let (over, open_share) = if open > 0.0 {
        ("(1 − x) ", format!("({} × {net}² mm²)", fixed(1.0 - open, 3)))
    } else {
        ("", format!("{net}² mm²"))
    };
    let length = |m: f64| Measure::new(Quantity::Length, m);
    let stress = |pa: f64| Measure::new(Quantity::Stress, pa);
    vec![
        WorkLine {
            symbols: "t_{net} = t − c".to_owned(),
            numbers: format!("{} − {} mm", mm(plate.thickness_m), mm(plate.corrosion_m)),
            result: length(strength.net_thickness_m),
        },
        WorkLine {
            symbols: "m, the largest moment of the panel".to_owned(),
            numbers: format!("{size}, {}", panel.support.words()),
            result: Measure::new(Quantity::MomentPerLength, moment),
        },
        WorkLine {
            symbols: format!(
                "σ = 6 m / {}",
                if over.is_empty() { "t_{net}²".to_owned() } else { format!("({over}t_{{net}}²)") }
            ),
            numbers: format!("6 × {} N / {open_share}", number(moment, 4)),
            result: stress(strength.stress_pa),
        },
        WorkLine {
            symbols: "σ_{allowed} = R / n".to_owned(),
            numbers: format!("{} MPa / {}", number(material.yield_pa / 1e6, 3), number(material.factor, 3)),
            result: stress(strength.allowable_pa),
        },
        WorkLine {
            symbols: "t_{required} = t_{net} √(σ / σ_{allowed}) + c".to_owned(),
            numbers: format!("{net} √{} + {} mm", number(strength.utilisation, 3), mm(plate.corrosion_m)),
            result: length(strength.required_thickness_m),
        },
        WorkLine {
            symbols: "w, the largest deflection".to_owned(),
            numbers: format!("E {} GPa, ν {}", number(material.modulus_pa / 1e9, 3), number(material.poisson, 2)),
            result: length(strength.deflection_m),
        },
    ]
}

/// The trust strip of a settled result; what sloshes on top of the load is not in it.
fn trust(context: &Context) -> Vec<Trust> {
    let mut trust = context.trust();
    if let Some(rise) = trust.first_mut() {
        rise.words = format!("{}; sloshing on top of the settled load is not in it", rise.words);
    }
    trust
}
