//! `[project]`, `[site]` and what lies on the land.

use std::ops::RangeInclusive;

use chrono::NaiveDate;
use rust_decimal::Decimal;

use super::code;
use super::currency;
use super::model::Crossing;
use super::model::{
    CrossingKind, Existing, ExistingThing, Ground, KeepOut, NoiseClass, Site, SitePoint, Terrain,
};
use super::polygon;
use super::role;
use super::table::Table;
use super::value::Value;
use crate::units::{Angle, Conductivity, Currency, Decibel, Frequency, Length, Resistivity};

/// `[project]`.
pub(super) struct Header {
    pub(super) title: String,
    /// `None`: already reported.
    pub(super) currency: Option<Currency>,
    pub(super) estimated: Option<NaiveDate>,
    pub(super) frequency: Option<Frequency>,
    pub(super) also: Vec<Frequency>,
    pub(super) receiver_noise: Decibel,
}

/// Reads `[project]`.
pub(super) fn header(table: &Table<'_>) -> Header {
    let frequency = table.need("frequency", "frequency = \"1.83 MHz\"", frequency);
    let title =
        table.or("title", "Untitled array".to_owned(), "no title given", |v| v.text().map(str::to_owned));
    let header = Header {
        title,
        currency: project_currency(table),
        estimated: table.need("estimated", "estimated = 2026-10-01", Value::date),
        frequency,
        also: table.get("also", |list| Some(also(list, frequency))).unwrap_or_default(),
        receiver_noise: table.or(
            "receiver-noise",
            Decibel::new(12.0),
            "noise figure of a usual receiver (common practice)",
            |v| {
                let noise = v.quantity("dB", Decibel::parse)?;
                if noise.db() < 0.0 { v.negative() } else { Some(noise) }
            },
        ),
    };
    table.finish();
    header
}

fn project_currency(table: &Table<'_>) -> Option<Currency> {
    let euro = Currency::new("EUR");
    table.or_said("currency", euro, "EUR", "no currency given", |v| Some(currency::read(v)))
}

fn frequency(value: &Value<'_>) -> Option<Frequency> {
    const RANGE_HZ: RangeInclusive<u64> = 100_000..=30_000_000;
    let frequency = value.quantity("MHz", Frequency::parse)?;
    if RANGE_HZ.contains(&frequency.hz()) {
        return Some(frequency);
    }
    let message = format!("{frequency} is outside the range of low wires and short verticals");
    value.refuse(code::FREQUENCY_RANGE, message, "accepted: 0.1 MHz to 30 MHz; check the unit")
}

fn also(list: &Value<'_>, design: Option<Frequency>) -> Vec<Frequency> {
    let mut bands: Vec<Frequency> = Vec::new();
    for item in list.items("\"3.55 MHz\"").unwrap_or_default() {
        let Some(band) = frequency(&item) else { continue };
        if design == Some(band) || bands.contains(&band) {
            item.desk.warning(
                code::REPEATED_FREQUENCY,
                item.at,
                format!("{band} is in the list of bands already"),
                "`also` lists the bands besides `frequency`; delete this one",
            );
        } else {
            bands.push(band);
        }
    }
    bands
}

/// Reads `[site]`; `None`: already reported.
pub(super) fn site(table: &Table<'_>) -> Option<Site> {
    let coordinates = coordinates(table);
    let why = "no ground given; 5 mS/m and permittivity 13";
    let ground = table.or_said("ground", Ground::Average, "average", why, ground);
    let soil = table.or_later("soil", "average soil", "no soil resistivity given", |v| {
        v.positive("ohm m", Resistivity::new(0.0), Resistivity::parse)
    });
    let terrain =
        table.or("terrain", Terrain::Open, "no terrain given; open field", |v| v.choice(Terrain::CHOICES));
    let noise =
        table.or("noise", NoiseClass::QuietRural, "no noise class given", |v| v.choice(NoiseClass::CHOICES));
    let receiver = table.need("receiver", "receiver = { east = \"-140 m\", north = \"35 m\" }", site_point);
    let declination = table.get("declination", |v| {
        let angle = v.quantity("deg", Angle::parse)?;
        in_range(v, angle, 180.0)
    });
    let profile = table.get("profile", |v| v.text().map(str::to_owned));
    table.finish();
    Some(Site { coordinates, ground, soil, terrain, noise, receiver: receiver?, declination, profile })
}

/// Refuses an angle of more than `most` degrees to either side.
pub(super) fn in_range(value: &Value<'_>, angle: Angle, most: f64) -> Option<Angle> {
    if angle.degrees().abs() <= most {
        return Some(angle);
    }
    let message = format!("`{}` cannot be {angle}", value.name());
    value.refuse(code::ANGLE_RANGE, message, format!("accepted: \"-{most} deg\" to \"{most} deg\""))
}

fn coordinates(table: &Table<'_>) -> Option<(Decimal, Decimal)> {
    let latitude = table.get("latitude", |v| degrees(v, 90));
    let longitude = table.get("longitude", |v| degrees(v, 180));
    for (has, lacks, example) in
        [("latitude", "longitude", "longitude = 21.64"), ("longitude", "latitude", "latitude = 57.21")]
    {
        if let Some(value) = table.take(has)
            && !table.has(lacks)
        {
            let message = format!("`{has}` stands alone");
            let help = format!("add `{lacks}` (such as {example}), or leave both out");
            value.refuse::<()>(code::HALF_COORDINATES, message, help);
        }
    }
    latitude.zip(longitude)
}

