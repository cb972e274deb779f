//! The stable names of everything that can be wrong with a catalogue.

crate::problem_codes! {
    /// A file of another name than the five.
    UNKNOWN_FILE = "csv-unknown-file";
    /// A file beyond 50 MiB.
    FILE_TOO_LARGE = "csv-file-too-large";
    /// A cell beyond 64 KiB.
    CELL_TOO_LARGE = "csv-cell-too-large";
    /// UTF-16 was decoded.
    UTF16 = "csv-utf16";
    /// Bytes that are not UTF-8.
    NOT_UTF8 = "csv-not-utf8";
    /// A file without any row.
    EMPTY_FILE = "csv-empty-file";
    /// Semicolons or tabs between columns.
    SEPARATOR = "csv-separator";
    /// A quote that never closes.
    OPEN_QUOTE = "csv-open-quote";
    /// Text after a closing quote.
    TEXT_AFTER_QUOTE = "csv-text-after-quote";
    /// No row of column names at the top.
    HEADER_NOT_FOUND = "csv-header-not-found";
    /// A needed column is missing.
    MISSING_COLUMN = "csv-missing-column";
    /// A column name in other case or with spaces.
    HEADER_SPELLING = "csv-header-spelling";
    /// A column that nothing reads.
    UNKNOWN_COLUMN = "csv-unknown-column";
    /// Two columns of one name.
    DUPLICATE_COLUMN = "csv-duplicate-column";
    /// A loss column that is not per 100 m.
    LOSS_UNIT = "csv-loss-unit";
    /// A row with more or fewer fields than the header.
    FIELD_COUNT = "csv-field-count";
    /// A needed cell is blank.
    BLANK_CELL = "csv-blank-cell";
    /// An id with other characters than allowed.
    BAD_ID = "csv-bad-id";
    /// An id that was turned into a date.
    ID_DATE = "csv-id-date";
    /// An id that was turned into a number with an exponent.
    ID_EXPONENT = "csv-id-exponent";
    /// An id that starts with a digit.
    ID_DIGIT_FIRST = "csv-id-digit-first";
    /// One id twice.
    DUPLICATE_ID = "csv-duplicate-id";
    /// Leading zeros of an id were lost.
    LEADING_ZEROS = "csv-leading-zeros";
    /// A line break inside an id or another one-word cell.
    LINE_BREAK = "csv-line-break";
    /// A formula or an error value where a number, date or id belongs.
    FORMULA = "csv-formula";
    /// Something else than a number.
    NOT_A_NUMBER = "csv-not-a-number";
    /// A number with more digits than can be kept exactly.
    NUMBER_TOO_LONG = "csv-number-too-long";
    /// A number with an exponent.
    EXPONENT = "csv-exponent";
    /// A fraction where a whole number belongs.
    NOT_WHOLE = "csv-not-whole";
    /// A negative number.
    NEGATIVE = "csv-negative";
    /// Nothing where more than nothing is needed.
    ZERO = "csv-zero";
    /// A decimal comma.
    DECIMAL_COMMA = "csv-decimal-comma";
    /// Thousands separators.
    THOUSANDS = "csv-thousands";
    /// A number that may be a thousand times another.
    THOUSANDS_AMBIGUOUS = "csv-thousands-ambiguous";
    /// The right unit written in the cell.
    UNIT_IN_CELL = "csv-unit-in-cell";
    /// Another unit written in the cell.
    MIXED_UNITS = "csv-mixed-units";
    /// A percentage where a ratio or plain number belongs.
    PERCENT = "csv-percent";
    /// A cell that a spreadsheet turned into a time or date.
    CELL_CHANGED = "csv-cell-changed";
    /// A currency sign in the price that agrees.
    CURRENCY_IN_PRICE = "csv-currency-in-price";
    /// A currency sign in the price that contradicts the currency.
    CURRENCY_CONTRADICTS = "csv-currency-contradicts";
    /// Not a currency code.
    CURRENCY = "csv-currency";
    /// A price of nothing without a word that it is free.
    ZERO_PRICE = "csv-zero-price";
    /// A date that can be read in two ways.
    DATE_AMBIGUOUS = "csv-date-ambiguous";
    /// A date in another form.
    DATE_FORMAT = "csv-date-format";
    /// The day number of a spreadsheet.
    DATE_SERIAL = "csv-date-serial";
    /// Neither yes nor no.
    YES_NO = "csv-yes-no";
    /// A role that nothing asks for.
    UNKNOWN_ROLE = "csv-unknown-role";
    /// A unit that nothing is counted in.
    UNKNOWN_UNIT = "csv-unknown-unit";
    /// Feet, converted to metres.
    UNIT_CONVERTED = "csv-unit-converted";
    /// An attribute that is not `key=value`.
    BAD_ATTRIBUTE = "csv-bad-attribute";
    /// A velocity factor in percent.
    VF_PERCENT = "csv-vf-percent";
    /// A velocity factor outside 0 to 1.
    VF_RANGE = "csv-vf-range";
    /// Points that cannot be read.
    BAD_POINTS = "csv-bad-points";
    /// Points that do not ascend.
    POINTS_ORDER = "csv-points-order";
    /// Low, likely and high hours out of order.
    HOURS_ORDER = "csv-hours-order";
    /// A terrain multiplier that does not exist.
    TERRAIN_WORD = "csv-terrain-word";
    /// A task that comes after one that does not exist.
    UNKNOWN_TASK = "csv-unknown-task";
    /// An offer or cable row of a part that does not exist.
    UNKNOWN_PART = "csv-unknown-part";
    /// An alternate that does not exist.
    UNKNOWN_ALTERNATE = "csv-unknown-alternate";
    /// Price breaks out of order or dearer than a smaller order.
    BREAK_ORDER = "csv-break-order";
    /// More errors than are shown.
    TOO_MANY = "csv-too-many-errors";
    /// A unit price far from the others of its role.
    UNIT_PRICE_ODD = "csv-unit-price-odd";
    /// Coax without a velocity factor.
    CABLE_WITHOUT_VF = "csv-cable-without-vf";
    /// Coax without loss points.
    CABLE_WITHOUT_LOSS = "csv-cable-without-loss";
    /// Control cable without its number of conductors.
    WITHOUT_CONDUCTORS = "csv-without-conductors";
    /// Relay contacts that film over at receive levels.
    CONTACT_NOT_GOLD = "csv-contact-not-gold";
    /// A part without any offer.
    WITHOUT_OFFER = "csv-without-offer";
    /// A role with several parts and no default.
    MISSING_DEFAULT = "csv-missing-default";
    /// A price without a date.
    PRICE_UNDATED = "csv-price-undated";
    /// A price older than 180 days.
    PRICE_OLD = "csv-price-old";
    /// A price older than the project allows.
    PRICE_TOO_OLD = "csv-price-too-old";
    /// A price newer than the estimate.
    PRICE_AFTER_ESTIMATE = "csv-price-after-estimate";
}
