//! Currency codes and the signs that stand for them.

/// Active codes of ISO 4217 (from memory of the published list), without metals and test codes.
const CODES: &str = "AED AFN ALL AMD AOA ARS AUD AWG AZN BAM BBD BDT BGN BHD BIF BMD BND BOB BRL BSD BTN BWP BYN BZD \
    CAD CDF CHF CLP CNY COP CRC CUP CVE CZK DJF DKK DOP DZD EGP ERN ETB EUR FJD FKP GBP GEL GHS GIP GMD GNF GTQ GYD \
    HKD HNL HTG HUF IDR ILS INR IQD IRR ISK JMD JOD JPY KES KGS KHR KMF KPW KRW KWD KYD KZT LAK LBP LKR LRD LSL LYD \
    MAD MDL MGA MKD MMK MNT MOP MRU MUR MVR MWK MXN MYR MZN NAD NGN NIO NOK NPR NZD OMR PAB PEN PGK PHP PKR PLN PYG \
    QAR RON RSD RUB RWF SAR SBD SCR SDG SEK SGD SHP SLE SOS SRD SSP STN SVC SYP SZL THB TJS TMT TND TOP TRY TTD TWD \
    TZS UAH UGX USD UYU UZS VES VND VUV WST XAF XCD XCG XOF XPF YER ZAR ZMW ZWG";

/// Whether this is a code of ISO 4217.
pub(super) fn is_code(text: &str) -> bool {
    text.len() == 3 && CODES.split_whitespace().any(|code| code == text)
}

/// The codes that a sign or word can stand for; empty when it is none.
pub(super) fn meant_by(sign: &str) -> Vec<&str> {
    match sign.to_lowercase().as_str() {
        "€" | "euro" | "euros" => vec!["EUR"],
        "£" | "pound" | "pounds" => vec!["GBP"],
        "$" | "dollar" | "dollars" => {
            vec!["USD", "CAD", "AUD", "NZD", "HKD", "SGD", "TWD", "MXN", "BBD", "JMD"]
        }
        "us$" => vec!["USD"],
        "¥" | "yen" => vec!["JPY", "CNY"],
        "kr" | "kr." => vec!["SEK", "NOK", "DKK", "ISK"],
        "zł" => vec!["PLN"],
        "kč" => vec!["CZK"],
        "fr." | "sfr." => vec!["CHF"],
        "₹" => vec!["INR"],
        other => CODES.split_whitespace().filter(|code| code.eq_ignore_ascii_case(other)).collect(),
    }
}

/// Splits a sign or code off the front or back of a price: "€31.00", "31 EUR".
pub(super) fn split(price: &str) -> (&str, &str) {
    let is_number = |c: char| c.is_ascii_digit() || matches!(c, '.' | ',' | '\'' | '-' | '+' | '–' | '−');
    let start = price.find(is_number).unwrap_or(0);
    let end = price
        .rfind(is_number)
        .map_or(price.len(), |at| at + price[at..].chars().next().map_or(1, char::len_utf8));
    let (front, back) = (price[..start].trim(), price[end..].trim());
    let is_sign = |text: &str| !text.is_empty() && !meant_by(text).is_empty();
    if is_sign(front) && back.is_empty() {
        (front, price[start..].trim())
    } else if is_sign(back) && front.is_empty() {
        (back, price[..end].trim())
    } else {
        ("", price)
    }
}

#[cfg(test)]
mod tests {
    use super::split;

    #[test]
    fn signs_come_off_either_end() {
        assert_eq!(split("€31.00"), ("€", "31.00"));
        assert_eq!(split("31 EUR"), ("EUR", "31"));
        assert_eq!(split("31.00 m"), ("", "31.00 m"));
        assert_eq!(split("=B2*1.2"), ("", "=B2*1.2"));
    }
}
