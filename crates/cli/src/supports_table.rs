//! Fitted end fixities, for people.

use crestline_plan::{FixityReport, SupportsFit};

use crate::numbers::fixed;
use crate::print::notice_line;
use crate::table::{Column, rendered};
use crate::text::push_paragraph;

/// The fixities, the sums that readings decide, and notices.
pub(crate) fn text(fit: &SupportsFit) -> String {
    let mut text = String::new();
    push_paragraph(
        &mut text,
        "How firmly the supports hold the strings: 0 pinned, 1 clamped. With one standard deviation now and before anything \
         was read; a value is decided where the readings more than halved it.",
    );
    let columns = [
        Column::words("Fixity", ""),
        Column::numbers("Plan", ""),
        Column::numbers("Found", ""),
        Column::numbers("±", ""),
        Column::numbers("±", "before"),
        Column::words("Decided", ""),
    ];
    let rows: Vec<_> = fit.supports.iter().chain(&fit.combinations).map(row).collect();
    text.push_str(&format!("\n{}\n", rendered(&columns, &rows)));
    for sum in &fit.combinations {
        push_paragraph(&mut text, &format!("{}: {}", sum.name, sum.meaning));
    }
    for notice in &fit.notices {
        push_paragraph(&mut text, &notice_line(notice));
    }
    text
}

fn row(fixity: &FixityReport) -> Vec<String> {
    vec![
        fixity.name.to_owned(),
        fixed(fixity.planned, 2),
        fixed(fixity.value, 2),
        fixed(fixity.sd, 2),
        fixed(fixity.prior_sd, 2),
        if fixity.decided { "yes" } else { "no" }.to_owned(),
    ]
}
