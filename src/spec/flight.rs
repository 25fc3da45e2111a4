//! Cruise, and the incidence that follows from it.

use super::atmosphere::Air;
use super::fault::{Fault, Place};
use super::panels::ReferencePlane;
use super::sizing::altitude;
use super::written::{Cruise as WrittenCruise, Entry, Setting, Worded};
use super::{Cruise, IncidenceAt, Load};

/// Speed and air of `[cruise]`; `None` without the table, or where something is wrong with it.
pub(super) fn cruise(written: &WrittenCruise, faults: &mut Vec<Fault>) -> Option<Cruise> {
    let altitude = altitude(&written.altitude, &written.density, faults);
    let speed = written.speed.given()?.value;
    let altitude = altitude?;
    Some(match written.density.given() {
        Some(density) => Cruise {
            speed,
            density: density.value,
            mach: 0.0,
        },
        None => {
            let air = Air::at(altitude);
            Cruise {
                speed,
                density: air.density,
                mach: speed / air.sound,
            }
        }
    })
}

/// What an incidence for cruise needs to be known.
#[derive(Debug)]
pub(super) struct Needs<'a> {
    /// `[setting]`.
    pub(super) setting: &'a Setting,
    /// `[cruise]` as it was written.
    pub(super) written: &'a WrittenCruise,
    /// `[cruise]`, if it is right.
    pub(super) cruise: Option<&'a Cruise>,
    /// `[load]`, if it is right.
    pub(super) load: Option<&'a Load>,
    /// True where a fault of `[load]` is known already.
    pub(super) load_doubtful: bool,
    /// True where a fault of `[cruise]` is known already.
    pub(super) cruise_doubtful: bool,
    /// The plane of span and area.
    pub(super) plane: ReferencePlane,
}

impl Needs<'_> {
    /// Faults of `incidence = "cruise"`; none where it is not asked for.
    pub(super) fn faults(&self) -> Vec<Fault> {
        let Some(asked) = self
            .setting
            .incidence
            .given()
            .filter(|asked| asked.value == Worded::Word)
        else {
            return Vec::new();
        };
        let mut faults = Vec::new();
        let mut fault = |place: &Place, text: &str, problem: String, remedy: &str| {
            faults.push(Fault {
                place: place.clone(),
                text: text.to_owned(),
                problem,
                remedy: remedy.to_owned(),
            });
        };
        let mut lacks =
            |problem: &str, remedy: &str| fault(&asked.place, &asked.text, problem.to_owned(), remedy);
        if self.load.is_none() && !self.load_doubtful {
            lacks(
                "the incidence for cruise needs the weight",
                "Add to [load], for example, mass = \"6.2 kg\", or give the incidence as an angle.",
            );
        }
        let said = [&self.written.speed, &self.written.altitude, &self.written.density];
        if said.iter().all(|entry| matches!(entry, Entry::Absent)) && !self.cruise_doubtful {
            lacks(
                "the incidence for cruise needs the speed",
                "Add to [cruise], for example, speed = \"24 m/s\", or give the incidence as an angle.",
            );
        }
        if self.plane == ReferencePlane::Upright {
            lacks(
                "a fin carries no weight, so none makes its incidence",
                "Give the incidence as an angle.",
            );
        }
        if let Some(at) = self.setting.at.given().filter(|at| at.value == IncidenceAt::Root) {
            fault(
                &at.place,
                &at.text,
                format!(
                    "contradicts incidence = {} ({}), which is laid out at the mean aerodynamic chord",
                    asked.text,
                    asked.place.short()
                ),
                "Delete the line, or give the incidence as an angle.",
            );
        }
        if let (Some(cruise), Some(speed)) = (self.cruise, self.written.speed.given())
            && cruise.mach >= 1.0
        {
            fault(
                &speed.place,
                &speed.text,
                format!(
                    "a Mach number of {} is too high for the incidence for cruise, of which the formulas hold below 1",
                    super::quantity::significant(cruise.mach)
                ),
                "Lower the speed, or give the incidence as an angle.",
            );
        }
        faults
    }
}
