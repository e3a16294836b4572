//! Every step of two voices in the check values, field by field. The values come from an
//! independent computation, done in two ways.
#![allow(clippy::unwrap_used, clippy::panic, clippy::print_stderr)]

mod common;

use common::{Report, check_values, int, rows, small, smalls};
use partwright_space::{
    Consecutive, Family, Gap, Leg, Motion, Octave, Place, StripPoint, Way, crossed,
};
use serde_json::Value;

/// White keys above C, in semitones.
const WHITE: [i32; 7] = [0, 2, 4, 5, 7, 9, 11];

/// The check values count semitones from C4 = 48 (letters from C4 = 28); ours has C4 = 60.
fn place(spelled: &Value) -> Place {
    let [step, alteration] = smalls(spelled)[..] else {
        panic!("not a spelled pitch: {spelled}")
    };
    let white = WHITE[usize::try_from(step.rem_euclid(7)).unwrap()];
    Place {
        step,
        semitone: white + 12 * step.div_euclid(7) + alteration + 12,
    }
}

fn motion(class: Motion) -> &'static str {
    match class {
        Motion::Still => "still",
        Motion::Oblique => "oblique",
        Motion::Parallel => "parallel",
        Motion::Similar => "similar",
        Motion::Contrary => "contrary",
    }
}

fn family(gap: Gap) -> Option<&'static str> {
    gap.family().map(|family| match family {
        Family::Octave => "1",
        Family::Fifth => "5",
    })
}

fn consecutive(leg: Leg) -> Option<&'static str> {
    leg.consecutive().map(|found| match found {
        Consecutive::Same(_) => "consecutive-same-direction",
        Consecutive::Contrary(_) => "consecutive-contrary",
        Consecutive::Repeat(_) => "repeat-oblique-octave",
        Consecutive::Direct(_) => "direct",
        Consecutive::Unequal(_, Way::IntoPerfect) => "unequal-to-perfect",
        Consecutive::Unequal(_, Way::OutOfPerfect) => "perfect-to-unequal",
    })
}

fn compare(report: &mut Report, row: &Value, name: &str) {
    let spelled = row["spelled"].as_array().unwrap();
    let [x, y, x_after, y_after] = [0, 1, 2, 3].map(|i| place(&spelled[i]));
    let leg = Leg {
        lower: (x, x_after),
        upper: (y, y_after),
    };
    let semis: Vec<i32> = [x, y, x_after, y_after]
        .iter()
        .map(|p| p.semitone - 12)
        .collect();
    report.same(name, "semis", &semis, &smalls(&row["semis"]));

    let (semitones, steps) = (leg.semitones(), leg.steps());
    report.same(
        name,
        "d_semi",
        &vec![semitones.dx, semitones.dy],
        &smalls(&row["d_semi"]),
    );
    report.same(
        name,
        "d_step",
        &vec![steps.dx, steps.dy],
        &smalls(&row["d_step"]),
    );
    report.same(
        name,
        "along_semi",
        &semitones.along(),
        &small(&row["along_semi"]),
    );
    report.same(
        name,
        "across_semi",
        &semitones.across(),
        &small(&row["across_semi"]),
    );
    report.same(
        name,
        "along_step",
        &steps.along(),
        &small(&row["along_step"]),
    );
    report.same(
        name,
        "across_step",
        &steps.across(),
        &small(&row["across_step"]),
    );

    let mut word = |field: &str, got: Option<&str>| {
        report.same(name, field, &got, &row[field].as_str());
    };
    word("class_semi", Some(motion(semitones.class())));
    word("class_step", Some(motion(steps.class())));
    word("class_rule", Some(motion(leg.motion())));
    word("perfect_before", family(leg.before()));
    word("perfect_after", family(leg.after()));
    word("consecutive", consecutive(leg));

    let mut flag = |field: &str, got: bool| {
        report.same(name, field, &Some(got), &row[field].as_bool());
    };
    flag("pc_parallel", leg.parallel_in_classes());
    flag("crossed_after", crossed(leg.after()));
    flag("crossing_event", leg.crosses());
    flag("overlap", leg.overlaps());
    flag("exchange", leg.exchanges());
    flag("pc_exchange", leg.exchanges_classes());
    flag("enters_unison", leg.enters_unison());
    flag("leaves_unison", leg.leaves_unison());

    report.same(
        name,
        "mirror_hits",
        &i64::from(leg.mirrors_passed()),
        &int(&row["mirror_hits"]),
    );
    for (field, x, y) in [("mobius_before", x, y), ("mobius_after", x_after, y_after)] {
        let at = StripPoint::under(Octave::SEMITONES, x.semitone, y.semitone);
        let got = [at.u(), at.v(), at.height(), at.twice_from_centre()];
        let want = ["u", "v", "h", "w2"].map(|key| small(&row[field][key]));
        report.same(name, field, &got, &want);
    }
}

fn section(section: &str, least: usize) {
    let Some(values) = check_values() else { return };
    let rows = rows(&values, section);
    assert!(rows.len() >= least, "{section}: only {} rows", rows.len());
    let mut report = Report::default();
    for (i, row) in rows.iter().enumerate() {
        let name = match row["label"].as_str() {
            Some(label) => format!("{section}, {label}"),
            None => format!("{section}, row {i}"),
        };
        compare(&mut report, row, &name);
    }
    report.done();
}

#[test]
fn named_steps() {
    section("motion_named", 45);
}

#[test]
fn random_steps() {
    section("random_motion", 450);
}

#[test]
fn steps_between_perfect_intervals() {
    section("perfect_sweep", 250);
}
