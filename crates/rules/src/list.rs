//! The rule files. Written by `cargo xtask list`; do not edit.

use crate::catalogue::File;

#[path = "rules/motion/all_one_way.rs"]
pub mod all_one_way;
#[path = "rules/line/augmented_interval.rs"]
pub mod augmented_interval;
#[path = "rules/species/cantus.rs"]
pub mod cantus;
#[path = "rules/line/chromatic_semitone.rs"]
pub mod chromatic_semitone;
#[path = "rules/cadence/closing_approach.rs"]
pub mod closing_approach;
#[path = "rules/cadence/closing_interval.rs"]
pub mod closing_interval;
#[path = "rules/range/compass.rs"]
pub mod compass;
#[path = "rules/motion/contrary_fifths.rs"]
pub mod contrary_fifths;
#[path = "rules/motion/contrary_octaves.rs"]
pub mod contrary_octaves;
#[path = "rules/motion/crossing.rs"]
pub mod crossing;
#[path = "rules/line/diminished_interval.rs"]
pub mod diminished_interval;
#[path = "rules/motion/direct_fifths.rs"]
pub mod direct_fifths;
#[path = "rules/motion/direct_octaves.rs"]
pub mod direct_octaves;
#[path = "rules/motion/direct_unisons.rs"]
pub mod direct_unisons;
#[path = "rules/species/eighth_notes.rs"]
pub mod eighth_notes;
#[path = "rules/species/florid_rhythm.rs"]
pub mod florid_rhythm;
#[path = "rules/line/foreign_accidental.rs"]
pub mod foreign_accidental;
#[path = "rules/line/leap_beyond_octave.rs"]
pub mod leap_beyond_octave;
#[path = "rules/line/leap_unrecovered.rs"]
pub mod leap_unrecovered;
#[path = "rules/line/leaps_one_way.rs"]
pub mod leaps_one_way;
#[path = "rules/writing/licence_idle.rs"]
pub mod licence_idle;
#[path = "rules/range/mode_ambitus.rs"]
pub mod mode_ambitus;
#[path = "rules/writing/octave_doubt.rs"]
pub mod octave_doubt;
#[path = "rules/sonority/opening_interval.rs"]
pub mod opening_interval;
#[path = "rules/motion/overlap.rs"]
pub mod overlap;
#[path = "rules/motion/parallel_fifths.rs"]
pub mod parallel_fifths;
#[path = "rules/motion/parallel_octaves.rs"]
pub mod parallel_octaves;
#[path = "rules/motion/parallel_unisons.rs"]
pub mod parallel_unisons;
#[path = "rules/line/quarter_leaps.rs"]
pub mod quarter_leaps;
#[path = "rules/cadence/raised_seventh.rs"]
pub mod raised_seventh;
#[path = "rules/writing/reading.rs"]
pub mod reading;
#[path = "rules/line/repeated_note.rs"]
pub mod repeated_note;
#[path = "rules/line/seventh_leap.rs"]
pub mod seventh_leap;
#[path = "rules/motion/similar_leaps.rs"]
pub mod similar_leaps;
#[path = "rules/line/sixth_leap.rs"]
pub mod sixth_leap;
#[path = "rules/sonority/spacing.rs"]
pub mod spacing;
#[path = "rules/cadence/species_cadence.rs"]
pub mod species_cadence;
#[path = "rules/species/species_rhythm.rs"]
pub mod species_rhythm;
#[path = "rules/species/syncopation.rs"]
pub mod syncopation;
#[path = "rules/motion/unequal_fifths.rs"]
pub mod unequal_fifths;
#[path = "rules/writing/unwritten.rs"]
pub mod unwritten;
#[path = "rules/line/vocal_rhythm.rs"]
pub mod vocal_rhythm;
#[path = "rules/writing/voice_silent.rs"]
pub mod voice_silent;

