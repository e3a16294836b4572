//! Sheets of a size and a shape that nobody writes: set in time that grows with them, and never
//! beyond what can be read.

use std::time::{Duration, Instant};

use partwright_sheet::{LARGEST, align};

/// The shortest of three runs.
fn time(text: &str) -> Duration {
    let run = |_| {
        let start = Instant::now();
        std::hint::black_box(align(text));
        start.elapsed()
    };
    (0..3).map(run).min().unwrap()
}

/// Holds a shape to it that eight times as much takes less than forty times as long: far from the
/// square.
#[track_caller]
fn grows_gently(shape: impl Fn(usize) -> String) {
    let (small, large) = (shape(1), shape(8));
    let (short, long) = (time(&small), time(&large));
    let least = Duration::from_millis(2);
    assert!(
        long < 40 * short.max(least),
        "{} bytes take {short:?}, {} bytes {long:?}",
        small.len(),
        large.len()
    );
    assert_eq!(align(&align(&small)), align(&small));
}

#[test]
fn long_rows_many_rows_and_many_systems() {
    grows_gently(|n| {
        format!(
            "S |{}\nB |{}\n",
            " G4 a. B |".repeat(4000 * n),
            " C3 |".repeat(n)
        )
    });
    grows_gently(|n| {
        format!(
            "S |{}|\nwords S |{}|\n",
            " b4 -".repeat(4000 * n),
            " la".repeat(4000 * n)
        )
    });
    grows_gently(|n| {
        (0..2000 * n)
            .map(|i| format!("V{i} | c4 | {i} |\n"))
            .collect()
    });
    grows_gently(|n| "S | c4 D |\nB |c3 |\n//    ^ x\n\n".repeat(1000 * n));
    grows_gently(|n| "voice  S soprano // x\ntitle  x // y\n".repeat(1000 * n));
}

#[test]
fn many_verses_and_many_comments_under_one_long_row() {
    let verses = |n: usize| {
        let rows: String = (0..500 * n)
            .map(|i| format!("words S v{i} | la |\n"))
            .collect();
        format!("S | {}c5 |\n{rows}", "- ".repeat(5000 * n))
    };
    grows_gently(verses);
    let marks = |n: usize| {
        let comments = "//      ^ here\n".repeat(500 * n);
        format!("S |{}|\n{comments}", " c5".repeat(5000 * n))
    };
    grows_gently(marks);
    let ring = |n: usize| {
        let rows: String = (0..300 * n)
            .map(|i| format!("V{i} | =V{} |\nwords V{i} | a |\n", i + 1))
            .collect();
        rows
    };
    grows_gently(ring);
}

#[test]
fn a_sheet_that_would_grow_beyond_the_largest_stays_as_it_is() {
    let long = format!("S | {}|\n", "c5 ".repeat(100_000));
    let silent = "V | _ |\n// x\nW | _ |\n";
    let rows: String = (0..100).map(|i| format!("V{i} | _ |\n")).collect();
    let text = format!("{long}{silent}{rows}");
    assert!(text.len() < LARGEST / 16);
    assert_eq!(align(&text), text);
    let comments = format!(
        "title {} // x\n{}",
        "x".repeat(100_000),
        "by x // y\n".repeat(100)
    );
    assert_eq!(align(&comments), comments);
    // Somewhat less does fit.
    let rows: String = (0..10).map(|i| format!("V{i} | _ |\n")).collect();
    let aligned = align(&format!("{long}{silent}{rows}"));
    assert!(aligned.len() > 10 * long.len() && aligned.len() < LARGEST);
    let most = format!("S|c4|\n// {}", "x".repeat(LARGEST - 9));
    assert_eq!(most.len(), LARGEST);
    assert_eq!(align(&most), most);
    let too_large = "S|c4|\n".repeat(LARGEST / 6 + 1);
    assert_eq!(align(&too_large), too_large);
}
