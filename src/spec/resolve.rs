//! Resolves what the file says into a wing of which every number is known.

use super::document::Node;
use super::fault::{Fault, Place};
use super::flight::{self, Needs};
use super::fuselage;
use super::limit::Limit;
use super::panels::{self, ReferencePlane};
use super::planform::Question;
use super::quantity::significant;
use super::sizes::Size;
use super::sizing::Sizing;
use super::unknown;
use super::written::{AirfoilText, Entry, Given, Line, Reader, Worded, Written};
use super::{AirfoilSource, ConstructionLine, IncidenceAt, Outline, Panel, Setting, Sides, Spec, StepForm};

/// Largest thickness of the trailing edge, as a part of the smallest chord \[-\].
const THICKEST_TRAILING_EDGE: f64 = 0.1;
/// Where sweep is measured and sections turn, unless the file says otherwise: the quarter chord \[-\].
const QUARTER: f64 = 0.25;
/// Distance between facets and surface, unless the file says otherwise \[mm\].
const FACET_TOLERANCE: f64 = 0.05;

/// Where an airfoil's text was typed, with it.
pub(super) fn airfoil_source(given: &Given<AirfoilText>) -> AirfoilSource {
    AirfoilSource {
        text: given.value.text.clone(),
        form: given.value.form,
        changes: given.value.changes,
        place: given.place.clone(),
    }
}

/// Every airfoil text of the file, root outwards.
pub(super) fn airfoils(written: &Written) -> Vec<AirfoilSource> {
    let panels = written.panels.iter().map(|panel| &panel.airfoil);
    let all = std::iter::once(&written.airfoil.root)
        .chain(panels)
        .chain(std::iter::once(&written.airfoil.tip));
    all.filter_map(Entry::given).map(airfoil_source).collect()
}

/// The wing that the file means; `None` where anything is wrong, and the reader then has the faults.
pub(super) fn resolve(written: &Written, root: &Node, name: String, reader: &mut Reader) -> Option<Spec> {
    let faults = &mut reader.faults;
    let before = faults.len();
    let place = |table: &str| table_place(root, table);

    let root_airfoil = match &written.airfoil.root {
        Entry::Given(given) => Some(airfoil_source(given)),
        Entry::Unreadable => None,
        Entry::Absent if unknown::hides_something(root, "airfoil") => None,
        Entry::Absent => {
            faults.push(Fault {
                place: Place {
                    key: "airfoil.root".to_owned(),
                    ..place("airfoil")
                },
                text: String::new(),
                problem: "the section at the root is missing".to_owned(),
                remedy: "Add to [airfoil], for example, root = \"NACA 2412\".".to_owned(),
            });
            None
        }
    };
    let has_panels = root_has(root, "panel");
    if has_panels {
        moved(written, faults);
        faults.extend(panels::folds(&written.panels));
        faults.extend(two_tips(written));
    }
    let ellipse = written.planform.outline.or_default() == Outline::Ellipse;
    if ellipse {
        faults.extend(no_ellipse(written));
    }
    let sizing = Sizing::of(
        &written.load,
        &place("load"),
        unknown::hides_something(root, "load"),
        faults,
    );
    let outline = panels::outline(&written.panels);
    // panels of which a size is wrong settle nothing, and what is missing then cannot be told
    let sizes = if has_panels && outline.is_none() {
        None
    } else {
        let unit = written.top.unit.or_default();
        Question {
            planform: &written.planform,
            outline,
            ellipse: ellipse && !has_panels,
            sized: sizing.area.as_ref(),
            unit,
            place: place("planform"),
            doubtful: unknown::hides_something(root, "planform")
                || written.planform.outline.is_unreadable()
                || sizing.doubtful,
        }
        .answer(faults)
    };
    let first_dihedral = match written.panels.first() {
        Some(panel) => &panel.dihedral,
        None => &written.planform.dihedral,
    };
    let plane = ReferencePlane::of(first_dihedral.or(0.0));
    let sides = sides(written, first_dihedral, faults);
    let lines = lines(&written.lines, faults);

    let (sizes, limit) = sizes.map_or((None, None), |(sizes, limit)| (Some(sizes), limit));
    let panels = sizes
        .as_ref()
        .zip(root_airfoil.as_ref())
        .and_then(|(sizes, root)| {
            if has_panels {
                let tip = written.airfoil.tip.given().map(airfoil_source);
                panels::build(&written.panels, written.planform.sweep_at.or(QUARTER), root, tip)
            } else {
                let tip = written
                    .airfoil
                    .tip
                    .given()
                    .map_or_else(|| root.clone(), airfoil_source);
                Some(vec![single(
                    written,
                    sizes.get(Size::Span)?,
                    match sizes.get(Size::TipChord) {
                        Some(chord) => chord,
                        // an ellipse ends in a small real chord: what it has at 99 % of the semispan
                        None => sizes.get(Size::RootChord)? * (1.0_f64 - 0.99 * 0.99).sqrt(),
                    },
                    tip,
                )])
            }
        });
    let root_chord = sizes.and_then(|sizes| sizes.get(Size::RootChord));
    faults.extend(thick_trailing_edge(written, root_chord, panels.as_deref()));
    faults.extend(sharp_in_proportion(written));
    faults.extend(closing_of_nothing(written));
    let span = sizes.and_then(|sizes| sizes.get(Size::Span));
    let body = fuselage::body(&written.body, span, plane, faults);
    let outline = written.planform.outline.or_default();
    let centre = root_chord
        .zip(panels.as_deref())
        .map(|(chord, panels)| fuselage::centre(chord, panels, outline));
    let placing = fuselage::placing(&written.place, centre, faults);
    let cruise_faults = faults.len();
    let cruise = flight::cruise(&written.cruise, faults);
    let load_doubtful = sizing.doubtful || sizes.is_none();
    let load = sizes.and_then(|sizes| sizing.load(&sizes, limit.as_ref(), &written.planform));
    faults.extend(
        Needs {
            setting: &written.setting,
            written: &written.cruise,
            cruise: cruise.as_ref(),
            load: load.as_ref(),
            load_doubtful,
            cruise_doubtful: faults.len() > cruise_faults || unknown::hides_something(root, "cruise"),
            plane,
        }
        .faults(),
    );

    let mut stated = std::mem::take(&mut reader.stated);
    if limit.is_some() {
        // the limit put it aside
        stated.retain(|stated| stated.key != "planform.aspect_ratio");
    }
    let incidence = written.setting.incidence.or(Worded::Number(0.0));
    (reader.faults.len() == before && before == 0).then_some(())?;
    Some(Spec {
        name,
        description: written.top.description.given().map(|given| given.value.clone()),
        unit: written.top.unit.or_default(),
        root_chord: root_chord?,
        root_airfoil: root_airfoil?,
        panels: panels?,
        setting: Setting {
            incidence: match incidence {
                Worded::Number(angle) => angle,
                Worded::Word => 0.0,
            },
            at: written.setting.at.or(IncidenceAt::Mac),
            twist_axis: written.setting.twist_axis.or(QUARTER),
            twist_kind: written.setting.twist_kind.or_default(),
            twist_law: written.setting.twist_law.or_default(),
            for_cruise: incidence == Worded::Word,
        },
        trailing_edge: written.trailing_edge.thickness.given().map(|given| given.value),
        sharp_by: written.trailing_edge.closing.or_default(),
        facet_tolerance: written.facets.tolerance.or(FACET_TOLERANCE),
        sides,
        step: StepForm {
            reference: written.step.reference.or_default(),
            schema: written.step.schema.or_default(),
        },
        lines,
        load,
        cruise,
        body,
        placing,
        outline,
        surface: written.build.surface.or_default(),
        tip: written.tip.form.or_default(),
        trailing_edge_ratio: written.trailing_edge.proportion.given().map(|given| given.value),
        stated,
        notes: limit.iter().map(Limit::note).collect(),
    })
}

