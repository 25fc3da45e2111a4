//! Resolves the sizes of the planform, and says what contradicts what or what is missing.

use super::Unit;
use super::fault::{Fault, Place};
use super::keys::{self, Kind};
use super::limit::Limit;
use super::panels::Outline;
use super::quantity::{Dimension, Scale, all_of, one_of, significant};
use super::sizes::{Contradiction, Missing, ROUNDING, Relations, Settled, Size, Values, settle};
use super::written::{Entry, Given, Planform};

impl Planform {
    fn entry(&self, size: Size) -> &Entry<f64> {
        match size {
            Size::Panels => &Entry::Absent,
            Size::Span => &self.span,
            Size::Area => &self.area,
            Size::AspectRatio => &self.aspect_ratio,
            Size::MeanChord => &self.mean_chord,
            Size::RootChord => &self.root_chord,
            Size::TaperRatio => &self.taper_ratio,
            Size::TipChord => &self.tip_chord,
        }
    }
}

/// What the planform is resolved from.
#[derive(Debug)]
pub(super) struct Question<'a> {
    /// The table `[planform]`.
    pub(super) planform: &'a Planform,
    /// What the panels settle, where there are panels.
    pub(super) outline: Option<Outline>,
    /// True for an ellipse.
    pub(super) ellipse: bool,
    /// Area that follows from `[load]`.
    pub(super) sized: Option<&'a Given<f64>>,
    /// Unit for messages.
    pub(super) unit: Unit,
    /// Where a fault of the whole planform is put.
    pub(super) place: Place,
    /// True where a fault is known that may hide a size: then nothing is said to be missing.
    pub(super) doubtful: bool,
}

