//! A span that may not be exceeded: a hangar's, a car's, a print bed's.

use super::fault::Fault;
use super::planform::Question;
use super::quantity::{Scale, all_of, significant};
use super::sizes::{Relations, Size, Values, settle};

/// What a limit made of a wing.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(super) struct Limit {
    /// Span without the limit \[mm\].
    pub(super) span: f64,
    /// Aspect ratio without the limit \[-\].
    pub(super) aspect_ratio: f64,
    /// The limit \[mm\].
    limit: f64,
    /// The unit that it was typed in.
    scale: Scale,
}

impl Limit {
    /// What the limit costs.
    ///
    /// ```text
    /// D_i = L² / (q π b² e): with the same lift L, dynamic pressure q and span efficiency e, D_i goes with 1/b²
    /// ```
    ///
    /// Source: L. Prandtl's lifting-line theory, as in J. D. Anderson, *Aircraft Performance and Design*, ch. 2 (from
    /// memory).
    pub(super) fn note(&self) -> String {
        let ratio = self.span / self.limit;
        format!(
            "span_limit: the span is {} in place of {} with the area kept, so the aspect ratio falls from {} to {}, and \
             the induced drag at the same lift and speed rises by {} % (D_i = L² / (q π b² e): (b / b_limit)² - 1).",
            self.scale.show(self.limit),
            self.scale.show(self.span),
            significant(self.aspect_ratio),
            significant(self.aspect_ratio / (ratio * ratio)),
            significant(((ratio * ratio - 1.0) * 1e4).round() / 100.0),
        )
    }
}

impl Question<'_> {
    /// The sizes within the limit: the span is cut to it and the area kept, what else was given stays. A fault where that
    /// cannot be.
    pub(super) fn limited(
        &self,
        relations: &Relations,
        given: &Values,
        sizes: Values,
        faults: &mut Vec<Fault>,
    ) -> Option<(Values, Option<Limit>)> {
        let (span, area) = (sizes.get(Size::Span)?, sizes.get(Size::Area)?);
        let Some(typed) = self
            .planform
            .span_limit
            .given()
            .filter(|typed| span > typed.value * (1.0 + 1e-12))
        else {
            return Some((sizes, None));
        };
        let scale = typed.scale;
        let mut fault = |problem: String, remedy: &str| {
            faults.push(Fault {
                place: typed.place.clone(),
                text: typed.text.clone(),
                problem,
                remedy: remedy.to_owned(),
            });
        };
        if self.outline.is_some() {
            let problem = format!("the panels make the span {}, which is more", scale.show(span));
            fault(problem, "Shorten the panels, or raise the limit.");
            return None;
        }
        if let Some(asked) = self.planform.span.given() {
            let problem = format!(
                "span = {} ({}) is asked for, which is more",
                asked.text,
                asked.place.short()
            );
            fault(problem, "Lower the span, or raise the limit.");
            return None;
        }
        let mut cut = Values::default();
        let kept = [Size::MeanChord, Size::RootChord, Size::TaperRatio, Size::TipChord];
        let kept = kept.into_iter().filter_map(|size| Some((size, given.get(size)?)));
        let kept: Vec<_> = kept.collect();
        for &(size, value) in &kept {
            cut.set(size, value);
        }
        cut.set(Size::Span, typed.value);
        cut.set(Size::Area, area);
        let settled = settle(relations, &cut);
        if !settled.contradictions.is_empty() {
            let names: Vec<_> = kept.iter().map(|(size, _)| size.key()).collect();
            let problem = format!(
                "the span would be {}; cutting it to the limit with the area of {} kept contradicts {}",
                scale.show(span),
                self.show(Size::Area, area),
                all_of(&names)
            );
            fault(
                problem,
                "Give taper_ratio and the area in place of chords, lower the aspect ratio, or raise the limit.",
            );
            return None;
        }
        let impossible = self.out_of_range(relations, &cut, &settled);
        if let Some(first) = impossible.first() {
            let problem = format!("with the span cut to it, {}", first.problem);
            fault(problem, "Raise the limit, or change one of them.");
            return None;
        }
        let limit = Limit {
            span,
            aspect_ratio: span * span / area,
            limit: typed.value,
            scale,
        };
        Some((settled.values, Some(limit)))
    }
}
