//! The rule files. Written by `cargo xtask list`; do not edit.

use crate::catalogue::File;

#[path = "rules/motion/all_one_way.rs"]
pub mod all_one_way;
#[path = "rules/dissonance/anticipation.rs"]
pub mod anticipation;
#[path = "rules/dissonance/appoggiatura.rs"]
pub mod appoggiatura;
#[path = "rules/line/augmented_interval.rs"]
pub mod augmented_interval;
#[path = "rules/dissonance/broken_ties.rs"]
pub mod broken_ties;
#[path = "rules/dissonance/cambiata.rs"]
pub mod cambiata;
#[path = "rules/line/chromatic_semitone.rs"]
pub mod chromatic_semitone;
#[path = "rules/dissonance/clash_together.rs"]
pub mod clash_together;
#[path = "rules/cadence/closing_interval.rs"]
pub mod closing_interval;
#[path = "rules/range/compass.rs"]
pub mod compass;
#[path = "rules/dissonance/consonant_fourth.rs"]
pub mod consonant_fourth;
#[path = "rules/motion/contrary_fifths.rs"]
pub mod contrary_fifths;
#[path = "rules/motion/contrary_octaves.rs"]
pub mod contrary_octaves;
#[path = "rules/motion/crossing.rs"]
pub mod crossing;
#[path = "rules/dissonance/diminished_fifth.rs"]
pub mod diminished_fifth;
#[path = "rules/line/diminished_interval.rs"]
pub mod diminished_interval;
#[path = "rules/motion/direct_fifths.rs"]
pub mod direct_fifths;
#[path = "rules/motion/direct_octaves.rs"]
pub mod direct_octaves;
#[path = "rules/motion/direct_unisons.rs"]
pub mod direct_unisons;
#[path = "rules/dissonance/double_neighbour.rs"]
pub mod double_neighbour;
#[path = "rules/dissonance/escape_note.rs"]
pub mod escape_note;
#[path = "rules/dissonance/free_dissonance.rs"]
pub mod free_dissonance;
#[path = "rules/line/leap_beyond_octave.rs"]
pub mod leap_beyond_octave;
#[path = "rules/line/leap_unrecovered.rs"]
pub mod leap_unrecovered;
#[path = "rules/line/leaps_one_way.rs"]
pub mod leaps_one_way;
#[path = "rules/writing/licence_idle.rs"]
pub mod licence_idle;
#[path = "rules/dissonance/long_dissonance.rs"]
pub mod long_dissonance;
#[path = "rules/dissonance/neighbour_note.rs"]
pub mod neighbour_note;
#[path = "rules/writing/octave_doubt.rs"]
pub mod octave_doubt;
#[path = "rules/sonority/opening_interval.rs"]
pub mod opening_interval;
#[path = "rules/dissonance/ornamented_resolution.rs"]
pub mod ornamented_resolution;
#[path = "rules/motion/overlap.rs"]
pub mod overlap;
#[path = "rules/motion/parallel_fifths.rs"]
pub mod parallel_fifths;
#[path = "rules/motion/parallel_octaves.rs"]
pub mod parallel_octaves;
#[path = "rules/motion/parallel_unisons.rs"]
pub mod parallel_unisons;
#[path = "rules/dissonance/passing_note.rs"]
pub mod passing_note;
#[path = "rules/dissonance/pedal.rs"]
pub mod pedal;
#[path = "rules/writing/reading.rs"]
pub mod reading;
#[path = "rules/line/repeated_note.rs"]
pub mod repeated_note;
#[path = "rules/dissonance/resolution_sounding.rs"]
pub mod resolution_sounding;
#[path = "rules/dissonance/retardation.rs"]
pub mod retardation;
#[path = "rules/line/seventh_leap.rs"]
pub mod seventh_leap;
#[path = "rules/motion/similar_leaps.rs"]
pub mod similar_leaps;
#[path = "rules/dissonance/six_five_exchange.rs"]
pub mod six_five_exchange;
#[path = "rules/line/sixth_leap.rs"]
pub mod sixth_leap;
#[path = "rules/sonority/spacing.rs"]
pub mod spacing;
#[path = "rules/species/species_rhythm.rs"]
pub mod species_rhythm;
#[path = "rules/dissonance/suspension_chain.rs"]
pub mod suspension_chain;
#[path = "rules/dissonance/suspension_kind.rs"]
pub mod suspension_kind;
#[path = "rules/dissonance/suspension_position.rs"]
pub mod suspension_position;
#[path = "rules/dissonance/suspension_preparation.rs"]
pub mod suspension_preparation;
#[path = "rules/dissonance/suspension_resolution.rs"]
pub mod suspension_resolution;
#[path = "rules/sonority/third_missing.rs"]
pub mod third_missing;
#[path = "rules/motion/unequal_fifths.rs"]
pub mod unequal_fifths;
#[path = "rules/writing/unwritten.rs"]
pub mod unwritten;
#[path = "rules/dissonance/upper_clash.rs"]
pub mod upper_clash;
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
        family: "dissonance",
        stem: "anticipation",
        rule: &anticipation::RULE,
        text: include_str!("rules/dissonance/anticipation.rs"),
    },
    File {
        family: "dissonance",
        stem: "appoggiatura",
        rule: &appoggiatura::RULE,
        text: include_str!("rules/dissonance/appoggiatura.rs"),
    },
    File {
        family: "dissonance",
        stem: "broken_ties",
        rule: &broken_ties::RULE,
        text: include_str!("rules/dissonance/broken_ties.rs"),
    },
    File {
        family: "dissonance",
        stem: "cambiata",
        rule: &cambiata::RULE,
        text: include_str!("rules/dissonance/cambiata.rs"),
    },
    File {
        family: "dissonance",
        stem: "clash_together",
        rule: &clash_together::RULE,
        text: include_str!("rules/dissonance/clash_together.rs"),
    },
    File {
        family: "dissonance",
        stem: "consonant_fourth",
        rule: &consonant_fourth::RULE,
        text: include_str!("rules/dissonance/consonant_fourth.rs"),
    },
    File {
        family: "dissonance",
        stem: "diminished_fifth",
        rule: &diminished_fifth::RULE,
        text: include_str!("rules/dissonance/diminished_fifth.rs"),
    },
    File {
        family: "dissonance",
        stem: "double_neighbour",
        rule: &double_neighbour::RULE,
        text: include_str!("rules/dissonance/double_neighbour.rs"),
    },
    File {
        family: "dissonance",
        stem: "escape_note",
        rule: &escape_note::RULE,
        text: include_str!("rules/dissonance/escape_note.rs"),
    },
    File {
        family: "dissonance",
        stem: "free_dissonance",
        rule: &free_dissonance::RULE,
        text: include_str!("rules/dissonance/free_dissonance.rs"),
    },
    File {
        family: "dissonance",
        stem: "long_dissonance",
        rule: &long_dissonance::RULE,
        text: include_str!("rules/dissonance/long_dissonance.rs"),
    },
    File {
        family: "dissonance",
        stem: "neighbour_note",
        rule: &neighbour_note::RULE,
        text: include_str!("rules/dissonance/neighbour_note.rs"),
    },
    File {
        family: "dissonance",
        stem: "ornamented_resolution",
        rule: &ornamented_resolution::RULE,
        text: include_str!("rules/dissonance/ornamented_resolution.rs"),
    },
    File {
        family: "dissonance",
        stem: "passing_note",
        rule: &passing_note::RULE,
        text: include_str!("rules/dissonance/passing_note.rs"),
    },
    File {
        family: "dissonance",
        stem: "pedal",
        rule: &pedal::RULE,
        text: include_str!("rules/dissonance/pedal.rs"),
    },
    File {
        family: "dissonance",
        stem: "resolution_sounding",
        rule: &resolution_sounding::RULE,
        text: include_str!("rules/dissonance/resolution_sounding.rs"),
    },
    File {
        family: "dissonance",
        stem: "retardation",
        rule: &retardation::RULE,
        text: include_str!("rules/dissonance/retardation.rs"),
    },
    File {
        family: "dissonance",
        stem: "six_five_exchange",
        rule: &six_five_exchange::RULE,
        text: include_str!("rules/dissonance/six_five_exchange.rs"),
    },
    File {
        family: "dissonance",
        stem: "suspension_chain",
        rule: &suspension_chain::RULE,
        text: include_str!("rules/dissonance/suspension_chain.rs"),
    },
    File {
        family: "dissonance",
        stem: "suspension_kind",
        rule: &suspension_kind::RULE,
        text: include_str!("rules/dissonance/suspension_kind.rs"),
    },
    File {
        family: "dissonance",
        stem: "suspension_position",
        rule: &suspension_position::RULE,
        text: include_str!("rules/dissonance/suspension_position.rs"),
    },
    File {
        family: "dissonance",
        stem: "suspension_preparation",
        rule: &suspension_preparation::RULE,
        text: include_str!("rules/dissonance/suspension_preparation.rs"),
    },
    File {
        family: "dissonance",
        stem: "suspension_resolution",
        rule: &suspension_resolution::RULE,
        text: include_str!("rules/dissonance/suspension_resolution.rs"),
    },
    File {
        family: "dissonance",
        stem: "upper_clash",
        rule: &upper_clash::RULE,
        text: include_str!("rules/dissonance/upper_clash.rs"),
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
        stem: "third_missing",
        rule: &third_missing::RULE,
        text: include_str!("rules/sonority/third_missing.rs"),
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
