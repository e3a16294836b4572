//! Sheets of a size and a shape that nobody writes: set in time that grows with them, and never
//! beyond what can be read.

use std::time::{Duration, Instant};

use partwright_sheet::{LARGEST, Sheet, align};

fn time<T>(work: impl Fn() -> T) -> Duration {
    let start = Instant::now();
    std::hint::black_box(work());
    start.elapsed()
}

/// Holds a large sheet to it that setting it takes at most thirty times as long as reading it,
/// which goes through it once. A busy machine slows both down.
#[track_caller]
fn takes_its_time(shape: impl Fn(usize) -> String) {
    let large = shape(16);
    let runs = (0..3).map(|_| (time(|| align(&large)), time(|| Sheet::read(&large))));
    let (set, read) = runs.fold((Duration::MAX, Duration::MAX), |least, run| {
        (least.0.min(run.0), least.1.min(run.1))
    });
    let least = Duration::from_millis(3);
    assert!(
        set < 30 * read.max(least),
        "{} bytes take {set:?} to set, {read:?} to read",
        large.len()
    );
    let small = align(&shape(1));
    assert_eq!(align(&small), small);
}

#[test]
fn long_rows_many_rows_and_many_systems() {
    takes_its_time(|n| {
        format!(
            "S |{}\nB |{}\n",
            " G4 a. B |".repeat(4000 * n),
            " C3 |".repeat(n)
        )
    });
    takes_its_time(|n| {
        format!(
            "S |{}|\nwords S |{}|\n",
            " b4 -".repeat(4000 * n),
            " la".repeat(4000 * n)
        )
    });
    takes_its_time(|n| {
        (0..2000 * n)
            .map(|i| format!("V{i} | c4 | {i} |\n"))
            .collect()
    });
    takes_its_time(|n| "S | c4 D |\nB |c3 |\n//    ^ x\n\n".repeat(1000 * n));
    takes_its_time(|n| "voice  S soprano // x\ntitle  x // y\n".repeat(1000 * n));
}

#[test]
fn many_verses_and_many_comments_under_one_long_row() {
    let verses = |n: usize| {
        let rows: String = (0..500 * n)
            .map(|i| format!("words S v{i} | la |\n"))
            .collect();
        format!("S | {}c5 |\n{rows}", "- ".repeat(5000 * n))
    };
    takes_its_time(verses);
    let marks = |n: usize| {
        let comments = "//      ^ here\n".repeat(500 * n);
        format!("S |{}|\n{comments}", " c5".repeat(5000 * n))
    };
    takes_its_time(marks);
    let ring = |n: usize| {
        let rows: String = (0..300 * n)
            .map(|i| format!("V{i} | =V{} |\nwords V{i} | a |\n", i + 1))
            .collect();
        rows
    };
    takes_its_time(ring);
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
