//! Currency codes of ISO 4217, to catch a mistyped one.

use super::code;
use super::value::Value;
use crate::units::Currency;

/// The codes in common use (ISO 4217; from memory, so one that is not here is a warning only).
const LISTED: &str = "AED AFN ALL AMD ANG AOA ARS AUD AWG AZN BAM BBD BDT BGN BHD BIF BMD BND BOB BRL BSD BTN \
    BWP BYN BZD CAD CDF CHF CLP CNY COP CRC CUP CVE CZK DJF DKK DOP DZD EGP ERN ETB EUR FJD FKP GBP GEL GHS GIP \
    GMD GNF GTQ GYD HKD HNL HTG HUF IDR ILS INR IQD IRR ISK JMD JOD JPY KES KGS KHR KMF KPW KRW KWD KYD KZT LAK \
    LBP LKR LRD LSL LYD MAD MDL MGA MKD MMK MNT MOP MRU MUR MVR MWK MXN MYR MZN NAD NGN NIO NOK NPR NZD OMR PAB \
    PEN PGK PHP PKR PLN PYG QAR RON RSD RUB RWF SAR SBD SCR SDG SEK SGD SHP SLE SOS SRD SSP STN SVC SYP SZL THB \
    TJS TMT TND TOP TRY TTD TWD TZS UAH UGX USD UYU UZS VES VND VUV WST XAF XCD XOF XPF YER ZAR ZMW ZWG";

/// Reads a currency code.
pub(super) fn read(value: &Value<'_>) -> Option<Currency> {
    let text = value.text()?;
    let Some(currency) = Currency::new(text) else {
        let upper = text.to_uppercase();
        let help = match Currency::new(&upper) {
            Some(_) => format!("write \"{upper}\""),
            None => "write the three capital letters of ISO 4217, such as \"EUR\"".to_owned(),
        };
        let message = format!("\"{}\" is not a currency code", text.escape_debug());
        return value.refuse(code::BAD_CURRENCY, message, help);
    };
    if !LISTED.split_whitespace().any(|listed| listed == text) {
        let message = format!("the currency {text} is not one that this program knows");
        let help = "check the letters; if they are right, two decimals are assumed";
        value.desk.warning(code::UNLISTED_CURRENCY, value.at, message, help);
    }
    Some(currency)
}