fn degrees(value: &Value<'_>, most: i64) -> Option<Decimal> {
    let degrees = value.ratio()?;
    if degrees.abs() <= Decimal::from(most) {
        return Some(degrees);
    }
    let message = format!("`{}` cannot be {degrees} degrees", value.name());
    value.refuse(
        code::COORDINATE_RANGE,
        message,
        format!("accepted: -{most} to {most}, north and east positive"),
    )
}

fn ground(value: &Value<'_>) -> Option<Ground> {
    const CHOICES: &[(&str, Ground)] = &[
        ("perfect", Ground::Perfect),
        ("good", Ground::Good),
        ("average", Ground::Average),
        ("poor", Ground::Poor),
    ];
    if !matches!(value.raw, toml::de::DeValue::Table(_)) {
        return value.choice(CHOICES);
    }
    let table = value.table()?;
    let conductivity = table.need("conductivity", "conductivity = \"5 mS/m\"", |v| {
        v.positive("mS/m", Conductivity::new(0.0), Conductivity::parse)
    });
    let permittivity = table.need("permittivity", "permittivity = 13", |v| {
        let permittivity = v.ratio()?;
        if permittivity < Decimal::ONE || permittivity > Decimal::ONE_HUNDRED {
            let message = format!("`permittivity` cannot be {permittivity}");
            return v.refuse(
                code::PERMITTIVITY_RANGE,
                message,
                "accepted: 1 (vacuum) to 100; soils have 3 to 40",
            );
        }
        Some(permittivity)
    });
    table.finish();
    Some(Ground::Given { conductivity: conductivity?, permittivity: permittivity? })
}

/// `{ east, north }`.
pub(super) fn site_point(value: &Value<'_>) -> Option<SitePoint> {
    let table = value.table_like("{ east = \"0 m\", north = \"0 m\" }")?;
    let east = table.need("east", "east = \"0 m\"", Value::length);
    let north = table.need("north", "north = \"0 m\"", Value::length);
    table.finish();
    Some(SitePoint { east: east?, north: north? })
}

/// `[[keep-out]]`.
pub(super) fn keep_out(table: &Table<'_>) -> Option<KeepOut> {
    let name = table.need("name", "name = \"pond\"", Value::name_text);
    let polygon = table.need("polygon", "polygon = [{ east = \"0 m\", north = \"0 m\" }, …]", |value| {
        let corners: Vec<Option<SitePoint>> =
            value.items("{ east = \"0 m\", north = \"0 m\" }, …")?.iter().map(site_point).collect();
        polygon::check(value, corners.into_iter().collect::<Option<Vec<_>>>()?)
    });
    table.finish();
    Some(KeepOut { name: name?, polygon: polygon? })
}

/// `[[crossing]]`.
pub(super) fn crossing(table: &Table<'_>) -> Option<Crossing> {
    let kind = table.need("kind", "kind = \"road\"", |v| v.choice(CrossingKind::CHOICES));
    let width = table.need("width", "width = \"4 m\"", Value::positive_length);
    let at = table.need("at", "at = { east = \"0 m\", north = \"0 m\" }", site_point);
    table.finish();
    let place = table.at().map(|at| table.desk.place(Some(at)));
    Some(Crossing { kind: kind?, width: width?, at: at?, place })
}

/// `[[existing]]`.
pub(super) fn existing(table: &Table<'_>) -> Option<Existing> {
    let label = table.get("label", |v| v.text().map(|text| ExistingThing::Label(text.to_owned())));
    let role = table.get("role", |v| role::read(v).map(ExistingThing::Role));
    let quantity = table.or("quantity", Decimal::ONE, "no quantity given", |v| {
        let quantity = v.ratio()?;
        if quantity > Decimal::ZERO { Some(quantity) } else { v.not_positive() }
    });
    table.finish();
    if table.has("label") == table.has("role") {
        table.desk.error(
            code::LABEL_OR_ROLE,
            table.at(),
            "what exists is named by `label` or by `role`, one of them",
            "write label = \"B1\" for one labelled thing, or role = \"mast\" for any of a kind",
        );
        return None;
    }
    let place = table.at().map(|at| table.desk.place(Some(at)));
    Some(Existing { what: label.or(role)?, quantity, place })
}

/// The frame of a length on site, for messages that name the shortest and longest wave.
#[derive(Clone, Copy)]
pub(super) struct Bands {
    /// The design frequency.
    pub(super) design: Frequency,
    /// The lowest band.
    pub(super) lowest: Frequency,
    /// The highest band.
    pub(super) highest: Frequency,
}

impl Header {
    /// The bands of the project, if the design frequency could be read.
    pub(super) fn bands(&self) -> Option<Bands> {
        let design = self.frequency?;
        let all = || self.also.iter().copied().chain([design]);
        Some(Bands { design, lowest: all().min()?, highest: all().max()? })
    }
}

/// A length in wavelengths of a band.
pub(super) fn in_waves(length: Length, band: Frequency) -> f64 {
    length.metres() / band.wavelength_m()
}
