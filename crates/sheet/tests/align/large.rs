//! A sheet too large to be aligned. How fast aligning is stands in no test: the machine is shared.

use partwright_sheet::{LARGEST, align, try_align};

#[test]
fn a_sheet_that_would_grow_beyond_the_largest_stays_as_it_is() {
    let long = format!("S | {}|\n", "c5 ".repeat(100_000));
    let silent = "V | _ |\n// x\nW | _ |\n";
    let rows: String = (0..100).map(|i| format!("V{i} | _ |\n")).collect();
    let text = format!("{long}{silent}{rows}");
    assert!(text.len() < LARGEST / 16);
    assert_eq!(align(&text), text);
    assert_eq!(try_align(&text), None);
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
    assert_eq!(try_align(&too_large), None);
    assert_eq!(try_align("S|c4|\n").as_deref(), Some("S | C4 |\n"));
}
