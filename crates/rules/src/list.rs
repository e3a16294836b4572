//! The rule files. Written by `cargo xtask list`; do not edit.

use crate::catalogue::File;

#[path = "rules/motion/all_one_way.rs"]
pub mod all_one_way;
#[path = "rules/harmony/altered_note_resolution.rs"]
pub mod altered_note_resolution;
#[path = "rules/dissonance/anticipation.rs"]
pub mod anticipation;
#[path = "rules/dissonance/appoggiatura.rs"]
pub mod appoggiatura;
#[path = "rules/line/augmented_interval.rs"]
pub mod augmented_interval;
#[path = "rules/harmony/augmented_sixth.rs"]
pub mod augmented_sixth;
#[path = "rules/motion/barline_consecutives.rs"]
pub mod barline_consecutives;
#[path = "rules/motion/beat_consecutives.rs"]
pub mod beat_consecutives;
#[path = "rules/line/broken_chord.rs"]
pub mod broken_chord;
#[path = "rules/species/cantus.rs"]
pub mod cantus;
#[path = "rules/harmony/chord_doubling.rs"]
pub mod chord_doubling;
#[path = "rules/line/chromatic_semitone.rs"]
pub mod chromatic_semitone;
#[path = "rules/dissonance/clash_together.rs"]
pub mod clash_together;
#[path = "rules/cadence/closing_approach.rs"]
pub mod closing_approach;
#[path = "rules/cadence/closing_interval.rs"]
pub mod closing_interval;
#[path = "rules/harmony/common_tone.rs"]
pub mod common_tone;
#[path = "rules/range/compass.rs"]
pub mod compass;
#[path = "rules/dissonance/consonant_fourth.rs"]
pub mod consonant_fourth;
#[path = "rules/motion/contrary_fifths.rs"]
pub mod contrary_fifths;
#[path = "rules/motion/contrary_octaves.rs"]
pub mod contrary_octaves;
#[path = "rules/harmony/cross_relation.rs"]
pub mod cross_relation;
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
#[path = "rules/harmony/incomplete_chord.rs"]
pub mod incomplete_chord;
#[path = "rules/harmony/leading_note_doubled.rs"]
pub mod leading_note_doubled;
#[path = "rules/harmony/leading_note_resolution.rs"]
pub mod leading_note_resolution;
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
#[path = "rules/harmony/retrogression.rs"]
pub mod retrogression;
#[path = "rules/motion/running_imperfects.rs"]
pub mod running_imperfects;
#[path = "rules/harmony/seventh_approach.rs"]
pub mod seventh_approach;
#[path = "rules/harmony/seventh_doubled.rs"]
pub mod seventh_doubled;
#[path = "rules/line/seventh_leap.rs"]
pub mod seventh_leap;
#[path = "rules/harmony/seventh_resolution.rs"]
pub mod seventh_resolution;
#[path = "rules/motion/similar_leaps.rs"]
pub mod similar_leaps;
#[path = "rules/dissonance/six_five_exchange.rs"]
pub mod six_five_exchange;
#[path = "rules/harmony/six_four.rs"]
pub mod six_four;
#[path = "rules/harmony/six_four_doubling.rs"]
pub mod six_four_doubling;
#[path = "rules/line/sixth_leap.rs"]
pub mod sixth_leap;
#[path = "rules/sonority/spacing.rs"]
pub mod spacing;
#[path = "rules/cadence/species_cadence.rs"]
pub mod species_cadence;
#[path = "rules/species/species_rhythm.rs"]
pub mod species_rhythm;
#[path = "rules/harmony/stated_harmony.rs"]
pub mod stated_harmony;
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
#[path = "rules/harmony/tritone_resolution.rs"]
pub mod tritone_resolution;
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

macro_rules! file {
    ($family:literal, $stem:ident) => {
        File {
            family: $family,
            stem: stringify!($stem),
            rule: &$stem::RULE,
            text: include_str!(concat!("rules/", $family, "/", stringify!($stem), ".rs")),
        }
    };
}

