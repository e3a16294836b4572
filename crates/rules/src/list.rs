//! The rule files. Written by `cargo xtask list`; do not edit.

use crate::catalogue::File;

#[path = "rules/range/compass.rs"]
pub mod compass;
#[path = "rules/motion/contrary_fifths.rs"]
pub mod contrary_fifths;
#[path = "rules/motion/contrary_octaves.rs"]
pub mod contrary_octaves;
#[path = "rules/motion/crossing.rs"]
pub mod crossing;
#[path = "rules/motion/direct_fifths.rs"]
pub mod direct_fifths;
#[path = "rules/motion/direct_octaves.rs"]
pub mod direct_octaves;
#[path = "rules/motion/direct_unisons.rs"]
pub mod direct_unisons;
#[path = "rules/writing/octave_doubt.rs"]
pub mod octave_doubt;
#[path = "rules/motion/overlap.rs"]
pub mod overlap;
#[path = "rules/motion/parallel_fifths.rs"]
pub mod parallel_fifths;
#[path = "rules/motion/parallel_octaves.rs"]
pub mod parallel_octaves;
#[path = "rules/motion/parallel_unisons.rs"]
pub mod parallel_unisons;
#[path = "rules/writing/reading.rs"]
pub mod reading;
#[path = "rules/motion/unequal_fifths.rs"]
pub mod unequal_fifths;
#[path = "rules/writing/unwritten.rs"]
pub mod unwritten;
#[path = "rules/writing/voice_silent.rs"]
pub mod voice_silent;

pub(crate) static FILES: &[File] = &[
    File {
        family: "motion",
        stem: "contrary_fifths",
        rule: &contrary_fifths::RULE,
        text: include_str!("rules/motion/contrary_fifths.rs"),
    },
    File {
        family: "motion",
        stem: "contrary_octaves",
        rule: &contrary_octaves::RULE,
        text: include_str!("rules/motion/contrary_octaves.rs"),
    },
    File {
        family: "motion",
        stem: "crossing",
        rule: &crossing::RULE,
        text: include_str!("rules/motion/crossing.rs"),
    },
    File {
        family: "motion",
        stem: "direct_fifths",
        rule: &direct_fifths::RULE,
        text: include_str!("rules/motion/direct_fifths.rs"),
    },
    File {
        family: "motion",
        stem: "direct_octaves",
        rule: &direct_octaves::RULE,
        text: include_str!("rules/motion/direct_octaves.rs"),
    },
    File {
        family: "motion",
        stem: "direct_unisons",
        rule: &direct_unisons::RULE,
        text: include_str!("rules/motion/direct_unisons.rs"),
    },
    File {
        family: "motion",
        stem: "overlap",
        rule: &overlap::RULE,
        text: include_str!("rules/motion/overlap.rs"),
    },
    File {
        family: "motion",
        stem: "parallel_fifths",
        rule: &parallel_fifths::RULE,
        text: include_str!("rules/motion/parallel_fifths.rs"),
    },
    File {
        family: "motion",
        stem: "parallel_octaves",
        rule: &parallel_octaves::RULE,
        text: include_str!("rules/motion/parallel_octaves.rs"),
    },
    File {
        family: "motion",
        stem: "parallel_unisons",
        rule: &parallel_unisons::RULE,
        text: include_str!("rules/motion/parallel_unisons.rs"),
    },
    File {
        family: "motion",
        stem: "unequal_fifths",
        rule: &unequal_fifths::RULE,
        text: include_str!("rules/motion/unequal_fifths.rs"),
    },
    File {
        family: "range",
        stem: "compass",
        rule: &compass::RULE,
        text: include_str!("rules/range/compass.rs"),
    },
    File {
        family: "writing",
        stem: "octave_doubt",
        rule: &octave_doubt::RULE,
        text: include_str!("rules/writing/octave_doubt.rs"),
    },
    File {
        family: "writing",
        stem: "reading",
        rule: &reading::RULE,
        text: include_str!("rules/writing/reading.rs"),
    },
    File {
        family: "writing",
        stem: "unwritten",
        rule: &unwritten::RULE,
        text: include_str!("rules/writing/unwritten.rs"),
    },
    File {
        family: "writing",
        stem: "voice_silent",
        rule: &voice_silent::RULE,
        text: include_str!("rules/writing/voice_silent.rs"),
    },
];
