//! A user's files over the built-in ones.

use arraywright::catalogue::{Catalogue, Source, built_in, load, template};

use crate::support::{file, over_built_in, printed};

#[test]
fn the_offers_of_a_part_replace_all_built_in_offers_of_that_part() {
    let before = built_in();
    assert!(before.offers_of("coax75-foam").count() > 1);
    let text = "part,offer,pack,price,currency\ncoax75-foam,shop-reel,250,100.00,EUR\n";
    let loaded = over_built_in(&[("offers.csv", text)]);
    assert_eq!(printed(&loaded.problems), "");
    let now: Vec<&str> = loaded.catalogue.offers_of("coax75-foam").map(|offer| offer.id.as_str()).collect();
    assert_eq!(now, ["shop-reel"]);
    assert_eq!(loaded.catalogue.offers_of("coax75-gel").count(), before.offers_of("coax75-gel").count());
}

#[test]
fn a_row_replaces_the_row_of_its_id_and_leaves_the_rest() {
    let parts = "part,role,description,unit\nplug-f-6,plug,My own plug,each\n";
    let labour = "task,what,unit,low_h,likely_h,high_h\nT07,Set post,each,0.1,0.2,0.3\n";
    let terrain = "class,walk,route_factor\nbog,3,1.4\n";
    let loaded = over_built_in(&[("parts.csv", parts), ("labour.csv", labour), ("terrain.csv", terrain)]);
    assert_eq!(printed(&loaded.problems), "");
    let catalogue = loaded.catalogue;
    assert_eq!(catalogue.parts["plug-f-6"].description, "My own plug");
    assert_eq!(catalogue.parts["plug-f-6"].source, Source::User);
    assert_eq!(catalogue.parts["plug-f-11"].source, Source::BuiltIn);
    assert_eq!(catalogue.labour["T07"].hours[1].to_string(), "0.2");
    assert_eq!(catalogue.labour.len(), built_in().labour.len());
    assert_eq!(catalogue.terrain.len(), 6);
    assert_eq!(catalogue.terrain["bog"].factors["dig"].to_string(), "1");
}

#[test]
fn a_default_of_the_user_goes_before_the_built_in_one() {
    let parts = "part,role,description,unit,attributes\nz-coax,cable,Coax in reach,m,default=yes\n";
    let loaded = over_built_in(&[("parts.csv", parts)]);
    assert_eq!(loaded.catalogue.default_part("cable").unwrap().id, "z-coax");
    assert_eq!(built_in().default_part("cable").unwrap().id, "coax75-foam");
}

#[test]
fn the_template_reads_back_cleanly_over_the_built_in_catalogue() {
    let files: Vec<_> = template().iter().map(|(name, text)| file(name, text)).collect();
    assert_eq!(files.len(), 5);
    let loaded = load(built_in(), &files, Source::User);
    assert_eq!(printed(&loaded.problems), "");
    assert_eq!(loaded.fixes.to_string(), "");
    assert!(loaded.catalogue.offers["my-plug-25"].price.is_none(), "a blank price is unpriced");
}

#[test]
fn files_can_stand_alone() {
    let parts = "part,role,description,unit\nreel,cable,Coax,m\n";
    let offers = "part,offer,pack,price,currency\nplug-f-6,plugs,25,22.00,EUR\n";
    let files = [file("parts.csv", parts), file("offers.csv", offers)];
    let loaded = load(Catalogue::default(), &files, Source::User);
    assert_eq!(crate::support::codes(&loaded.problems), ["csv-unknown-part"]);
}

#[test]
fn worked_example_files_are_accepted() {
    let parts = "part,role,description,unit,attributes,tax_class,weight_kg,alternates,hire,note\n\
        vector-coax-82,cable,Check cable of velocity factor 0.82,m,plug=f,,,,,for worked vectors\n";
    let offers = "part,offer,pack,price,currency,priced_on,min_packs,available,supplier,lead_days,ship_group,note\n\
        vector-coax-82,vector-coax-82-500,500,100.00,EUR,2026-01-10,1,,S1,3,,for worked vectors\n";
    let cables = "part,z0_ohm,velocity_factor,loss_db_per_100m,conductor,diameter_mm,mass_kg_per_km,breaking_n,note\n\
        vector-coax-82,75,0.82,1.8:1.50 3.6:2.00 10:3.30,copper,6.9,45,,for worked vectors\n";
    let loaded = over_built_in(&[("parts.csv", parts), ("offers.csv", offers), ("cables.csv", cables)]);
    assert_eq!(printed(&loaded.problems), "");
    assert_eq!(loaded.catalogue.cables["vector-coax-82"].loss.len(), 3);
}
