//! The codes of everything that can be wrong with a project file.

use crate::problem::Code;
use crate::units::UnitError;

crate::problem_codes! {
    // What the text is made of.
    /// The text is not TOML.
    SYNTAX = "syntax";
    /// A key stands twice in one table.
    DUPLICATE_KEY = "duplicate-key";
    /// A key that nothing reads.
    UNKNOWN_KEY = "unknown-key";
    /// A needed key is absent.
    MISSING_KEY = "missing-key";
    /// A value of another kind than the key takes.
    WRONG_TYPE = "wrong-type";
    /// `[array]` where `[[array]]` belongs.
    SINGLE_BRACKETS = "single-brackets";
    /// A bare number where a dimension with its unit belongs.
    BARE_NUMBER = "bare-number";
    /// A number in quotes where a ratio or count belongs.
    QUOTED_NUMBER = "quoted-number";
    /// A bare number where money belongs.
    BARE_MONEY = "bare-money";
    /// A number in quotes without its unit.
    NO_UNIT = "no-unit";
    /// A unit that this quantity does not take.
    UNKNOWN_UNIT = "unknown-unit";
    /// A decimal comma.
    DECIMAL_COMMA = "decimal-comma";
    /// Text that cannot be read as the quantity.
    UNREADABLE_NUMBER = "unreadable-number";
    /// Not a number, or infinite.
    NOT_FINITE = "not-finite";
    /// A number beyond anything on a site.
    TOO_LARGE = "too-large";
    /// A part of one where whole ones are counted.
    NOT_WHOLE = "not-whole";
    /// A word that is not one of the choices.
    UNKNOWN_CHOICE = "unknown-choice";
    /// Something planned that this version does not build.
    NOT_IN_THIS_VERSION = "not-in-this-version";
    /// A day that is not in the calendar, or not written as a TOML date.
    BAD_DATE = "bad-date";
    /// Text that cannot serve as a name.
    BAD_NAME = "bad-name";

    // Values out of their range.
    /// Zero or less where something must be there.
    NOT_POSITIVE = "not-positive";
    /// Less than zero.
    NEGATIVE = "negative";
    /// A count outside what can be built.
    COUNT_OUT_OF_RANGE = "count-out-of-range";
    /// A frequency outside 0.1 to 30 MHz.
    FREQUENCY_RANGE = "frequency-range";
    /// A band given twice.
    REPEATED_FREQUENCY = "repeated-frequency";
    /// A latitude or longitude off the globe.
    COORDINATE_RANGE = "coordinate-range";
    /// Latitude without longitude, or the other way round.
    HALF_COORDINATES = "half-coordinates";
    /// A bearing or angle beyond its turn.
    ANGLE_RANGE = "angle-range";
    /// A height at which no such element stands.
    IMPOSSIBLE_HEIGHT = "impossible-height";
    /// A relative permittivity below that of vacuum, or beyond any soil.
    PERMITTIVITY_RANGE = "permittivity-range";
    /// A percentage outside 0 to 100.
    PERCENT_RANGE = "percent-range";
    /// A ratio outside its range.
    RATIO_RANGE = "ratio-range";

    // Arrays and their composition.
    /// No `[[array]]` at all.
    NO_ARRAY = "no-array";
    /// Two arrays of one name.
    DUPLICATE_ARRAY = "duplicate-array";
    /// Two options that differ only in capital letters.
    OPTION_CASE = "option-case";
    /// An array without an element.
    NO_ELEMENT = "no-element";
    /// An array with more than one element.
    SEVERAL_ELEMENTS = "several-elements";
    /// An array with more than one end-fire stage.
    SEVERAL_STAGES = "several-stages";
    /// A stage for wires over verticals.
    STAGE_NEEDS_WIRES = "stage-needs-wires";
    /// A stage for verticals over wires.
    STAGE_NEEDS_VERTICALS = "stage-needs-verticals";
    /// `delay` in a broadside row.
    BROADSIDE_DELAY = "broadside-delay";
    /// Three in line with another scheme than crossfire.
    THREE_IN_LINE_SCHEME = "three-in-line-scheme";
    /// A delay ratio of zero or less.
    DELAY_NOT_POSITIVE = "delay-not-positive";
    /// A step so long that the forward signal cancels.
    STEP_TOO_LONG = "step-too-long";
    /// A half-wave delay that would have to be negative.
    HALF_WAVE_TOO_LONG = "half-wave-too-long";
    /// More or fewer weights than elements.
    WEIGHT_COUNT = "weight-count";
    /// A weight of amplitude zero.
    WEIGHT_ZERO = "weight-zero";
    /// Weights and a scheme or delay at once.
    WEIGHTS_AND_SCHEME = "weights-and-scheme";
    /// Two elements at one place.
    SAME_POSITION = "same-position";
    /// Two ways to say what the far end is, or none.
    BAD_TERMINATION = "bad-termination";

    // Feeding.
    /// A hub without anything that meets there.
    HUB_WITHOUT_STAGE = "hub-without-stage";
    /// An array hub without cells that meet there.
    ARRAY_HUB_WITHOUT_CELLS = "array-hub-without-cells";
    /// An array hub although everything meets at one hub.
    ARRAY_HUB_BY_ROW = "array-hub-by-row";
    /// A place for a hub that stands at the receiver.
    HUB_AT_RECEIVER = "hub-at-receiver";
    /// `by-row` without rows and cells.
    BY_ROW_WITHOUT_ROWS = "by-row-without-rows";
    /// `join` without anything to join.
    JOIN_WITHOUT_STAGE = "join-without-stage";
    /// Merged delays although one delay serves all cells.
    MERGED_BY_ROW = "merged-by-row";
    /// Merged delays of two different parts.
    MERGED_TWO_PARTS = "merged-two-parts";

    // The rest of the file.
    /// A polygon with fewer than three corners or no area.
    POLYGON_CORNERS = "polygon-corners";
    /// A polygon whose sides cross.
    POLYGON_CROSSES_ITSELF = "polygon-crosses-itself";
    /// A role that no item or piece has.
    UNKNOWN_ROLE = "unknown-role";
    /// A role whose pieces are never joined.
    JOINT_ROLE = "joint-role";
    /// Both a label and a role, or neither.
    LABEL_OR_ROLE = "label-or-role";
    /// Both a quantity and a length, or neither.
    QUANTITY_OR_LENGTH = "quantity-or-length";
    /// Not a currency code.
    BAD_CURRENCY = "bad-currency";
    /// Money in another currency than the project's.
    WRONG_CURRENCY = "wrong-currency";
    /// A rate from the project's currency into itself.
    EXCHANGE_INTO_ITSELF = "exchange-into-itself";
    /// Two rates of one currency.
    EXCHANGE_TWICE = "exchange-twice";
    /// The table of stock on hand cannot be read as rows and columns.
    BAD_CSV = "bad-csv";
    /// A needed column of the table of stock on hand is absent.
    MISSING_COLUMN = "missing-column";

    // Legal, but probably not as meant.
    /// A wire shorter than 0.4 wavelength.
    WIRE_SHORT = "wire-short";
    /// A wire longer than 4 wavelengths.
    WIRE_LONG = "wire-long";
    /// A broadside row closer than a quarter wavelength.
    SPACING_NARROW = "spacing-narrow";
    /// A broadside row wider than a wavelength.
    SPACING_WIDE = "spacing-wide";
    /// More than eight side by side.
    ROW_LONG = "row-long";
    /// Echelon wires less than a metre apart sideways.
    OFFSET_SMALL = "offset-small";
    /// A delay ratio at which nothing improves.
    DELAY_UNUSUAL = "delay-unusual";
    /// A delay of echelon wires short of the trade's range.
    DELAY_SHORT_FOR_WIRES = "delay-short-for-wires";
    /// An end-fire step of more than 0.40 wavelength.
    STEP_LONG = "step-long";
    /// An end-fire step of less than 0.03 wavelength.
    STEP_SHORT = "step-short";
    /// A half-wave delay in a project of several bands.
    HALF_WAVE_ONE_BAND = "half-wave-one-band";
    /// A currency code that is not on the list.
    UNLISTED_CURRENCY = "unlisted-currency";
}

/// The code of a number that could not be read.
pub(super) fn of_unit_error(error: &UnitError) -> Code {
    match error {
        UnitError::NoUnit { .. } => NO_UNIT,
        UnitError::DecimalComma { .. } => DECIMAL_COMMA,
        UnitError::UnknownUnit { .. } => UNKNOWN_UNIT,
        UnitError::NotANumber { .. } => UNREADABLE_NUMBER,
        UnitError::NotFinite { .. } => NOT_FINITE,
        UnitError::TooLarge { .. } => TOO_LARGE,
    }
}
