//! What it costs, for people and machines.

use rust_decimal::Decimal;
use serde_json::{Value, json};

use super::OptionResult;
use super::machine::{assumed, document, money, number};
use super::sheet::{Sheet, Table};
use crate::pricing::{Bill, BillLine};
use crate::project::Project;
use crate::units::Money;

/// The sentence that stands wherever hours are not counted.
pub const NO_LABOUR: &str =
    "hours and labour cost are not counted yet; the total is materials, freight, tax and contingency";

/// The `estimate` document.
pub fn document_of(hash: &str, project: &Project, results: &[OptionResult]) -> Value {
    let options = results.iter().map(|result| option(project, result)).collect();
    document("estimate", hash, Some(project), vec![("options", Value::Array(options))])
}

fn option(project: &Project, result: &OptionResult) -> Value {
    let bill = &result.bill;
    let zero = Money::ZERO.rounded(&project.currency);
    let listed =
        |amount: Money| json!({ "listed": amount.to_string(), "low": null, "likely": null, "high": null });
    let unpriced = bill.unpriced.iter().map(|missing| {
        json!({ "part": missing.part, "quantity": number(missing.quantity), "unit": missing.unit, "why": missing.why })
    });
    json!({
        "option": result.design.option,
        "complete": bill.unpriced.is_empty(),
        "lines": bill.lines.iter().map(line).collect::<Vec<_>>(),
        "materials": listed(bill.materials),
        "freight": listed(bill.freight),
        "tax": listed(bill.tax),
        "hire": listed(zero),
        "labour": listed(zero),
        "contingency": listed(bill.contingency),
        "total": listed(bill.total),
        "hours": { "listed": null, "low": null, "likely": null, "high": null },
        "crew_days": null,
        "assumptions": assumed(&project.assumptions),
        "unpriced": unpriced.collect::<Vec<_>>(),
        "freight_lines": charges(&bill.freight_lines),
        "tax_lines": charges(&bill.tax_lines),
        "hints": bill.hints,
    })
}

fn charges(charges: &[crate::pricing::Charge]) -> Value {
    charges.iter().map(|c| json!({ "name": c.name, "amount": money(c.amount), "reason": c.reason })).collect()
}

fn line(line: &BillLine) -> Value {
    json!({
        "part": line.part,
        "offer": line.offer,
        "description": line.description,
        "roles": line.roles,
        "needed": number(line.needed),
        "on_hand": number(line.on_hand),
        "packs": line.packs,
        "pack": number(line.pack),
        "bought": number(line.bought),
        "left": number(line.left),
        "unit": line.unit,
        "unit_price": unit_price(line).map(|price| price.to_string()),
        "pack_price": line.pack_price.map(money),
        "amount": line.amount.map(money),
        "supplier": line.supplier,
        "priced_on": if line.priced_on.is_empty() { Value::Null } else { json!(line.priced_on) },
        "price_source": line.price_source,
        "reason": line.reason.join("; "),
    })
}

/// The price of one unit: pack price over pack, to six decimals.
fn unit_price(line: &BillLine) -> Option<Decimal> {
    let price = line.pack_price?;
    (line.pack > Decimal::ZERO).then(|| (price.amount() / line.pack).round_dp(6).normalize())
}

/// The estimate for people: what is missing first, then the totals, then the lines.
pub fn sheet(project: &Project, results: &[OptionResult], notes: Vec<String>) -> Sheet {
    let mut sheet = Sheet::default();
    for result in results {
        answer(&mut sheet, project, result);
    }
    for result in results {
        sheet.tables.push(lines(project, result));
        sheet.tables.push(totals(project, result));
    }
    let mut assumptions = Table::new("assumptions (every default that was used)", &["key", "value", "why"]);
    for a in &project.assumptions {
        assumptions.rows.push(vec![a.key.clone(), a.value.clone(), a.why.clone()]);
    }
    sheet.tables.push(assumptions);
    let mut hints: Vec<String> = results.iter().flat_map(|result| result.bill.hints.clone()).collect();
    hints.sort();
    hints.dedup();
    sheet.notes.extend(hints);
    sheet.notes.push(NO_LABOUR.to_owned());
    sheet.notes.extend(notes);
    sheet
}

fn answer(sheet: &mut Sheet, project: &Project, result: &OptionResult) {
    let bill = &result.bill;
    if !bill.unpriced.is_empty() {
        let parts: Vec<String> = bill
            .unpriced
            .iter()
            .map(|missing| {
                format!(
                    "{} ({} {}: {})",
                    missing.part,
                    missing.quantity.normalize(),
                    missing.unit,
                    missing.why
                )
            })
            .collect();
        sheet.answer.push(format!(
            "unpriced, so the total of {} is incomplete: {}",
            result.name(),
            parts.join(", ")
        ));
    }
    sheet.answer.push(format!(
        "{} costs {} {}{}: materials {}, freight {}, tax {}, contingency {}",
        result.name(),
        project.currency,
        bill.total,
        if bill.unpriced.is_empty() { "" } else { " and what is unpriced" },
        bill.materials,
        bill.freight,
        bill.tax,
        bill.contingency,
    ));
}

fn titled(result: &OptionResult, what: &str) -> String {
    if result.design.option.is_empty() {
        what.to_owned()
    } else {
        format!("{}: {what}", result.design.option)
    }
}

fn lines(project: &Project, result: &OptionResult) -> Table {
    let heads = [
        "part",
        "#needed",
        "#on hand",
        "#packs",
        "#of",
        "#bought",
        "#left",
        "unit",
        "#pack price",
        "#amount",
        "offer",
    ];
    let title = titled(result, &format!("materials in {}", project.currency));
    let mut table = Table::new(title, &heads);
    for line in &result.bill.lines {
        let plain = |value: Decimal| value.normalize().to_string();
        table.rows.push(vec![
            line.part.clone(),
            plain(line.needed),
            if line.on_hand.is_zero() { String::new() } else { plain(line.on_hand) },
            line.packs.to_string(),
            plain(line.pack),
            plain(line.bought),
            plain(line.left),
            line.unit.clone(),
            line.pack_price.map_or_else(String::new, |price| price.rounded(&project.currency).to_string()),
            line.amount.map_or_else(|| "unpriced".to_owned(), |amount| amount.to_string()),
            line.offer.clone().unwrap_or_default(),
        ]);
    }
    table
}

fn totals(project: &Project, result: &OptionResult) -> Table {
    let bill: &Bill = &result.bill;
    let title = titled(result, &format!("totals in {}", project.currency));
    let mut table = Table::new(title, &["what", "#amount", "how"]);
    let mut row = |what: &str, amount: Money, how: String| {
        table.rows.push(vec![what.to_owned(), amount.to_string(), how]);
    };
    row("materials", bill.materials, "sum of the lines above".to_owned());
    for charge in &bill.freight_lines {
        row(&format!("freight {}", charge.name), charge.amount, charge.reason.clone());
    }
    for charge in &bill.tax_lines {
        row(&format!("tax {}", charge.name), charge.amount, charge.reason.clone());
    }
    let rate = project.prices.contingency;
    row("contingency", bill.contingency, format!("{rate} of materials and freight"));
    let how = if bill.unpriced.is_empty() { "sum of the above" } else { "incomplete: parts are unpriced" };
    row("total", bill.total, how.to_owned());
    table
}
