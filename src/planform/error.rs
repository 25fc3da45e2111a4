//! What cannot be laid out.

use thiserror::Error;

/// Why a wing cannot be set as asked. Angles are radians, and degrees in the messages.
#[derive(Clone, Debug, PartialEq, Error)]
#[non_exhaustive]
pub enum Error {
    /// The wing would have to lift more in cruise than an unstalled wing does.
    #[error(
        "incidence for cruise: carrying {weight:.4} N at {pressure:.4} N/m² on {area:.4} m² takes a lift coefficient of \
         {coefficient:.3}; allowed: at most {most}. Raise the speed or the area, or lower the weight"
    )]
    Lift {
        /// \[N\]
        weight: f64,
        /// Dynamic pressure \[N/m²\].
        pressure: f64,
        /// \[m²\]
        area: f64,
        /// Lift coefficient \[-\].
        coefficient: f64,
        /// Largest allowed \[-\].
        most: f64,
    },
    /// The incidence is no wing's.
    #[error(
        "incidence for cruise: {:.2} deg would carry the weight (lift coefficient {coefficient:.3}, zero-lift angle \
         {:.2} deg); allowed: -{most:.0} deg to {most:.0} deg. Change the speed, the area, the twist or the sections",
        incidence.to_degrees(), zero_lift.to_degrees(), most = most.to_degrees()
    )]
    Incidence {
        /// \[rad\]
        incidence: f64,
        /// Lift coefficient \[-\].
        coefficient: f64,
        /// Zero-lift angle of the wing \[rad\].
        zero_lift: f64,
        /// Largest allowed, either way \[rad\].
        most: f64,
    },
    /// The formulas for the lift slope hold below the speed of sound only.
    #[error("incidence for cruise: a Mach number of {mach:.3} is too high; the formulas hold below 1")]
    Mach {
        /// Mach number \[-\].
        mach: f64,
    },
    /// A figure that has to be a positive number is not.
    #[error("incidence for cruise: {what} is {value}, and has to be more than 0")]
    Nothing {
        /// Which figure.
        what: &'static str,
        /// Its value.
        value: f64,
    },
    /// Sections so different that the zero-lift lines cannot be set as asked.
    #[error(
        "aerodynamic twist of {:.2} deg at the {place}: between zero-lift angles of {:.2} deg at the root and {:.2} deg \
         there it takes a geometric twist of {:.2} deg; allowed: -{most:.0} deg to {most:.0} deg. Take sections that are more \
         alike, or less twist",
        asked.to_degrees(), root.to_degrees(), outer.to_degrees(), needed.to_degrees(), most = most.to_degrees()
    )]
    AerodynamicTwist {
        /// Where, such as `tip` or `end of panel 2`.
        place: String,
        /// Twist asked for, between zero-lift lines \[rad\].
        asked: f64,
        /// Zero-lift angle of the root section \[rad\].
        root: f64,
        /// Zero-lift angle of the section there \[rad\].
        outer: f64,
        /// Geometric twist that it takes \[rad\].
        needed: f64,
        /// Largest allowed, either way \[rad\].
        most: f64,
    },
    /// A smooth surface through uneven stations swings out between them.
    #[error(
        "build.surface: the smooth surface swings out on panel {panel}: its chord there comes to {chord:.1} mm between stations of {inner:.1} and {outer:.1} mm. Take panels of more even length and taper, put a station between, or surface = \"ruled\""
    )]
    Overshoot {
        /// Panel, counted from 1.
        panel: usize,
        /// Chord that it comes to \[mm\].
        chord: f64,
        /// Chord at its inner end \[mm\].
        inner: f64,
        /// Chord at its outer end \[mm\].
        outer: f64,
    },
    /// The fuselage leaves too little wing.
    #[error(
        "body.width: the fuselage side is {side:.1} mm from the centreline, and the wing must reach at least {least:.1} mm beyond; its semispan is {semispan:.1} mm"
    )]
    Body {
        /// Half the body's width \[mm\].
        side: f64,
        /// Least length beyond \[mm\].
        least: f64,
        /// Semispan \[mm\].
        semispan: f64,
    },
    /// The fuselage side cuts a panel whose sections do not stand upright.
    #[error(
        "body.width: the fuselage side cuts panel {panel}, whose dihedral is beyond 30°; let the body end inside a flatter panel"
    )]
    SteepBody {
        /// Panel, counted from 1.
        panel: usize,
    },
}