pub(crate) static FILES: &[File] = &[
    File {
        family: "cadence",
        stem: "closing_approach",
        rule: &closing_approach::RULE,
        text: include_str!("rules/cadence/closing_approach.rs"),
    },
    File {
        family: "cadence",
        stem: "closing_interval",
        rule: &closing_interval::RULE,
        text: include_str!("rules/cadence/closing_interval.rs"),
    },
    File {
        family: "cadence",
        stem: "raised_seventh",
        rule: &raised_seventh::RULE,
        text: include_str!("rules/cadence/raised_seventh.rs"),
    },
    File {
        family: "cadence",
        stem: "species_cadence",
        rule: &species_cadence::RULE,
        text: include_str!("rules/cadence/species_cadence.rs"),
    },
    File {
        family: "line",
        stem: "augmented_interval",
        rule: &augmented_interval::RULE,
        text: include_str!("rules/line/augmented_interval.rs"),
    },
    File {
        family: "line",
        stem: "chromatic_semitone",
        rule: &chromatic_semitone::RULE,
        text: include_str!("rules/line/chromatic_semitone.rs"),
    },
    File {
        family: "line",
        stem: "diminished_interval",
        rule: &diminished_interval::RULE,
        text: include_str!("rules/line/diminished_interval.rs"),
    },
    File {
        family: "line",
        stem: "foreign_accidental",
        rule: &foreign_accidental::RULE,
        text: include_str!("rules/line/foreign_accidental.rs"),
    },
    File {
        family: "line",
        stem: "leap_beyond_octave",
        rule: &leap_beyond_octave::RULE,
        text: include_str!("rules/line/leap_beyond_octave.rs"),
    },
    File {
        family: "line",
        stem: "leap_unrecovered",
        rule: &leap_unrecovered::RULE,
        text: include_str!("rules/line/leap_unrecovered.rs"),
    },
    File {
        family: "line",
        stem: "leaps_one_way",
        rule: &leaps_one_way::RULE,
        text: include_str!("rules/line/leaps_one_way.rs"),
    },
    File {
        family: "line",
        stem: "quarter_leaps",
        rule: &quarter_leaps::RULE,
        text: include_str!("rules/line/quarter_leaps.rs"),
    },
    File {
        family: "line",
        stem: "repeated_note",
        rule: &repeated_note::RULE,
        text: include_str!("rules/line/repeated_note.rs"),
    },
    File {
        family: "line",
        stem: "seventh_leap",
        rule: &seventh_leap::RULE,
        text: include_str!("rules/line/seventh_leap.rs"),
    },
    File {
        family: "line",
        stem: "sixth_leap",
        rule: &sixth_leap::RULE,
        text: include_str!("rules/line/sixth_leap.rs"),
    },
    File {
        family: "line",
        stem: "vocal_rhythm",
        rule: &vocal_rhythm::RULE,
        text: include_str!("rules/line/vocal_rhythm.rs"),
    },
    File {
        family: "motion",
        stem: "all_one_way",
        rule: &all_one_way::RULE,
        text: include_str!("rules/motion/all_one_way.rs"),
    },
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
        stem: "similar_leaps",
        rule: &similar_leaps::RULE,
        text: include_str!("rules/motion/similar_leaps.rs"),
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
        family: "range",
        stem: "mode_ambitus",
        rule: &mode_ambitus::RULE,
        text: include_str!("rules/range/mode_ambitus.rs"),
    },
    File {
        family: "sonority",
        stem: "opening_interval",
        rule: &opening_interval::RULE,
        text: include_str!("rules/sonority/opening_interval.rs"),
    },
    File {
        family: "sonority",
        stem: "spacing",
        rule: &spacing::RULE,
        text: include_str!("rules/sonority/spacing.rs"),
    },
    File {
        family: "species",
        stem: "cantus",
        rule: &cantus::RULE,
        text: include_str!("rules/species/cantus.rs"),
    },
    File {
        family: "species",
        stem: "eighth_notes",
        rule: &eighth_notes::RULE,
        text: include_str!("rules/species/eighth_notes.rs"),
    },
    File {
        family: "species",
        stem: "florid_rhythm",
        rule: &florid_rhythm::RULE,
        text: include_str!("rules/species/florid_rhythm.rs"),
    },
    File {
        family: "species",
        stem: "species_rhythm",
        rule: &species_rhythm::RULE,
        text: include_str!("rules/species/species_rhythm.rs"),
    },
    File {
        family: "species",
        stem: "syncopation",
        rule: &syncopation::RULE,
        text: include_str!("rules/species/syncopation.rs"),
    },
    File {
        family: "writing",
        stem: "licence_idle",
        rule: &licence_idle::RULE,
        text: include_str!("rules/writing/licence_idle.rs"),
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
