//! The words of the page on the model.

/// A section: its heading and its paragraphs.
pub struct Section {
    /// The heading.
    pub heading: &'static str,
    /// The paragraphs.
    pub paragraphs: &'static [&'static str],
    /// Whether it is a caution.
    pub is_caution: bool,
}

/// A source, and what was taken from it.
pub struct Source {
    /// Author, title and place.
    pub work: &'static str,
    /// What was taken from it.
    pub used_for: &'static str,
}

const fn section(heading: &'static str, paragraphs: &'static [&'static str]) -> Section {
    Section { heading, paragraphs, is_caution: false }
}

/// The sections in reading order.
pub const SECTIONS: [Section; 7] = [
    section(
        "What is computed",
        &[
            "The setback of a crest is how far it stands beyond the nominal saddle line, along the string and away from \
             the nut. A fretted note is sharp or flat for four reasons, and each has its own part of the error: the \
             speaking length is not the one that the fret's ratio asks for; pressing stretches the string and raises its \
             tension; the stretched string weighs a little less for each unit of length; and the string is stiff, \
             which counts for more the shorter it gets. The four parts add up to the whole error.",
            "A fretted string is taken as the shortest path from the nut over the crowns to the finger, straight to \
             the fret, and on to the crest. A crown that it would touch on the way is named as a buzz. The open string is \
             always at its pitch, and the tension is the one for which a stiff string's lowest mode has that pitch.",
        ],
    ),
    section(
        "How setbacks are chosen",
        &[
            "The setbacks are those that leave the frets of the fit the least errors, by the rule that the plan names: \
             least squares, a true twelfth fret, or the smallest largest error. The ideal setback is that of each string \
             alone; the built one is what the saddle and nut that you make allow. Both are searched within the travel \
             that the plan gives, and a setback that stands at a limit is reported as such.",
        ],
    ),
    section(
        "What it knows only from you",
        &[
            "The result is as good as the figures that go in. Action at fret 12, the gauges, and what the core is made of \
             matter most; the modulus of nylon and other polymers is that of the string under playing tension, several \
             times what the bulk material has. Three more are seldom measured: how deep the finger presses, how firmly \
             nut, fret and saddle hold the string, and whether it slips over nut and saddle. Their usual values are \
             estimates. Change one within what is plausible and see how far the setbacks move before you cut.",
        ],
    ),
    section(
        "How sure a setback is",
        &[
            "No figure of a plan is known exactly. The page How sure draws some thousands of instruments that differ from \
             the plan as its tolerances say, works each of them out, and gives the range that nine in ten of the ideal \
             setbacks fall in: the 90 % band. It also says which figure to measure next to narrow it. The ± in the schedule \
             and the drawing is half of such a band, worked out to first order without drawing instruments.",
            "A band is worth what the tolerances are worth. Those that the program starts from are estimates and common \
             practice; put your own in their place. What the model leaves out is in no band, so that the truth can lie \
             outside one more often than one time in ten.",
        ],
    ),
    section(
        "What it leaves out",
        &[
            "The body and the neck do not move: a strong resonance near a note can shift it by some cents. Frets are lines \
             without width, wear or lean. Relief is a parabola. Bending, vibrato and a sideways pull of the finger are \
             not considered; nor are heat and damp. Strings differ from one set to the next. For these reasons the plan \
             brings an instrument close, and the last adjustment is made by ear or tuner on the instrument itself.",
            "The arithmetic itself is checked against an independent computation of whole plans: ideal setbacks agree to \
             0.0001 mm, built ones to 0.0002 mm. That says nothing about an instrument; it says that no error of \
             practical size comes from the arithmetic.",
        ],
    ),
    section(
        "Keeping your work",
        &[
            "Every change can be undone. A copy of unsaved changes is kept beside the plan's file, or in your state folder \
             where the plan has no file yet, and is offered once when the program ended without saving. Files are \
             replaced whole or not at all, and one that another program has changed is not saved over without asking.",
            "Every command is in the list that Ctrl+K or F2 opens, with its key. Tab goes from field to field, arrow keys \
             step a number, and Escape leaves a question without doing anything.",
        ],
    ),
    Section {
        heading: "Cautions",
        paragraphs: &[
            "Strings under tension can break, and bridges and necks can lift or fold. The tensions shown here are \
             computed, not measured, and the breaking loads are those of the strength that the plan names. Keep to the \
             ratings of the makers of strings and instruments, wear eye protection while tuning up, and leave what carries \
             the load to someone qualified for it.",
            "Measure twice: check the print against its scale bar before you set anything out by it, and cut a blank \
             oversize. Dust of bone, shell and some woods is harmful; work with extraction or a mask, and keep to the \
             instructions of your tools' makers.",
        ],
        is_caution: true,
    },
];

/// The sources of the model.
pub const SOURCES: [Source; 3] = [
    Source {
        work: "H. Fletcher, Normal vibration frequencies of a stiff piano string. J. Acoust. Soc. Am. 36 (1964) 203",
        used_for: "partials of a stiff string, and the coefficient of inharmonicity",
    },
    Source {
        work: "P. M. Morse, Vibration and Sound, chapter IV",
        used_for: "the equation of a stiff string under tension, and its ends",
    },
    Source {
        work: "N. H. Fletcher and T. D. Rossing, The Physics of Musical Instruments, chapter 2",
        used_for: "bending stiffness, and strings whose ends are held",
    },
];