/// The one panel of a wing without `[[panel]]`.
fn single(written: &Written, span: f64, tip_chord: f64, airfoil: AirfoilSource) -> Panel {
    let dihedral = written.planform.dihedral.or(0.0);
    Panel {
        span: 0.5 * span / ReferencePlane::of(dihedral).projection(dihedral),
        tip_chord,
        sweep: written.planform.sweep.or(0.0),
        sweep_at: written.planform.sweep_at.or(QUARTER),
        dihedral,
        twist: written.setting.twist.or(0.0),
        airfoil,
    }
}

/// Faults of keys that panels have themselves.
fn moved(written: &Written, faults: &mut Vec<Fault>) {
    let planform = &written.planform;
    for (entry, key) in [
        (&planform.tip_chord, "tip_chord"),
        (&planform.taper_ratio, "tip_chord"),
        (&planform.sweep, "sweep"),
        (&planform.dihedral, "dihedral"),
        (&written.setting.twist, "twist"),
    ] {
        if let Some(given) = entry.given() {
            faults.push(at(
                given,
                "does not go with [[panel]]".to_owned(),
                format!("Delete it here, and give each [[panel]] its {key}."),
            ));
        }
    }
}

/// Faults of what an ellipse does not have.
fn no_ellipse(written: &Written) -> Vec<Fault> {
    let planform = &written.planform;
    let chords = [&planform.tip_chord, &planform.taper_ratio].into_iter();
    let mut faults: Vec<_> = chords
        .filter_map(Entry::given)
        .map(|given| {
            at(
                given,
                "does not go with outline = \"ellipse\", of which the chord runs out at the tip".to_owned(),
                "Delete the line: an ellipse is settled by two of area, span, aspect_ratio and root_chord."
                    .to_owned(),
            )
        })
        .collect();
    if let (false, Some(outline)) = (written.panels.is_empty(), planform.outline.given()) {
        faults.push(at(
            outline,
            "does not go with [[panel]]: panels are an outline of their own".to_owned(),
            "Delete this line, or the panels.".to_owned(),
        ));
    }
    faults
}

