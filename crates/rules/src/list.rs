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
#[path = "rules/motion/barline_consecutives.rs"]
pub mod barline_consecutives;
#[path = "rules/motion/beat_consecutives.rs"]
pub mod beat_consecutives;
#[path = "rules/line/broken_chord.rs"]
pub mod broken_chord;
#[path = "rules/species/cantus.rs"]
pub mod cantus;
#[path = "rules/line/chromatic_semitone.rs"]
pub mod chromatic_semitone;
#[path = "rules/dissonance/clash_together.rs"]
pub mod clash_together;
#[path = "rules/cadence/closing_approach.rs"]
pub mod closing_approach;
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
#[path = "rules/motion/delayed_consecutives.rs"]
pub mod delayed_consecutives;
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
#[path = "rules/motion/dissonance_into_perfect.rs"]
pub mod dissonance_into_perfect;
#[path = "rules/dissonance/double_neighbour.rs"]
pub mod double_neighbour;
#[path = "rules/motion/downbeat_consecutives.rs"]
pub mod downbeat_consecutives;
#[path = "rules/species/eighth_notes.rs"]
pub mod eighth_notes;
#[path = "rules/dissonance/escape_note.rs"]
pub mod escape_note;
#[path = "rules/sonority/few_imperfects.rs"]
pub mod few_imperfects;
#[path = "rules/line/figure_repeated.rs"]
pub mod figure_repeated;
#[path = "rules/species/florid_rhythm.rs"]
pub mod florid_rhythm;
#[path = "rules/line/foreign_accidental.rs"]
pub mod foreign_accidental;
#[path = "rules/dissonance/free_dissonance.rs"]
pub mod free_dissonance;
#[path = "rules/line/high_point_repeated.rs"]
pub mod high_point_repeated;
#[path = "rules/line/high_points_together.rs"]
pub mod high_points_together;
#[path = "rules/line/leap_across_bar.rs"]
pub mod leap_across_bar;
#[path = "rules/line/leap_beyond_octave.rs"]
pub mod leap_beyond_octave;
#[path = "rules/line/leap_from_accent.rs"]
pub mod leap_from_accent;
#[path = "rules/line/leap_unprepared.rs"]
pub mod leap_unprepared;
#[path = "rules/line/leap_unrecovered.rs"]
pub mod leap_unrecovered;
#[path = "rules/motion/leaps_into_perfect.rs"]
pub mod leaps_into_perfect;
#[path = "rules/line/leaps_one_way.rs"]
pub mod leaps_one_way;
#[path = "rules/writing/licence_idle.rs"]
pub mod licence_idle;
#[path = "rules/dissonance/long_dissonance.rs"]
pub mod long_dissonance;
#[path = "rules/sonority/low_crowding.rs"]
pub mod low_crowding;
#[path = "rules/line/melodic_minor.rs"]
pub mod melodic_minor;
#[path = "rules/motion/mi_contra_fa.rs"]
pub mod mi_contra_fa;
#[path = "rules/range/mode_ambitus.rs"]
pub mod mode_ambitus;
#[path = "rules/dissonance/neighbour_note.rs"]
pub mod neighbour_note;
#[path = "rules/dissonance/nota_cambiata.rs"]
pub mod nota_cambiata;
#[path = "rules/writing/octave_doubt.rs"]
pub mod octave_doubt;
#[path = "rules/motion/offbeat_consecutives.rs"]
pub mod offbeat_consecutives;
#[path = "rules/sonority/opening_interval.rs"]
pub mod opening_interval;
#[path = "rules/dissonance/ornamented_resolution.rs"]
pub mod ornamented_resolution;
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
#[path = "rules/dissonance/passing_note.rs"]
pub mod passing_note;
#[path = "rules/dissonance/pedal_point.rs"]
pub mod pedal_point;
#[path = "rules/motion/perfect_to_perfect.rs"]
pub mod perfect_to_perfect;
#[path = "rules/line/quarter_leaps.rs"]
pub mod quarter_leaps;
#[path = "rules/cadence/raised_seventh.rs"]
pub mod raised_seventh;
#[path = "rules/writing/reading.rs"]
pub mod reading;
#[path = "rules/line/repeated_note.rs"]
pub mod repeated_note;
#[path = "rules/dissonance/resolution_sounding.rs"]
pub mod resolution_sounding;
#[path = "rules/dissonance/retardation.rs"]
pub mod retardation;
#[path = "rules/motion/running_imperfects.rs"]
pub mod running_imperfects;
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
#[path = "rules/cadence/species_cadence.rs"]
pub mod species_cadence;
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
#[path = "rules/species/syncopation.rs"]
pub mod syncopation;
#[path = "rules/range/tessitura.rs"]
pub mod tessitura;
#[path = "rules/sonority/third_missing.rs"]
pub mod third_missing;
#[path = "rules/line/too_many_leaps.rs"]
pub mod too_many_leaps;
#[path = "rules/line/tritone_outline.rs"]
pub mod tritone_outline;
#[path = "rules/motion/unequal_fifths.rs"]
pub mod unequal_fifths;
#[path = "rules/sonority/unison_inside.rs"]
pub mod unison_inside;
#[path = "rules/writing/unwritten.rs"]
pub mod unwritten;
#[path = "rules/dissonance/upper_clash.rs"]
pub mod upper_clash;
#[path = "rules/line/vocal_rhythm.rs"]
pub mod vocal_rhythm;
#[path = "rules/writing/voice_silent.rs"]
pub mod voice_silent;
#[path = "rules/range/wide_range.rs"]
pub mod wide_range;

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
        stem: "nota_cambiata",
        rule: &nota_cambiata::RULE,
        text: include_str!("rules/dissonance/nota_cambiata.rs"),
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
        stem: "pedal_point",
        rule: &pedal_point::RULE,
        text: include_str!("rules/dissonance/pedal_point.rs"),
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
        stem: "broken_chord",
        rule: &broken_chord::RULE,
        text: include_str!("rules/line/broken_chord.rs"),
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
        stem: "figure_repeated",
        rule: &figure_repeated::RULE,
        text: include_str!("rules/line/figure_repeated.rs"),
    },
    File {
        family: "line",
        stem: "foreign_accidental",
        rule: &foreign_accidental::RULE,
        text: include_str!("rules/line/foreign_accidental.rs"),
    },
    File {
        family: "line",
        stem: "high_point_repeated",
        rule: &high_point_repeated::RULE,
        text: include_str!("rules/line/high_point_repeated.rs"),
    },
    File {
        family: "line",
        stem: "high_points_together",
        rule: &high_points_together::RULE,
        text: include_str!("rules/line/high_points_together.rs"),
    },
    File {
        family: "line",
        stem: "leap_across_bar",
        rule: &leap_across_bar::RULE,
        text: include_str!("rules/line/leap_across_bar.rs"),
    },
    File {
        family: "line",
        stem: "leap_beyond_octave",
        rule: &leap_beyond_octave::RULE,
        text: include_str!("rules/line/leap_beyond_octave.rs"),
    },
    File {
        family: "line",
        stem: "leap_from_accent",
        rule: &leap_from_accent::RULE,
        text: include_str!("rules/line/leap_from_accent.rs"),
    },
    File {
        family: "line",
        stem: "leap_unprepared",
        rule: &leap_unprepared::RULE,
        text: include_str!("rules/line/leap_unprepared.rs"),
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
        stem: "melodic_minor",
        rule: &melodic_minor::RULE,
        text: include_str!("rules/line/melodic_minor.rs"),
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
        stem: "too_many_leaps",
        rule: &too_many_leaps::RULE,
        text: include_str!("rules/line/too_many_leaps.rs"),
    },
    File {
        family: "line",
        stem: "tritone_outline",
        rule: &tritone_outline::RULE,
        text: include_str!("rules/line/tritone_outline.rs"),
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
        family: "range",
        stem: "mode_ambitus",
        rule: &mode_ambitus::RULE,
        text: include_str!("rules/range/mode_ambitus.rs"),
    },
    File {
        family: "range",
        stem: "tessitura",
        rule: &tessitura::RULE,
        text: include_str!("rules/range/tessitura.rs"),
    },
    File {
        family: "range",
        stem: "wide_range",
        rule: &wide_range::RULE,
        text: include_str!("rules/range/wide_range.rs"),
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
        stem: "third_missing",
        rule: &third_missing::RULE,
        text: include_str!("rules/sonority/third_missing.rs"),
    },
    File {
        family: "sonority",
        stem: "unison_inside",
        rule: &unison_inside::RULE,
        text: include_str!("rules/sonority/unison_inside.rs"),
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
