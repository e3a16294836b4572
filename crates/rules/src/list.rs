//! The rule files. Written by `cargo xtask list`; do not edit.

use crate::catalogue::File;

#[path = "rules/motion/all_one_way.rs"]
pub mod all_one_way;
#[path = "rules/line/augmented_interval.rs"]
pub mod augmented_interval;
#[path = "rules/motion/barline_consecutives.rs"]
pub mod barline_consecutives;
#[path = "rules/motion/beat_consecutives.rs"]
pub mod beat_consecutives;
#[path = "rules/line/chromatic_semitone.rs"]
pub mod chromatic_semitone;
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
#[path = "rules/motion/delayed_consecutives.rs"]
pub mod delayed_consecutives;
#[path = "rules/line/diminished_interval.rs"]
pub mod diminished_interval;
#[path = "rules/motion/direct_fifths.rs"]
pub mod direct_fifths;
#[path = "rules/motion/direct_octaves.rs"]
pub mod direct_octaves;
#[path = "rules/motion/direct_unisons.rs"]
pub mod direct_unisons;
#[path = "rules/motion/dissonance_into_perfect.rs"]
pub mod dissonance_into_perfect;
#[path = "rules/motion/downbeat_consecutives.rs"]
pub mod downbeat_consecutives;
#[path = "rules/sonority/few_imperfects.rs"]
pub mod few_imperfects;
#[path = "rules/line/leap_beyond_octave.rs"]
pub mod leap_beyond_octave;
#[path = "rules/line/leap_unrecovered.rs"]
pub mod leap_unrecovered;
#[path = "rules/motion/leaps_into_perfect.rs"]
pub mod leaps_into_perfect;
#[path = "rules/line/leaps_one_way.rs"]
pub mod leaps_one_way;
#[path = "rules/writing/licence_idle.rs"]
pub mod licence_idle;
#[path = "rules/sonority/low_crowding.rs"]
pub mod low_crowding;
#[path = "rules/motion/mi_contra_fa.rs"]
pub mod mi_contra_fa;
#[path = "rules/writing/octave_doubt.rs"]
pub mod octave_doubt;
#[path = "rules/motion/offbeat_consecutives.rs"]
pub mod offbeat_consecutives;
#[path = "rules/sonority/opening_interval.rs"]
pub mod opening_interval;
#[path = "rules/motion/ottava_battuta.rs"]
pub mod ottava_battuta;
#[path = "rules/motion/overlap.rs"]
pub mod overlap;
#[path = "rules/motion/parallel_dissonances.rs"]
pub mod parallel_dissonances;
#[path = "rules/motion/parallel_fifths.rs"]
pub mod parallel_fifths;
#[path = "rules/motion/parallel_fourths.rs"]
pub mod parallel_fourths;
#[path = "rules/motion/parallel_octaves.rs"]
pub mod parallel_octaves;
#[path = "rules/motion/parallel_unisons.rs"]
pub mod parallel_unisons;
#[path = "rules/motion/perfect_to_perfect.rs"]
pub mod perfect_to_perfect;
#[path = "rules/writing/reading.rs"]
pub mod reading;
#[path = "rules/line/repeated_note.rs"]
pub mod repeated_note;
#[path = "rules/motion/running_imperfects.rs"]
pub mod running_imperfects;
#[path = "rules/line/seventh_leap.rs"]
pub mod seventh_leap;
#[path = "rules/motion/similar_leaps.rs"]
pub mod similar_leaps;
#[path = "rules/line/sixth_leap.rs"]
pub mod sixth_leap;
#[path = "rules/sonority/spacing.rs"]
pub mod spacing;
#[path = "rules/species/species_rhythm.rs"]
pub mod species_rhythm;
#[path = "rules/motion/unequal_fifths.rs"]
pub mod unequal_fifths;
#[path = "rules/sonority/unison_inside.rs"]
pub mod unison_inside;
#[path = "rules/writing/unwritten.rs"]
pub mod unwritten;
#[path = "rules/writing/voice_silent.rs"]
pub mod voice_silent;

