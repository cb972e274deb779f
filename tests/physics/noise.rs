//! External noise, cascades, what noise costs.

use arraywright::physics::noise::{
    SiteNoise, Stage, attenuator_figure, cascade, cascade_factor, galactic, noise_power_dbm, power_sum_db,
    snr_loss_from_excess, system_noise, thermal_density_dbm_per_hz,
};
use arraywright::units::Decibel;

use crate::harness::{Answer, Answers, Check, answers, computed, walk};

#[test]
fn noise() {
    walk("noise", &[], answer);
}

fn db(check: &Check, name: &str) -> Decibel {
    Decibel::new(check.number(name))
}

fn answer(check: &Check) -> Option<Answers> {
    let id = check.id.as_str();
    match id {
        "noise-p372-deciles" => Some(deciles()),
        "noise-kt0" => {
            let density = thermal_density_dbm_per_hz(check.number("temperature"));
            let power = noise_power_dbm(Decibel::new(0.0), check.number("bandwidth"));
            Some(computed([("kt0_density", density), ("power", power)]))
        }
        "noise-external-power" => {
            Some(computed([("power", noise_power_dbm(db(check, "fam"), check.number("bandwidth")))]))
        }
        "noise-friis-two" => {
            let first = Stage { noise_figure: db(check, "nf1"), gain: db(check, "gain1") };
            Some(chain(&[first, Stage::receiver(db(check, "nf2"))]))
        }
        "noise-friis-coax" => {
            let [preamp, coax, receiver] = parts(check);
            Some(chain(&[preamp, coax, receiver]))
        }
        "noise-friis-coax-first" => {
            let [preamp, coax, receiver] = parts(check);
            Some(chain(&[coax, preamp, receiver]))
        }
        "noise-friis-published" => {
            let pairs = check.list("nf").into_iter().zip(check.list("gain"));
            let stage = |(nf, gain)| Stage { noise_figure: Decibel::new(nf), gain: Decibel::new(gain) };
            Some(chain(&pairs.map(stage).collect::<Vec<_>>()))
        }
        "noise-attenuator-hot" => {
            let figure = attenuator_figure(db(check, "loss"), check.number("temperature"));
            Some(computed([("nf", figure.db())]))
        }
        "noise-margin-10db" => Some(computed([("snr_loss", snr_loss_from_excess(db(check, "excess")).db())])),
        "noise-power-sum" => Some(computed([("sum", power_sum_db(&[check.number("a"), check.number("b")]))])),
        _ if id.starts_with("noise-fam-") => median(check),
        _ if id.starts_with("noise-system-") => {
            let system =
                system_noise(db(check, "external_fa"), db(check, "antenna_loss"), db(check, "receiver_nf"));
            Some(computed([("system_f", system.figure.db()), ("snr_loss", system.snr_loss.db())]))
        }
        _ => None,
    }
}

fn parts(check: &Check) -> [Stage; 3] {
    [
        Stage { noise_figure: db(check, "preamp_nf"), gain: db(check, "preamp_gain") },
        Stage::passive(db(check, "coax_loss")),
        Stage::receiver(db(check, "receiver_nf")),
    ]
}

fn chain(stages: &[Stage]) -> Answers {
    computed([("f_total", cascade_factor(stages)), ("nf_total", cascade(stages).db())])
}

fn median(check: &Check) -> Option<Answers> {
    let f = check.frequency_mhz();
    let figure = match check.text("environment") {
        "city" => SiteNoise::City.median(f),
        "residential" => SiteNoise::Residential.median(f),
        "rural" => SiteNoise::Rural.median(f),
        "quiet-rural" => SiteNoise::QuietRural.median(f),
        "galactic" => galactic(f),
        _ => return None,
    };
    Some(computed([("fam", figure.db())]))
}

fn deciles() -> Answers {
    let upper = |site: SiteNoise| Answer::Tabulated(site.deciles().upper.db());
    let lower = |site: SiteNoise| Answer::Tabulated(site.deciles().lower.db());
    answers([
        ("du_city", upper(SiteNoise::City)),
        ("dl_city", lower(SiteNoise::City)),
        ("du_residential", upper(SiteNoise::Residential)),
        ("dl_residential", lower(SiteNoise::Residential)),
        ("du_rural", upper(SiteNoise::Rural)),
        ("dl_rural", lower(SiteNoise::Rural)),
    ])
}
