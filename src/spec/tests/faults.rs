//! Every fault, provoked from a text and compared with what the user sees.

use super::{faults, planform};

/// A wing that is right, for texts that go behind it.
const WING: &str = "span = 2000\nroot_chord = 300\ntip_chord = 200\n";

/// The only fault of a wing with more lines behind it; the last of its own lines is line 6.
#[track_caller]
fn fault(more: &str) -> String {
    only(&format!("{}{more}", planform(WING)))
}

#[track_caller]
fn only(text: &str) -> String {
    let faults = faults(text);
    assert_eq!(faults.len(), 1, "{faults:#?}");
    faults[0].clone()
}

#[test]
fn print_all() {
    for text in [
        "planform = 3",
        "[planform]\ntaper = 3",
        "[[planform]]",
        "[panel]\nspan=3",
        "panel=[]",
        "panel=[3]",
        "a = [",
        "",
        "[planform]\nspan = 1\nspan = 2\n",
        "[airfoil\nroot=3",
        "x = nope",
        "[planform]\nspan=2000\naspect_ratio=8\narea=\"0.4 m^2\"\n[wing]\nx=1",
        "[planform]\nspan=2000\nmean_chord=200\nroot_chord=500",
        "[load]\nmass=3",
    ] {
        for f in faults(text) {
            eprintln!("{f}");
        }
        eprintln!("----");
    }
    eprintln!("{}", fault(""));
}
