//! Cautions and guidance, each with its ground.

use super::Prepared;
use crate::airfoil::Profiles;
use crate::loft::{LEAST_BASE, Loft};
use crate::planform::{Planform, SpanLaw};
use crate::spec::Sides;

/// The notes of a wing.
pub(super) fn notes(
    prepared: &Prepared,
    planform: &Planform,
    loft: &Loft,
    profiles: &Profiles,
) -> Vec<String> {
    let spec = &prepared.spec;
    let unit = spec.unit;
    let mut notes = vec![
        "Geometry only: no proof of strength, flutter or airworthiness. Local rules and licensed practice decide, and \
         a tunnel has its own safety factors."
            .to_owned(),
    ];
    let base = |k: usize| (loft.sections[k].upper_tail() - loft.sections[k].lower_tail()).norm();
    let last = loft.sections.len() - 1;
    notes.push(match spec.trailing_edge {
        Some(0.0)
            if prepared
                .sections
                .iter()
                .all(|section| section.formula().is_some()) =>
        {
            "Trailing edge sharp.".to_owned()
        }
        Some(0.0) => "Trailing edge sharp: coordinates closed by a wedge in proportion to x.".to_owned(),
        _ if !loft.blunt => "Trailing edge sharp, as the sections define it.".to_owned(),
        given => {
            let how = match given {
                None => "as the sections define it",
                Some(_) => "at least as thick as asked, opened by a wedge in proportion to x",
            };
            format!(
                "Trailing edge {how}: {:.3} {u} at the root, {:.3} {u} at the tip.",
                base(0) / unit.millimetres(),
                base(last) / unit.millimetres(),
                u = unit.symbol()
            )
        }
    });
    notes.extend(closings(prepared));
    if loft.opened {
        notes.push(format!(
            "Some sections are sharp and others blunt: the sharp ones were opened to {LEAST_BASE} mm, because CAD readers \
             merge what is finer."
        ));
    }
    let shortfall = 1.0 - 2.0 * planform.expected.area / planform.wing.area;
    if shortfall > 1e-9 && planform.start == 0.0 && matches!(planform.law, SpanLaw::Straight) {
        notes.push(format!(
            "Straight elements between twisted stations make the chords between them shorter, and the planform area \
             smaller by {:.1e} of itself, than the trapezoid's; the checks allow for that much.",
            shortfall
        ));
    }
    if planform.fin {
        notes.push(
            "The root panel is steeper than 60°: a fin. Its reference plane is x-z, and reference span and area count it \
             and its mirror image, as for a wing; one side is built."
                .to_owned(),
        );
    }
    if spec.panels.iter().any(|panel| panel.is_steep()) && !planform.fin {
        notes.push(
            "Panels steeper than 30° carry their sections square to themselves; where they meet another panel the section \
             lies in the bisecting plane, thickened by 1/cos of half the angle between them."
                .to_owned(),
        );
    }
    if matches!(spec.sides, Sides::Starboard | Sides::Port) && !planform.fin {
        notes.push("One side is built; reference figures count both.".to_owned());
    }
    if profiles.profiles.len() > 1 {
        notes.push(
            "Sections blend along straight elements: between different sections it is the ordinates that change in \
             proportion to the span, not the thickness ratio."
                .to_owned(),
        );
    }
    notes.extend(spec.notes.iter().cloned());
    notes.extend(prepared.notes.iter().cloned());
    notes
}

/// How the formulas are closed: three ways are in use, and they give three different sections.
fn closings(prepared: &Prepared) -> Option<String> {
    let mut parts: Vec<(String, Vec<&str>)> = Vec::new();
    for section in prepared
        .sections
        .iter()
        .filter(|section| section.formula().is_some())
    {
        let how = section.closing_note();
        match parts.iter_mut().find(|(known, _)| *known == how) {
            Some((_, names)) => names.push(&section.name),
            None => parts.push((how, vec![&section.name])),
        }
    }
    let parts: Vec<String> = parts
        .iter()
        .map(|(how, names)| format!("{}: {how}", names.join(", ")))
        .collect();
    (!parts.is_empty()).then(|| format!("Sections by formula: {}.", parts.join("; ")))
}
