//! Hovers.

use serde_json::{Value, json};

use crate::client::{Client, capabilities};
use crate::document::{Document, FIFTHS};

const CHOIR: &str = "\
title Lamplighters' evensong
metre 3/4

voice S soprano
voice A alto
voice B bass E2..D4

S | D5 E - |
A | B4 C5 - |
B | G3 A _ |
";

fn open(client: &mut Client, text: &str) -> Document {
    Document::open(client, "file:///evensong.voices", text)
}

#[test]
fn a_note_tells_what_sounds_and_how_it_got_there() {
    let mut client = Client::ready();
    let document = open(&mut client, CHOIR);
    assert_eq!(
        document.hover_text(&mut client, "E -"),
        "\
Parallel fifths: soprano and bass go from D5 over G3 to E5 over A3. Move one voice the other way.

`parallel-fifths`, fault: the two lines fuse into one, and the ear loses a voice.

Source: J. J. Fux, Gradus ad Parnassum (1725), Book II, the four rules of motion [as given in a workbook after A. Mann's translation, and in Grove].

**E5** · soprano · bar 1, beat 2

- alto C5: major third below; parallel, D5 over B4 to E5 over C5
- bass A3: perfect twelfth below; parallel, D5 over G3 to E5 over A3

Other pairs: alto and bass parallel.

Chord: **A minor**."
    );
    let answer = document.hover(&mut client, &document.at("E -"));
    let line = document.at("E -")["line"].clone();
    assert_eq!(
        answer["result"]["range"]["start"],
        json!({ "line": line, "character": 7 })
    );
    assert_eq!(
        answer["result"]["range"]["end"],
        json!({ "line": line, "character": 8 })
    );
    assert_eq!(answer["result"]["contents"]["kind"], "markdown");
    client.goodbye();
}

#[test]
fn a_stated_chord_tells_its_notes() {
    let mut client = Client::ready();
    let text = "key G major\nmetre 2/4\nS | B4 A | B4 - ||\nB | G3 F# | G3 - ||\nfigures | _ _ | 5/3 - ||\nharmony | I V65 | _ ||\n";
    let document = open(&mut client, text);
    assert_eq!(
        document.hover_text(&mut client, "V65"),
        "**V6/5** · D F# A C, F# in the bass · G major"
    );
    assert_eq!(
        document.hover_text(&mut client, "I V65"),
        "**I** · G B D · G major"
    );
    assert_eq!(
        document.hover_text(&mut client, "5/3"),
        "**5/3** · G B D, G in the bass"
    );
    let note = document.hover_text(&mut client, "A | B4");
    assert!(
        note.ends_with("Chord: **D dominant seventh** (stated); key: G major."),
        "{note}"
    );
    client.goodbye();
}

#[test]
fn the_chord_that_closes_a_phrase_names_the_close() {
    let mut client = Client::ready();
    let document = open(
        &mut client,
        "style chorale\nkey C major\nmetre 4/4\n\nS | E5 - D5 - | C5 - - - ||\nA | G4 - F4 - | E4 - - - ||\nT | C4 - B3 - | G3 - - - ||\nB | C3 - G3 - | C3 - - - ||\n",
    );
    let close = document.hover_text(&mut client, "C5 - - -");
    let ending = "Chord: **C major**; key: C major; perfect authentic cadence.";
    assert!(close.ends_with(ending), "{close}");
    let inside = document.hover_text(&mut client, "D5 -");
    assert!(!inside.contains("cadence"), "{inside}");
    client.goodbye();
}

#[test]
fn the_first_note_has_no_motion() {
    let mut client = Client::ready();
    let document = open(&mut client, CHOIR);
    let text = document.hover_text(&mut client, "G3");
    assert_eq!(
        text,
        "**G3** · bass · bar 1, beat 1\n\n- soprano D5: perfect twelfth above\n- alto B4: major tenth above\n\nChord: **G major**."
    );
    client.goodbye();
}

#[test]
fn a_hold_tells_the_note_that_sounds() {
    let mut client = Client::ready();
    let document = open(&mut client, CHOIR);
    let at = document.position(document.text.find("- |\nA").unwrap());
    let answer = document.hover(&mut client, &at);
    let text = answer["result"]["contents"]["value"].as_str().unwrap();
    assert!(
        text.starts_with("**E5** · soprano · bar 1, beat 3, since bar 1, beat 2\n"),
        "{text}"
    );
    assert!(
        text.contains("- alto C5: major third below; at rest"),
        "{text}"
    );
    assert!(!text.contains("bass"), "{text}");
    client.goodbye();
}

#[test]
fn a_rest_tells_what_the_others_sound() {
    let mut client = Client::ready();
    let document = open(&mut client, CHOIR);
    let text = document.hover_text(&mut client, "_");
    assert_eq!(
        text,
        "**silence** · bass · bar 1, beat 3\n\n- soprano E5\n- alto C5\n\nOther pairs: soprano and alto at rest."
    );
    client.goodbye();
}

#[test]
fn a_label_tells_the_voice_and_its_compass() {
    let mut client = Client::ready();
    let document = open(&mut client, CHOIR);
    for words in ["S soprano", "S |"] {
        let text = document.hover_text(&mut client, words);
        assert!(
            text.starts_with("**S** · soprano\n\nCompass C4 to G5, at most A3 to C6"),
            "{words}: {text}"
        );
        assert!(text.contains("ask the singers"), "{text}");
    }
    let text = document.hover_text(&mut client, "B |");
    assert!(text.contains("Limit E2 to D4"), "{text}");
    client.goodbye();
}

#[test]
fn a_rule_in_a_licence_shows_its_page() {
    let mut client = Client::ready();
    let text = "S | D5 E*a |\nB | G3 A   |\n*a licence parallel-fifths: the drovers' horns\n";
    let document = open(&mut client, text);
    let text = document.hover_text(&mut client, "parallel-fifths");
    assert!(
        text.starts_with("Two voices move in parallel from one perfect fifth to another."),
        "{text}"
    );
    client.goodbye();
}

#[test]
fn a_mistake_tells_its_rule() {
    let mut client = Client::ready();
    let document = open(&mut client, "wibble\nS | G4 H4 |\n");
    for words in ["wibble", "H4"] {
        let text = document.hover_text(&mut client, words);
        assert!(
            text.starts_with(words) || text.contains("German"),
            "{words}: {text}"
        );
        assert!(text.contains("`reading`, fault: "), "{words}: {text}");
    }
    client.goodbye();
}

#[test]
fn a_licensed_finding_tells_its_reason() {
    let mut client = Client::ready();
    let text = "S | D5 E*a |\nB | G3 A   |\n*a licence parallel-fifths: the drovers' horns\n";
    let document = open(&mut client, text);
    let text = document.hover_text(&mut client, "E*a");
    assert!(
        text.contains("\n\n`parallel-fifths`, licensed: the drovers' horns\n\n"),
        "{text}"
    );
    client.goodbye();
}

#[test]
fn a_bar_line_tells_its_bar() {
    let mut client = Client::ready();
    let text = "metre 3/4\nS | D5 | E - - | F - ||\nB | G3 | A - -|B - ||\n";
    let document = open(&mut client, text);
    for (words, told) in [
        ("| D5", "**bar 0** begins here · 1 beat · 3/4"),
        ("| E", "**bar 0** ends here · 1 beat · 3/4"),
        ("|B", "**bar 1** ends here · 3 beats · 3/4"),
        ("||\nB", "**bar 2** ends here · 2 beats · 3/4"),
    ] {
        assert_eq!(document.hover_text(&mut client, words), told, "{words}");
    }
    // Right behind a bar line stands a note.
    let text = document.hover_text(&mut client, "B - ||");
    assert!(text.contains("**B3** · "), "{text}");
    client.goodbye();
}

#[test]
fn a_bar_line_with_a_finding_tells_that_first() {
    let mut client = Client::ready();
    let document = open(&mut client, "metre 3/4\nS | D5 E |\n");
    let text = document.hover_text(&mut client, "|\n");
    assert!(text.starts_with("Not written yet"), "{text}");
    assert!(
        text.ends_with("**bar 1** ends here · 3 beats · 3/4"),
        "{text}"
    );
    client.goodbye();
}

#[test]
fn elsewhere_there_is_nothing() {
    let mut client = Client::ready();
    let document = open(&mut client, &format!("// a comment\n\n{FIFTHS}"));
    let far = json!({ "line": 4_000_000_000_u32, "character": 4_000_000_000_u32 });
    for at in [
        document.at("comment"),
        json!({ "line": 1, "character": 0 }),
        far,
    ] {
        let answer = document.hover(&mut client, &at);
        assert_eq!(answer.get("result"), Some(&Value::Null), "{at}: {answer}");
    }
    client.goodbye();
}

#[test]
fn a_client_without_markdown_gets_plain_text() {
    for formats in [
        json!({}),
        json!({ "hover": { "contentFormat": ["plaintext"] } }),
    ] {
        let mut client = Client::start().introduced(json!({ "textDocument": formats }));
        let document = open(&mut client, CHOIR);
        let answer = document.hover(&mut client, &document.at("E -"));
        assert_eq!(answer["result"]["contents"]["kind"], "plaintext");
        let text = answer["result"]["contents"]["value"].as_str().unwrap();
        assert!(
            text.starts_with("Parallel fifths: ") && text.contains("\n\nE5 · soprano · "),
            "{text}"
        );
        assert!(!text.contains(['*', '`']), "{text}");
        client.goodbye();
    }
}

#[test]
fn a_hover_right_behind_an_edit_sees_it() {
    for encoding in ["utf-8", "utf-16"] {
        let mut client = Client::start().introduced(capabilities(&[encoding]));
        let mut document = open(&mut client, "S | C4 |\n");
        for pitch in ["D4", "E4", "F4", "G4"] {
            document.edit(&mut client, 4..6, pitch);
            let text = document.hover_text(&mut client, pitch);
            assert!(text.starts_with(&format!("**{pitch}**")), "{text}");
        }
        client.goodbye();
    }
}

#[test]
fn a_hover_that_an_edit_overtakes_is_answered_all_the_same() {
    let mut client = Client::ready();
    let mut document = open(&mut client, "S | C4 |\n");
    let params = json!({ "textDocument": { "uri": document.uri }, "position": document.at("C4") });
    let mut asked = Vec::new();
    for _ in 0..50 {
        document.edit(&mut client, 0..0, "\n");
        asked.push(client.ask("textDocument/hover", params.clone()));
    }
    for id in asked {
        let answer = client.answer(id);
        assert!(answer.get("error").is_none(), "{answer}");
    }
    assert!(document.hover_text(&mut client, "C4").starts_with("**C4**"));
    client.goodbye();
}

#[test]
fn a_dissonance_tells_its_figure_or_what_each_figure_misses() {
    let mut client = Client::ready();
    let text =
        "style motet\nmetre 4/2\n\nS | C5 - - B4 | C5 - A4 - |\nB | A3 - D3 G3 | C3 - G3 - ||\n";
    let document = open(&mut client, text);
    let hover = document.hover_text(&mut client, "- B4");
    assert!(
        hover.contains(
            "C5 in S makes a minor seventh with D3 in voice B, on a strong beat.\n\n\
             - S has a suspension: struck in bar 1, beat 1, resolved in bar 1, beat 4"
        ),
        "{hover}"
    );
    let hover = document.hover_text(&mut client, "A4 -");
    assert!(
        hover.contains("Free dissonance: ") || hover.contains("Appoggiatura: "),
        "{hover}"
    );
    assert!(
        hover.contains("A4 is no passing note") && hover.contains(": nothing follows it"),
        "{hover}"
    );
    assert!(hover.contains("Source: "), "{hover}");
    client.goodbye();
}