pub(crate) static FILES: &[File] = &[
    File {
        family: "cadence",
        stem: "closing_interval",
        rule: &closing_interval::RULE,
        text: include_str!("rules/cadence/closing_interval.rs"),
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
        family: "motion",
        stem: "all_one_way",
        rule: &all_one_way::RULE,
        text: include_str!("rules/motion/all_one_way.rs"),
    },
    File {
        family: "motion",
        stem: "barline_consecutives",
        rule: &barline_consecutives::RULE,
        text: include_str!("rules/motion/barline_consecutives.rs"),
    },
    File {
        family: "motion",
        stem: "beat_consecutives",
        rule: &beat_consecutives::RULE,
        text: include_str!("rules/motion/beat_consecutives.rs"),
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
        stem: "delayed_consecutives",
        rule: &delayed_consecutives::RULE,
        text: include_str!("rules/motion/delayed_consecutives.rs"),
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
        stem: "dissonance_into_perfect",
        rule: &dissonance_into_perfect::RULE,
        text: include_str!("rules/motion/dissonance_into_perfect.rs"),
    },
    File {
        family: "motion",
        stem: "downbeat_consecutives",
        rule: &downbeat_consecutives::RULE,
        text: include_str!("rules/motion/downbeat_consecutives.rs"),
    },
    File {
        family: "motion",
        stem: "leaps_into_perfect",
        rule: &leaps_into_perfect::RULE,
        text: include_str!("rules/motion/leaps_into_perfect.rs"),
    },
    File {
        family: "motion",
        stem: "mi_contra_fa",
        rule: &mi_contra_fa::RULE,
        text: include_str!("rules/motion/mi_contra_fa.rs"),
    },
    File {
        family: "motion",
        stem: "offbeat_consecutives",
        rule: &offbeat_consecutives::RULE,
        text: include_str!("rules/motion/offbeat_consecutives.rs"),
    },
    File {
        family: "motion",
        stem: "ottava_battuta",
        rule: &ottava_battuta::RULE,
        text: include_str!("rules/motion/ottava_battuta.rs"),
    },
    File {
        family: "motion",
        stem: "overlap",
        rule: &overlap::RULE,
        text: include_str!("rules/motion/overlap.rs"),
    },
    File {
        family: "motion",
        stem: "parallel_dissonances",
        rule: &parallel_dissonances::RULE,
        text: include_str!("rules/motion/parallel_dissonances.rs"),
    },
    File {
        family: "motion",
        stem: "parallel_fifths",
        rule: &parallel_fifths::RULE,
        text: include_str!("rules/motion/parallel_fifths.rs"),
    },
    File {
        family: "motion",
        stem: "parallel_fourths",
        rule: &parallel_fourths::RULE,
        text: include_str!("rules/motion/parallel_fourths.rs"),
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
        stem: "perfect_to_perfect",
        rule: &perfect_to_perfect::RULE,
        text: include_str!("rules/motion/perfect_to_perfect.rs"),
    },
    File {
        family: "motion",
        stem: "running_imperfects",
        rule: &running_imperfects::RULE,
        text: include_str!("rules/motion/running_imperfects.rs"),
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
        family: "sonority",
        stem: "few_imperfects",
        rule: &few_imperfects::RULE,
        text: include_str!("rules/sonority/few_imperfects.rs"),
    },
    File {
        family: "sonority",
        stem: "low_crowding",
        rule: &low_crowding::RULE,
        text: include_str!("rules/sonority/low_crowding.rs"),
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
        family: "sonority",
        stem: "unison_inside",
        rule: &unison_inside::RULE,
        text: include_str!("rules/sonority/unison_inside.rs"),
    },
    File {
        family: "species",
        stem: "species_rhythm",
        rule: &species_rhythm::RULE,
        text: include_str!("rules/species/species_rhythm.rs"),
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