impl Question<'_> {
    /// The values of all sizes, and what a limit of the span made of them; the faults go to `faults`, and then there is
    /// no answer.
    pub(super) fn answer(&self, faults: &mut Vec<Fault>) -> Option<(Values, Option<Limit>)> {
        let before = faults.len();
        let relations = match self.outline {
            Some(outline) => Relations::panels(outline.span, outline.constant, outline.slope),
            None if self.ellipse => Relations::ellipse(),
            None => Relations::trapezoid(),
        };
        let mut given = Values::default();
        if self.outline.is_some() {
            given.set(Size::Panels, 1.0);
        }
        for size in self.allowed() {
            if let Some(known) = self.given(size) {
                given.set(size, known.value);
            }
        }
        let settled = settle(&relations, &given);
        faults.extend(self.two_areas());
        faults.extend(
            settled
                .contradictions
                .iter()
                .map(|circle| self.contradiction(circle)),
        );
        // a value that could not be read would have settled it
        let unreadable = self.doubtful
            || self
                .allowed()
                .any(|size| self.planform.entry(size).is_unreadable());
        if !unreadable {
            faults.extend(self.missing(&settled));
        }
        if settled.contradictions.is_empty() {
            faults.extend(self.out_of_range(&relations, &given, &settled));
        }
        if faults.len() > before || unreadable {
            return None;
        }
        self.limited(&relations, &given, settled.values, faults)
    }

    /// The sizes that this planform may give.
    fn allowed(&self) -> impl Iterator<Item = Size> + use<'_> {
        let free = self.outline.is_some() || self.ellipse;
        Size::ALL
            .into_iter()
            .filter(move |size| !(free && matches!(size, Size::TaperRatio | Size::TipChord)))
    }

    fn given(&self, size: Size) -> Option<&Given<f64>> {
        let sized = self.sized.filter(|_| size == Size::Area);
        self.planform.entry(size).given().or(sized)
    }

    /// How a sentence names a size.
    fn word(&self, size: Size) -> &'static str {
        let typed = self.planform.entry(size).given();
        match (size, typed, self.sized) {
            (Size::Area, None, Some(_)) => "area from [load]",
            _ => size.key(),
        }
    }

    /// The fault of an area that `[load]` makes another.
    fn two_areas(&self) -> Option<Fault> {
        let (typed, sized) = (self.planform.area.given()?, self.sized?);
        let difference = sized.value - typed.value;
        (difference.abs() > ROUNDING * typed.value).then(|| {
            let sign = if difference > 0.0 { "+" } else { "" };
            let problem = format!(
                "contradicts the area from [load], {} ({}; {sign}{}, {sign}{} %)",
                self.show(Size::Area, sized.value),
                sized.place.short(),
                self.show(Size::Area, difference),
                percent(difference / typed.value)
            );
            let remedy = "Delete the area, or what sizes it in [load].".to_owned();
            self.fault(Some(Size::Area), problem, remedy)
        })
    }

    fn scale(&self, size: Size) -> Scale {
        let dimension = match size {
            Size::Area => Dimension::Area,
            Size::AspectRatio | Size::TaperRatio | Size::Panels => Dimension::Ratio,
            Size::Span | Size::MeanChord | Size::RootChord | Size::TipChord => Dimension::Length,
        };
        self.given(size)
            .map_or(dimension.bare(self.unit), |given| given.scale)
    }

    pub(super) fn show(&self, size: Size, value: f64) -> String {
        self.scale(size).show(value)
    }

    /// The one of these sizes that was typed last.
    fn last(&self, sizes: impl Iterator<Item = Size>) -> Option<Size> {
        sizes
            .filter(|&size| self.given(size).is_some())
            .max_by_key(|&size| self.given(size).map(|g| g.place.rank()))
    }

    fn fault(&self, at: Option<Size>, problem: String, remedy: String) -> Fault {
        let typed = at.and_then(|size| self.given(size));
        Fault {
            place: typed.map_or_else(|| self.place.clone(), |given| given.place.clone()),
            text: typed.map_or_else(String::new, |given| given.text.clone()),
            problem,
            remedy,
        }
    }

    fn contradiction(&self, circle: &Contradiction) -> Fault {
        let last = self.last(circle.sizes.iter().map(|&(size, _)| size));
        let others = self.name(
            circle
                .sizes
                .iter()
                .map(|&(size, _)| size)
                .filter(|&size| Some(size) != last),
            true,
        );
        let mut problem = format!("contradicts {others}:");
        for &(size, made) in &circle.sizes {
            let (Some(made), Some(given)) = (made, self.given(size)) else {
                continue;
            };
            let grounds: Vec<_> = circle
                .sizes
                .iter()
                .map(|&(other, _)| other)
                .filter(|&other| other != size)
                .collect();
            let verb = make(&grounds);
            let difference = made - given.value;
            problem += &format!(
                "\n  {} {verb} {} {}, not {} ({}{}, {}{} %)",
                self.name(grounds.into_iter(), false),
                size.key(),
                self.show(size, made),
                self.show(size, given.value),
                if difference > 0.0 { "+" } else { "" },
                self.show(size, difference),
                if difference > 0.0 { "+" } else { "" },
                percent(difference / given.value),
            );
        }
        let remedy = match circle
            .sizes
            .iter()
            .filter(|&&(size, _)| size != Size::Panels)
            .count()
        {
            1 => "Delete it, or change it or the panels.",
            _ => "Delete one of them, or change one to the value that the others make of it.",
        };
        self.fault(last, problem, remedy.to_owned())
    }

    /// Names sizes for a sentence, with their values and places if wanted.
    fn name(&self, sizes: impl Iterator<Item = Size>, values: bool) -> String {
        let names: Vec<String> = sizes
            .map(|size| match self.given(size).filter(|_| values) {
                Some(given) => {
                    format!(
                        "{} = {} ({})",
                        self.word(size),
                        self.show(size, given.value),
                        given.place.short()
                    )
                }
                None => self.word(size).to_owned(),
            })
            .collect();
        all_of(&names.iter().map(String::as_str).collect::<Vec<_>>())
    }

    fn missing(&self, settled: &Settled) -> Option<Fault> {
        let (count, sizes) = match &settled.missing {
            Missing::Nothing => return None,
            Missing::One(sizes) => ("one more size is", sizes),
            Missing::Several(sizes) if sizes.len() == 2 => ("two more sizes are", sizes),
            Missing::Several(sizes) => ("three sizes are", sizes),
        };
        let names: Vec<_> = sizes.iter().map(|size| size.key()).collect();
        let mut remedy = match settled.missing {
            Missing::One(_) => format!("Add {} to [planform].", one_of(&names)),
            _ => format!("Add to [planform], for example, {}.", all_of(&names)),
        };
        if matches!(settled.missing, Missing::One(_)) && sizes.contains(&Size::TaperRatio) {
            remedy += " For an untapered wing: taper_ratio = 1.";
        }
        let known = if settled.basis.is_empty() {
            String::new()
        } else {
            format!(" beside {}", self.name(settled.basis.iter().copied(), false))
        };
        let problem = format!("the planform is not settled: {count} needed{known}");
        Some(self.fault(None, problem, remedy))
    }

    /// Faults of sizes that follow from others and that no wing can have.
    pub(super) fn out_of_range(
        &self,
        relations: &Relations,
        given: &Values,
        settled: &Settled,
    ) -> Vec<Fault> {
        let table = keys::table("planform").expect("planform is in the list");
        let mut faults = Vec::new();
        // a chord that is impossible says more than the ratio that it makes
        let chords_first = [Size::MeanChord, Size::RootChord, Size::TipChord]
            .into_iter()
            .chain(Size::ALL);
        for size in chords_first {
            let (Some(value), None) = (settled.values.get(size), given.get(size)) else {
                continue;
            };
            let Some(Kind::Number(_, range)) = keys::key(table, size.key()).map(|key| key.kind) else {
                continue;
            };
            if range.holds(value) {
                continue;
            }
            let grounds = relations.grounds(size, &settled.basis, given);
            let verb = make(&grounds);
            let problem = format!(
                "{} {verb} {} {}; allowed: {}",
                self.name(grounds.iter().copied(), true),
                size.key(),
                self.show(size, value),
                range.words
            );
            faults.push(self.fault(
                self.last(grounds.iter().copied()),
                problem,
                "Change one of them.".to_owned(),
            ));
            // what follows from an impossible size is impossible too
            break;
        }
        faults
    }
}

/// The verb for what follows from sizes.
fn make(grounds: &[Size]) -> &'static str {
    if grounds.len() == 1 && grounds[0] != Size::Panels {
        "makes"
    } else {
        "make"
    }
}

fn percent(ratio: f64) -> String {
    let text = significant((ratio * 1e4).round() / 100.0);
    if text == "0" || text == "-0" {
        significant(ratio * 100.0)
    } else {
        text
    }
}
