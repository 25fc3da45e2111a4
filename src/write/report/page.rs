//! The page.

use maud::{DOCTYPE, Markup, PreEscaped, html};

use super::{Chain, Report};
use crate::write::drawing::{SectionShape, Setting, angle_text, chart, length_text, svg, trimmed};
use crate::write::markup::clean;
use crate::write::picture::picture;
use crate::write::record::CheckFigures;
use crate::write::sheet::{figure, small};

const STYLE: &str = include_str!("style.css");

/// The report as HTML, ending in a line feed.
pub fn page(report: &Report<'_>) -> String {
    let record = report.record;
    let name = clean(&record.name);
    let out = record.checks.iter().filter(|check| !check.ok).count();
    let markup = html! {
        (DOCTYPE)
        html lang="en" {
            head {
                meta charset="utf-8";
                meta name="viewport" content="width=device-width, initial-scale=1";
                meta http-equiv="Content-Security-Policy" content="default-src 'none'; style-src 'unsafe-inline'; img-src data:";
                title { (name) " – wing report" }
                style { (PreEscaped(STYLE)) }
            }
            body {
                header {
                    h1 { bdi { (name) } }
                    p.lead { "Wing report. Lengths in " (record.unit) ", angles in degrees; x aft, y to starboard, z up." }
                    @if out == 0 {
                        p.verdict { "✓ All " (record.checks.len()) " figures asked for were measured on the solid" }
                    } @else {
                        p.verdict.out { "✗ " (out) " of " (record.checks.len()) " figures are out of tolerance" }
                    }
                    (summary(report))
                }
                main {
                    (shown(report, &name))
                    (proof(&record.checks))
                    @for chain in &report.chains { (steps(chain)) }
                    (sections(report))
                    section aria-labelledby="notes" {
                        h2 id="notes" { "Notes and cautions" }
                        ul { @for note in &record.notes { li { bdi { (clean(note)) } } } }
                    }
                }
                footer {
                    p {
                        "Made by spanwise from the wing's exact geometry"
                        @if let Some(date) = report.date { ", " (date) }
                        "."
                    }
                }
            }
        }
    };
    let mut page = markup.into_string();
    page.push('\n');
    page
}

fn summary(report: &Report<'_>) -> Markup {
    let (r, b, unit) = (
        &report.record.reference,
        &report.record.built,
        &report.record.unit,
    );
    let length = |value: f64| format!("{} {unit}", length_text(value, report.unit));
    let entries = [
        ("reference area", format!("{} {unit}²", figure(r.area))),
        ("reference span", length(r.span)),
        ("aspect ratio", trimmed(r.aspect_ratio, 3)),
        ("taper ratio", trimmed(r.taper_ratio, 4)),
        ("mean aerodynamic chord", length(r.mac.length)),
        ("incidence there", angle_text(r.mac.incidence)),
        ("built volume", format!("{} {unit}³", figure(b.volume))),
        ("wetted area", format!("{} {unit}²", figure(b.wetted_area))),
    ];
    html! {
        dl.figures { @for (name, value) in &entries { div { dt { (name) } dd { (value) } } } }
    }
}

fn shown(report: &Report<'_>, name: &str) -> Markup {
    let record = report.record;
    let shaded = picture(
        report.meshes,
        report.reference,
        name,
        Setting::Inline { prefix: "picture" },
    );
    let drawing = svg(report.drawing, Setting::Inline { prefix: "drawing" });
    html! {
        section aria-labelledby="picture" {
            h2 id="picture" { "The solid" }
            figure {
                (PreEscaped(shaded))
                figcaption {
                    (record.mesh.facets) " facets within " (figure(record.mesh.max_deviation)) " " (record.unit)
                    " of the exact surface, with the quarter-chord line (long dashes), the mean aerodynamic chord (wide) and lines \
                     of the spec (short dashes). " (record.built.solids)
                    @if record.built.solids == 1 { " solid" } @else { " solids" } ", " (record.built.faces) " faces."
                }
            }
        }
        section aria-labelledby="drawing" {
            h2 id="drawing" { "Drawing" }
            figure {
                div.scroll.sheet-box tabindex="0" role="region" aria-label="Drawing, may be scrolled sideways" {
                    (PreEscaped(drawing))
                }
                figcaption { "Sheet " (report.drawing.format) "; its scale holds for the drawing's own file." }
            }
        }
    }
}

