//! The sizes of a planform and how they follow from each other.
//!
//! ```text
//! S = b c_m        A = b / c_m        c_m = (c_r + c_t) / 2        λ = c_t / c_r
//! S area, b span, A aspect ratio, c_m mean chord, c_r root chord, c_t tip chord, λ taper ratio
//! ```
//! An ellipse has c_m = π/4 c_r in place of the last two, and neither taper ratio nor tip chord: its chord is
//! c_r sqrt(1 - (2y/b)²). With panels the last two give way to what the panels settle: the span, and c_m as a linear function of c_r.
//!
//! Sizes that are given are taken up in the order of [`Size`]. One that already follows from those before it is
//! compared with what follows, and is otherwise not used: so every size given differs from the resolved wing by at most
//! [`ROUNDING`], or is part of a [`Contradiction`].

use std::f64::consts::FRAC_PI_4;

/// Relative difference up to which two values of the same size count as one that was rounded \[-\].
pub(super) const ROUNDING: f64 = 5e-4;

/// A size of the planform, in the order of precedence.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Size {
    /// What the panels settle between them: not a number, only something that others follow from.
    Panels,
    Span,
    Area,
    AspectRatio,
    MeanChord,
    RootChord,
    TaperRatio,
    TipChord,
}

impl Size {
    /// Every size that a spec may give, in the order of precedence.
    pub(super) const ALL: [Self; 7] = [
        Self::Span,
        Self::Area,
        Self::AspectRatio,
        Self::MeanChord,
        Self::RootChord,
        Self::TaperRatio,
        Self::TipChord,
    ];

    /// Its key in `[planform]`.
    pub(super) const fn key(self) -> &'static str {
        match self {
            Self::Panels => "the panels",
            Self::Span => "span",
            Self::Area => "area",
            Self::AspectRatio => "aspect_ratio",
            Self::MeanChord => "mean_chord",
            Self::RootChord => "root_chord",
            Self::TaperRatio => "taper_ratio",
            Self::TipChord => "tip_chord",
        }
    }
}

/// Values of sizes: mm, mm² or ratios; `None` where not known.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub(super) struct Values([Option<f64>; 8]);

impl Values {
    /// The value of a size, if it is known.
    pub(super) fn get(&self, size: Size) -> Option<f64> {
        self.0[size as usize]
    }

    /// Makes a size known.
    pub(super) fn set(&mut self, size: Size, value: f64) {
        self.0[size as usize] = Some(value);
    }

    fn only(&self, sizes: &[Size]) -> Self {
        let mut some = Self::default();
        for &size in sizes {
            some.0[size as usize] = self.get(size);
        }
        some
    }
}

/// How sizes follow from each other.
#[derive(Debug)]
pub(super) struct Relations(Vec<Rule>);

/// Gives a size from the values of the sizes it follows from.
type Formula = Box<dyn Fn(&[f64]) -> f64>;

struct Rule {
    gives: Size,
    from: Vec<Size>,
    by: Formula,
}

impl std::fmt::Debug for Rule {
    fn fmt(&self, f: &mut std::fmt::Formatter<'_>) -> std::fmt::Result {
        write!(f, "{:?} from {:?}", self.gives, self.from)
    }
}

impl Relations {
    /// A trapezoid.
    pub(super) fn trapezoid() -> Self {
        use Size::{MeanChord, RootChord, TaperRatio, TipChord};
        let mut relations = Self::rectangle();
        relations.add(TaperRatio, &[TipChord, RootChord], |v| v[0] / v[1]);
        relations.add(TipChord, &[TaperRatio, RootChord], |v| v[0] * v[1]);
        relations.add(RootChord, &[TipChord, TaperRatio], |v| v[0] / v[1]);
        relations.add(MeanChord, &[RootChord, TipChord], |v| 0.5 * (v[0] + v[1]));
        relations.add(RootChord, &[MeanChord, TipChord], |v| 2.0 * v[0] - v[1]);
        relations.add(TipChord, &[MeanChord, RootChord], |v| 2.0 * v[0] - v[1]);
        relations.add(RootChord, &[MeanChord, TaperRatio], |v| 2.0 * v[0] / (1.0 + v[1]));
        relations
    }

    /// An ellipse: its area is that of the full ellipse over both sides, S = π/4 b c_r.
    pub(super) fn ellipse() -> Self {
        use Size::{MeanChord, RootChord};
        let mut relations = Self::rectangle();
        relations.add(MeanChord, &[RootChord], |v| FRAC_PI_4 * v[0]);
        relations.add(RootChord, &[MeanChord], |v| v[0] / FRAC_PI_4);
        relations
    }

    /// A wing of panels with this span \[mm\] and with c_m = `constant` \[mm\] + `slope` c_r, `slope` > 0.
    pub(super) fn panels(span: f64, constant: f64, slope: f64) -> Self {
        use Size::{MeanChord, Panels, RootChord, Span};
        let mut relations = Self::rectangle();
        relations.add(Span, &[Panels], move |_| span);
        relations.add(MeanChord, &[Panels, RootChord], move |v| constant + slope * v[1]);
        relations.add(RootChord, &[Panels, MeanChord], move |v| {
            (v[1] - constant) / slope
        });
        relations
    }

