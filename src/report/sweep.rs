//! Sweeps as comma-separated values: SI units, named in the header; numbers unrounded; empty where there is none.

use crate::analysis::{Bound, End, Envelope, FillMap, State};

/// Fill maps, each with the name of its load case, one point a line.
pub fn fill_map_csv(maps: &[(&str, &FillMap)]) -> String {
    let mut out =
        "case,fill_share,accel_m_per_s2,accel_s_m_per_s2,accel_z_m_per_s2,state,utilisation,criterion,bound\n"
            .to_owned();
    for (case, map) in maps {
        for (i, share) in map.shares.iter().enumerate() {
            for (j, &size) in map.accels_m_per_s2.iter().enumerate() {
                let Some(point) = map.point(i, j) else { continue };
                let used = point.utilisation.map_or_else(String::new, |u| u.to_string());
                line(
                    &mut out,
                    [
                        quoted(case),
                        share.to_string(),
                        size.to_string(),
                        map.accel(j).x.to_string(),
                        map.accel(j).y.to_string(),
                        point.state.word().to_owned(),
                        used,
                        point.criterion.to_owned(),
                        bound_word(point.bound).to_owned(),
                    ],
                );
            }
        }
    }
    out
}

/// Hold envelopes, one direction a line.
pub fn envelope_csv(envelopes: &[&Envelope]) -> String {
    let mut out = "attitude_rad,direction_rad,accel_m_per_s2,accel_s_m_per_s2,accel_z_m_per_s2,end,criterion,bound,\
                   reason,spill_m_per_s2,in_every_case\n"
        .to_owned();
    for envelope in envelopes {
        let always = envelope.always.as_ref().map_or_else(String::new, |end| end.word().to_owned());
        for limit in &envelope.limits {
            let [end, criterion, bound, reason] = ended(&limit.end);
            let spill = limit.spill_m_per_s2.map_or_else(String::new, |a| a.to_string());
            line(
                &mut out,
                [
                    envelope.attitude.angle_rad().to_string(),
                    limit.direction_rad().to_string(),
                    limit.accel_m_per_s2.to_string(),
                    limit.accel().x.to_string(),
                    limit.accel().y.to_string(),
                    end,
                    criterion,
                    bound,
                    reason,
                    spill,
                    always.clone(),
                ],
            );
        }
    }
    out
}

/// State, criterion, bound and reason of what ends the accelerations that hold.
fn ended(end: &End) -> [String; 4] {
    let (state, criterion, bound, reason) = match end {
        End::Fails { criterion, bound } => (State::Fails.word(), *criterion, *bound, ""),
        End::NotJudged { reason } => (State::NotJudged.word(), "", None, reason.as_str()),
        End::Beyond => ("beyond", "", None, ""),
    };
    [state.to_owned(), criterion.to_owned(), bound_word(bound).to_owned(), quoted(reason)]
}

fn bound_word(bound: Option<Bound>) -> &'static str {
    bound.map_or("", Bound::word)
}

/// A text as a field. Source: RFC 4180, section 2, rules 5 to 7 (from memory).
fn quoted(text: &str) -> String {
    let is_plain = !text.contains([',', '"', '\n', '\r']);
    if is_plain { text.to_owned() } else { format!("\"{}\"", text.replace('"', "\"\"")) }
}

fn line<const N: usize>(out: &mut String, fields: [String; N]) {
    out.push_str(&fields.join(","));
    out.push('\n');
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_field_with_a_comma_or_a_quote_stays_one_field() {
        for (text, want) in
            [("Bend left", "Bend left"), ("stop, hard", "\"stop, hard\""), ("a \"b\"", "\"a \"\"b\"\"\"")]
        {
            assert_eq!(quoted(text), want, "{text}");
        }
    }
}