/// The fault of a sharp trailing edge that is to be in proportion to the chord as well.
fn sharp_in_proportion(written: &Written) -> Option<Fault> {
    let edge = &written.trailing_edge;
    let sharp = edge.thickness.given().filter(|given| given.value == 0.0)?;
    let proportion = edge.proportion.given()?;
    let problem = format!(
        "contradicts thickness = {} ({}), a sharp edge",
        sharp.text,
        sharp.place.short()
    );
    Some(at(proportion, problem, "Delete one of the two.".to_owned()))
}

/// The fault of a way to close a trailing edge that is not sharp.
fn closing_of_nothing(written: &Written) -> Option<Fault> {
    let edge = &written.trailing_edge;
    let closing = edge.closing.given()?;
    let sharp = edge.thickness.is_unreadable() || edge.thickness.given().is_some_and(|t| t.value == 0.0);
    (!sharp).then(|| {
        at(
            closing,
            "says how a formula is closed to a sharp edge, and the edge is not sharp".to_owned(),
            "Add thickness = 0 to [trailing_edge], or delete the line.".to_owned(),
        )
    })
}

/// The fault of a tip with two sections.
fn two_tips(written: &Written) -> Option<Fault> {
    let tip = written.airfoil.tip.given()?;
    let last = written.panels.last()?.airfoil.given()?;
    (tip.value != last.value).then(|| {
        let problem = format!(
            "contradicts {} = {} ({}): both are the section at the tip",
            last.place.key,
            last.text,
            last.place.short()
        );
        at(tip, problem, "Delete one of them.".to_owned())
    })
}

fn sides(written: &Written, first_dihedral: &Entry<f64>, faults: &mut Vec<Fault>) -> Sides {
    let dihedral = first_dihedral.or(0.0);
    let fin = ReferencePlane::of(dihedral) == ReferencePlane::Upright;
    match written.build.sides.given() {
        None if fin => Sides::Starboard,
        None => Sides::Both,
        Some(given) => {
            if fin && matches!(given.value, Sides::Both | Sides::Pair) {
                let problem = format!(
                    "a first panel with a dihedral of {} deg makes a fin, which has one side; both sides need at most 60 deg",
                    significant(dihedral.to_degrees())
                );
                faults.push(at(
                    given,
                    problem,
                    "Write \"starboard\" or \"port\", or delete the line.".to_owned(),
                ));
            }
            given.value
        }
    }
}

fn lines(written: &[Line], faults: &mut Vec<Fault>) -> Vec<ConstructionLine> {
    let mut lines: Vec<ConstructionLine> = Vec::new();
    for (i, line) in written.iter().enumerate() {
        let earlier = written[..i].iter().filter_map(|line| line.name.given());
        if let Some(name) = line.name.given()
            && let Some(first) = earlier.into_iter().find(|first| first.value == name.value)
        {
            let problem = format!("this name is taken ({})", first.place.short());
            faults.push(at(name, problem, "Give each line its own name.".to_owned()));
        }
        let (from, to) = (line.from.or(0.0), line.to.or(1.0));
        let unreadable = line.from.is_unreadable() || line.to.is_unreadable();
        if let Some(given) = line
            .to
            .given()
            .or(line.from.given())
            .filter(|_| !unreadable && from >= to)
        {
            let problem = format!(
                "the line ends at {} of the semispan, where it starts at {}; allowed: 0 <= from < to <= 1",
                significant(to),
                significant(from)
            );
            faults.push(at(
                given,
                problem,
                "Give the inner end as from and the outer end as to.".to_owned(),
            ));
        }
        if let (Some(name), Some(chord_fraction)) = (line.name.given(), line.chord_fraction.given()) {
            lines.push(ConstructionLine {
                name: name.value.clone(),
                chord_fraction: chord_fraction.value,
                from,
                to,
            });
        }
    }
    lines
}

fn thick_trailing_edge(
    written: &Written,
    root_chord: Option<f64>,
    panels: Option<&[Panel]>,
) -> Option<Fault> {
    let given = written.trailing_edge.thickness.given()?;
    let smallest = panels?
        .iter()
        .map(|panel| panel.tip_chord)
        .fold(root_chord?, f64::min);
    let limit = THICKEST_TRAILING_EDGE * smallest;
    (given.value >= limit).then(|| {
        let problem = format!(
            "too thick for a smallest chord of {}; allowed: less than {} (10 %)",
            given.scale.show(smallest),
            given.scale.show(limit)
        );
        at(given, problem, "Make it thinner.".to_owned())
    })
}

fn at<T>(given: &Given<T>, problem: String, remedy: String) -> Fault {
    Fault {
        place: given.place.clone(),
        text: given.text.clone(),
        problem,
        remedy,
    }
}

fn root_has(root: &Node, table: &str) -> bool {
    root.member(table).is_some()
}

/// Where a table stands; without a line if it is not there.
fn table_place(root: &Node, table: &str) -> Place {
    root.member(table).map_or_else(
        || Place {
            file: root.place.file.clone(),
            line: 0,
            key: table.to_owned(),
        },
        |node| node.place.clone(),
    )
}
