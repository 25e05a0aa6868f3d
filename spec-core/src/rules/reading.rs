//! Rules on the text itself: what cannot be read, what is not known, what points at nothing. They are checked while it is read.

use super::{Check, Rule};
use crate::finding::FindingKind;

macro_rules! reading_rules {
    ($($name:ident = $rule:literal, $kind:ident, $title:literal, $explanation:literal;)*) => {
        $(
            #[doc = $title]
            pub static $name: Rule = Rule {
                name: $rule,
                title: $title,
                kind: FindingKind::$kind,
                basis: "the language, edition 1",
                formula: "the form of the line or value, as the language has it",
                explanation: $explanation,
                check: Check::Elsewhere,
            };
        )*
        /// The rules of this subject.
        pub static ALL: &[&Rule] = &[$(&$name),*];
    };
}

reading_rules! {
    FILE_UNREADABLE = "file-unreadable", Contradiction, "A file can be read, is UTF-8, and is not too large.",
        "The file is left out and the others are still checked. Write it as UTF-8, under 8 MiB, with rights to read it.";
    SETTINGS_UNREADABLE = "settings-unreadable", Contradiction, "The file of settings can be read, and each setting makes sense.",
        "firstpole.toml is looked for beside the specification and in the folders above; the nearest one counts. An editor goes on \
         with the defaults; the command line checks nothing with thresholds that nobody meant, and ends with 2.";
    UNREADABLE_LINE = "unreadable-line", Contradiction, "A line is a heading, a particular, or a comment.",
        "Only this line is left out; everything else is still read and checked. A particular is written LABEL: VALUE.";
    UNREADABLE_VALUE = "unreadable-value", Contradiction, "A value is written in the form that its label asks for.",
        "The value counts as unknown, and the rules that need it stay silent until it can be read.";
    DECIMAL_COMMA = "decimal-comma", Contradiction, "A number has no comma.",
        "1,350 is 1.35 to one reader and 1350 to another, so it is refused and both readings are offered as repairs.";
    UNIT_MISSING = "unit-missing", Contradiction, "A unit is written with every quantity that has one.",
        "A bare number is refused, since 45 may be milliseconds or cycles. The units in use for the label are offered.";
    UNIT_MISMATCH = "unit-mismatch", Contradiction, "The unit measures what the label speaks of.",
        "A breaking current in kV, or a unit after a plain factor, is a slip of the line or of the label.";
    UNKNOWN_UNIT = "unknown-unit", Contradiction, "The unit is one that is known.",
        "Units of the SI and those at home in the trade are read, in their usual spellings; the nearest one is offered.";
    UNIT_KIND = "unit-kind", Contradiction, "A peak is stated as a peak and an rms value as rms.",
        "A withstand voltage in kV rms where a peak is meant, or the reverse, is wrong by 41 %; the conversion is offered.";
    UNKNOWN_WORD = "unknown-word", Contradiction, "The words are among those of the label's list.",
        "Words are matched without regard to capitals, hyphens and the width of blanks; the nearest one is offered.";
    UNKNOWN_LABEL = "unknown-label", Contradiction, "The label is a particular of its sheet.",
        "The nearest labels are offered. A label of the buyer's own stands in quotes and is carried unchecked.";
    MISPLACED_LABEL = "misplaced-label", Contradiction, "A particular stands in the sheet that it belongs to.",
        "What the network asks for belongs to the system, what the place asks for to the site, what is bought to the breaker.";
    AMBIGUOUS_SYMBOL = "ambiguous-symbol", Contradiction, "A symbol that the trade uses for two things is written out.",
        "Us is the highest system voltage to one standard and the switching impulse level to another; both are offered.";
    UNKNOWN_SHEET = "unknown-sheet", Contradiction, "A heading begins with a kind of sheet.",
        "The kinds are tender, system, infeed, site, family, breaker, circuit, offer, house-rule and deviation.";
    OUTSIDE_SHEET = "outside-sheet", Contradiction, "A particular stands under a heading.",
        "Lines before the first heading belong to no sheet and are not checked; said once a file.";
    EDITION_MISSING = "edition-missing", Caution, "The text says on its first line which edition of the language it is in.",
        "Without the line cbspec 1 edition 1 is assumed. Later editions may read the same words in another way.";
    EDITION_UNKNOWN = "edition-unknown", Contradiction, "The edition of the language is one that is known.",
        "The rest of the text is still read, as edition 1; what a later edition added will not be understood.";
    NAME_MISSING = "name-missing", Contradiction, "A sheet that others refer to has a name, and a tender a title.",
        "Write a name of letters, digits, _ and -, or a text in quotes, after the word of the kind.";
    NAME_TWICE = "name-twice", Contradiction, "No two sheets of one kind have one name, and a file holds one tender.",
        "Links find the first of them; rename one. Breakers and families share their names, since like finds both.";
    LINK_MISPLACED = "link-misplaced", Contradiction, "A heading has only the links of its kind, each once.",
        "A breaker stands on a system, at a site, like a family; a circuit is for a breaker; an infeed goes into a system.";
    LINK_UNKNOWN = "link-unknown", Contradiction, "A link names a sheet or a rule that there is.",
        "Names are looked for in the file itself and in those that it uses; the nearest one is offered.";
    LINK_NEEDED = "link-needed", Omission, "Where several systems, sites or breakers are in reach, the heading says which is meant.",
        "With one in reach the link may be left out. With several, what hangs on the link is not checked until it is there.";
    CIRCLE = "circle", Contradiction, "No sheet takes over from itself, and no file uses itself, by any way round.",
        "The link that closes the circle is left out and the rest is still checked. A chain of more than 100 sheets is cut too.";
    USE_UNREADABLE = "use-unreadable", Contradiction, "A file that is used can be had.",
        "Paths are relative, with /, and lead nowhere outside of the folder that the checker was given.";
    GAS_SHARES = "gas-shares", Contradiction, "The shares of a gas mixture add up to 100 %.",
        "Shares are mole fractions in percent. Either every gas of a mixture has one, or none has.";
    FROM_DUTY_MISPLACED = "from-duty-misplaced", Contradiction, "Only what follows from the duty is left to it.",
        "from duty stands for a rating that the checker can choose; what the buyer has to know must be stated.";
}