pub(crate) static FILES: &[File] = &[
    file!("cadence", closing_approach),
    file!("cadence", closing_interval),
    file!("cadence", raised_seventh),
    file!("cadence", species_cadence),
    file!("dissonance", anticipation),
    file!("dissonance", appoggiatura),
    file!("dissonance", clash_together),
    file!("dissonance", consonant_fourth),
    file!("dissonance", diminished_fifth),
    file!("dissonance", double_neighbour),
    file!("dissonance", escape_note),
    file!("dissonance", free_dissonance),
    file!("dissonance", long_dissonance),
    file!("dissonance", neighbour_note),
    file!("dissonance", nota_cambiata),
    file!("dissonance", ornamented_resolution),
    file!("dissonance", passing_note),
    file!("dissonance", pedal_point),
    file!("dissonance", resolution_sounding),
    file!("dissonance", retardation),
    file!("dissonance", six_five_exchange),
    file!("dissonance", suspension_chain),
    file!("dissonance", suspension_kind),
    file!("dissonance", suspension_position),
    file!("dissonance", suspension_preparation),
    file!("dissonance", suspension_resolution),
    file!("dissonance", upper_clash),
    file!("harmony", altered_note_resolution),
    file!("harmony", augmented_sixth),
    file!("harmony", chord_doubling),
    file!("harmony", common_tone),
    file!("harmony", cross_relation),
    file!("harmony", incomplete_chord),
    file!("harmony", leading_note_doubled),
    file!("harmony", leading_note_resolution),
    file!("harmony", retrogression),
    file!("harmony", seventh_approach),
    file!("harmony", seventh_doubled),
    file!("harmony", seventh_resolution),
    file!("harmony", six_four),
    file!("harmony", six_four_doubling),
    file!("harmony", stated_harmony),
    file!("harmony", tritone_resolution),
    file!("line", augmented_interval),
    file!("line", broken_chord),
    file!("line", chromatic_semitone),
    file!("line", diminished_interval),
    file!("line", figure_repeated),
    file!("line", foreign_accidental),
    file!("line", high_point_repeated),
    file!("line", high_points_together),
    file!("line", leap_across_bar),
    file!("line", leap_beyond_octave),
    file!("line", leap_from_accent),
    file!("line", leap_unprepared),
    file!("line", leap_unrecovered),
    file!("line", leaps_one_way),
    file!("line", melodic_minor),
    file!("line", quarter_leaps),
    file!("line", repeated_note),
    file!("line", seventh_leap),
    file!("line", sixth_leap),
    file!("line", too_many_leaps),
    file!("line", tritone_outline),
    file!("line", vocal_rhythm),
    file!("motion", all_one_way),
    file!("motion", barline_consecutives),
    file!("motion", beat_consecutives),
    file!("motion", contrary_fifths),
    file!("motion", contrary_octaves),
    file!("motion", crossing),
    file!("motion", delayed_consecutives),
    file!("motion", direct_fifths),
    file!("motion", direct_octaves),
    file!("motion", direct_unisons),
    file!("motion", dissonance_into_perfect),
    file!("motion", downbeat_consecutives),
    file!("motion", leaps_into_perfect),
    file!("motion", mi_contra_fa),
    file!("motion", offbeat_consecutives),
    file!("motion", ottava_battuta),
    file!("motion", overlap),
    file!("motion", parallel_dissonances),
    file!("motion", parallel_fifths),
    file!("motion", parallel_fourths),
    file!("motion", parallel_octaves),
    file!("motion", parallel_unisons),
    file!("motion", perfect_to_perfect),
    file!("motion", running_imperfects),
    file!("motion", similar_leaps),
    file!("motion", unequal_fifths),
    file!("range", compass),
    file!("range", mode_ambitus),
    file!("range", tessitura),
    file!("range", wide_range),
    file!("sonority", few_imperfects),
    file!("sonority", low_crowding),
    file!("sonority", opening_interval),
    file!("sonority", spacing),
    file!("sonority", third_missing),
    file!("sonority", unison_inside),
    file!("species", cantus),
    file!("species", eighth_notes),
    file!("species", florid_rhythm),
    file!("species", species_rhythm),
    file!("species", syncopation),
    file!("writing", licence_idle),
    file!("writing", octave_doubt),
    file!("writing", reading),
    file!("writing", unwritten),
    file!("writing", voice_silent),
];