fn proof(checks: &[CheckFigures]) -> Markup {
    html! {
        section aria-labelledby="proof" {
            h2 id="proof" { "Asked and measured" }
            div.scroll tabindex="0" role="region" aria-label="Table of checks, may be scrolled sideways" {
                table {
                    caption { "What was asked for beside what was measured on the finished solid." }
                    thead {
                        tr {
                            th scope="col" { "quantity" }
                            th scope="col" { "asked" }
                            th scope="col" { "measured" }
                            th scope="col" { "deviation" }
                            th scope="col" { "allowed" }
                            th scope="col" { "result" }
                        }
                    }
                    tbody {
                        @for check in checks {
                            tr {
                                th scope="row" { (check.quantity) }
                                td { (figure(check.asked)) " " (check.unit) }
                                td { (figure(check.built)) " " (check.unit) }
                                // what is mere rounding differs from machine to machine and says nothing
                                td { (small(if check.deviation.abs() < 1e-7 * check.allowed { 0.0 } else { check.deviation })) }
                                td { (small(check.allowed)) }
                                @if check.ok { td { "✓ as asked" } } @else { td.out-cell { "✗ out" } }
                            }
                        }
                    }
                }
            }
        }
    }
}

fn steps(chain: &Chain) -> Markup {
    html! {
        section {
            h2 { (chain.title) }
            div.scroll tabindex="0" role="region" aria-label={ (chain.title) ", may be scrolled sideways" } {
                table {
                    caption { "How the figures follow from each other." }
                    thead {
                        tr {
                            th scope="col" { "figure" }
                            th scope="col" { "value" }
                            th.text scope="col" { "from" }
                        }
                    }
                    tbody {
                        @for step in &chain.steps {
                            tr {
                                th scope="row" { (step.name) }
                                td { (step.value) }
                                td.text { (step.ground) }
                            }
                        }
                    }
                }
            }
        }
    }
}

fn sections(report: &Report<'_>) -> Markup {
    const PREFIXES: [&str; 3] = ["section-root", "section-mac", "section-tip"];
    let fit = &report.record.section_fit;
    html! {
        section aria-labelledby="sections" {
            h2 id="sections" { "Sections" }
            p {
                "Fitted within " (small(fit.max_deviation)) " of the chord of their definition, with "
                (fit.upper_points) " + " (fit.lower_points) " control points. Shown at their incidence, each to its own scale."
            }
            div.sections {
                @for (section, prefix) in report.sections.iter().zip(PREFIXES) { (one(report, section, prefix)) }
            }
        }
    }
}

fn one(report: &Report<'_>, section: &SectionShape, prefix: &'static str) -> Markup {
    let unit = &report.record.unit;
    let percent = |value: f64| trimmed(100.0 * value, 2);
    html! {
        figure {
            (PreEscaped(svg(&chart(section, 120.0), Setting::Inline { prefix })))
            figcaption {
                (section.place) ": " bdi { (clean(&section.airfoil)) } ", chord "
                (length_text(section.chord / report.unit, report.unit)) " " (unit)
                ", incidence " (angle_text(section.incidence.to_degrees()))
                ", thickness " (percent(section.thickness[0])) " % at " (trimmed(100.0 * section.thickness[1], 1)) " %"
                @if section.camber[1] > 0.0 {
                    ", camber " (percent(section.camber[0])) " % at " (trimmed(100.0 * section.camber[1], 1)) " %"
                } @else { ", no camber" }
                ". Fit within " (small(report.record.section_fit.max_deviation)) " of the chord, "
                (figure(report.record.section_fit.max_deviation * section.chord * 1000.0)) " µm here."
            }
        }
    }
}