    /// What holds for every wing, between span, area, aspect ratio and mean chord.
    fn rectangle() -> Self {
        use Size::{Area, AspectRatio, MeanChord, Span};
        let mut relations = Self(Vec::new());
        relations.add(Area, &[Span, MeanChord], |v| v[0] * v[1]);
        relations.add(Span, &[Area, MeanChord], |v| v[0] / v[1]);
        relations.add(MeanChord, &[Area, Span], |v| v[0] / v[1]);
        relations.add(AspectRatio, &[Span, MeanChord], |v| v[0] / v[1]);
        relations.add(Span, &[AspectRatio, MeanChord], |v| v[0] * v[1]);
        relations.add(MeanChord, &[Span, AspectRatio], |v| v[0] / v[1]);
        relations.add(Span, &[AspectRatio, Area], |v| (v[0] * v[1]).sqrt());
        relations
    }

    fn add(&mut self, gives: Size, from: &[Size], by: impl Fn(&[f64]) -> f64 + 'static) {
        self.0.push(Rule {
            gives,
            from: from.to_vec(),
            by: Box::new(by),
        });
    }

    /// Everything that follows from `known`; may be negative or not finite where no wing has these sizes.
    pub(super) fn follow(&self, known: Values) -> Values {
        let mut known = known;
        loop {
            let new = self
                .0
                .iter()
                .filter(|rule| known.get(rule.gives).is_none())
                .find_map(|rule| {
                    let inputs: Option<Vec<f64>> = rule.from.iter().map(|&size| known.get(size)).collect();
                    inputs.map(|inputs| (rule.gives, (rule.by)(&inputs)))
                });
            match new {
                Some((size, value)) => known.set(size, value),
                None => return known,
            }
        }
    }

    /// The fewest of `basis` that `size` follows from. `basis` must be free of contradictions, `size` follow from it.
    pub(super) fn grounds(&self, size: Size, basis: &[Size], values: &Values) -> Vec<Size> {
        let mut grounds = basis.to_vec();
        for candidate in basis.iter().rev() {
            let fewer: Vec<_> = grounds.iter().copied().filter(|size| size != candidate).collect();
            if self.follow(values.only(&fewer)).get(size).is_some() {
                grounds = fewer;
            }
        }
        grounds
    }

    /// True where every size follows from these.
    fn settle_all(&self, sizes: &[Size]) -> bool {
        // whether something follows depends on which sizes are known, not on their values: with ones, nothing degenerates
        let mut ones = Values::default();
        for &size in sizes {
            ones.set(size, 1.0);
        }
        let known = self.follow(ones);
        self.sizes().iter().all(|&size| known.get(size).is_some())
    }

    /// The sizes that these relations are about.
    fn sizes(&self) -> Vec<Size> {
        Size::ALL
            .into_iter()
            .filter(|&size| self.0.iter().any(|rule| rule.gives == size))
            .collect()
    }
}

/// Sizes of which each follows from the others, with another value than was given.
#[derive(Clone, Debug, PartialEq)]
pub(super) struct Contradiction {
    /// The sizes, in the order of precedence, each with what the others make of it.
    pub(super) sizes: Vec<(Size, Option<f64>)>,
}

/// What follows from the sizes that were given.
#[derive(Clone, Debug, PartialEq)]
pub(super) struct Settled {
    /// Every size that is known.
    pub(super) values: Values,
    /// The sizes that were used.
    pub(super) basis: Vec<Size>,
    /// What contradicts what.
    pub(super) contradictions: Vec<Contradiction>,
    /// What is missing.
    pub(super) missing: Missing,
}

/// What would settle the sizes.
#[derive(Clone, Debug, PartialEq)]
pub(super) enum Missing {
    /// Nothing is missing.
    Nothing,
    /// Any one of these.
    One(Vec<Size>),
    /// More than one; these would do, for example.
    Several(Vec<Size>),
}

/// Settles the sizes from those that were given.
pub(super) fn settle(relations: &Relations, given: &Values) -> Settled {
    let mut basis = Vec::new();
    let mut values = Values::default();
    let mut contradictions = Vec::new();
    for size in std::iter::once(Size::Panels).chain(Size::ALL) {
        let Some(value) = given.get(size) else { continue };
        match values.get(size) {
            None => {
                basis.push(size);
                values = relations.follow(given.only(&basis));
            }
            Some(follows) if (follows - value).abs() <= ROUNDING * value.abs() => {}
            Some(_) => {
                let mut circle = relations.grounds(size, &basis, given);
                circle.push(size);
                let of_others = |&size: &Size| {
                    let others: Vec<_> = circle.iter().copied().filter(|&other| other != size).collect();
                    (size, relations.follow(given.only(&others)).get(size))
                };
                contradictions.push(Contradiction {
                    sizes: circle.iter().map(of_others).collect(),
                });
            }
        }
    }
    let missing = missing(relations, &basis);
    Settled {
        values,
        basis,
        contradictions,
        missing,
    }
}

fn missing(relations: &Relations, basis: &[Size]) -> Missing {
    if relations.settle_all(basis) {
        return Missing::Nothing;
    }
    let with = |more: &[Size]| relations.settle_all(&[basis, more].concat());
    let one: Vec<_> = relations
        .sizes()
        .into_iter()
        .filter(|&size| with(&[size]))
        .collect();
    if !one.is_empty() {
        return Missing::One(one);
    }
    // the sizes that designers start from, the commonest first
    let usual = [
        Size::Span,
        Size::RootChord,
        Size::TaperRatio,
        Size::AspectRatio,
        Size::Area,
        Size::TipChord,
    ];
    for (i, &first) in usual.iter().enumerate() {
        for &second in &usual[i + 1..] {
            if with(&[first, second]) {
                return Missing::Several(vec![first, second]);
            }
        }
    }
    Missing::Several(usual[..3].to_vec())
}
