//! Empty catalogue files to start from.

const TEXTS: [(&str, &str); 5] = [
    (
        "parts.csv",
        "part,role,description,unit,attributes,tax_class,weight_kg,alternates,hire,note\n\
         my-coax,cable,75 ohm coax that I can get,m,default=yes plug=f vf_tol=0.02,goods,0.045,,,example: replace this row\n\
         my-plug,plug,Plug that fits it,each,default=yes plug=f,goods,0.01,,,example: replace this row\n\
         my-auger,tool,\"Earth auger, by the day\",each,kind=auger,goods,,,yes,example: hired by the day\n",
    ),
    (
        "offers.csv",
        "part,offer,pack,price,currency,priced_on,min_packs,available,supplier,lead_days,ship_group,note\n\
         my-coax,my-coax-305,305,90.00,EUR,2026-03-02,1,,S1,4,heavy,example: a reel of 305 m; price of one reel\n\
         my-coax,my-coax-305x5,305,80.00,EUR,2026-03-02,5,,S1,4,heavy,example: price break from five reels\n\
         my-plug,my-plug-25,25,,EUR,,1,,S1,4,small,example: a blank price is not known yet\n\
         my-auger,my-auger-day,1,45.00,EUR,2026-03-02,1,,S2,1,,example: price of one day\n",
    ),
    (
        "cables.csv",
        "part,z0_ohm,velocity_factor,loss_db_per_100m,conductor,diameter_mm,mass_kg_per_km,breaking_n,note\n\
         my-coax,75,0.82,1.8:0.80 3.6:1.10 10:1.90,copper,6.9,45,,example: MHz:dB pairs as measured or listed\n",
    ),
    (
        "labour.csv",
        "task,what,unit,low_h,likely_h,high_h,terrain,crew_min,skill,tools,weather,after,learns,note\n\
         T07,Set driven post,each,0.08,0.15,0.4,dig,2,any,driver,f,T04 T05,yes,example: your own hours\n\
         T15,Drive earth rod,each,0.05,0.2,1.5,rod,2,any,rotary hammer,f,T02 T04,,example: your own hours\n",
    ),
    (
        "terrain.csv",
        "class,walk,dig,rod,clear,tree,route_factor\n\
         open,1.0,1.0,1.0,0,1.0,1.05\n\
         my-bog,2.0,1.5,1.0,0.5,1.0,1.15\n",
    ),
];

/// The five files of a catalogue, each with its header and a few example rows that say so in their note.
///
/// They are read without complaint over the built-in catalogue.
pub fn template() -> Vec<(&'static str, String)> {
    TEXTS.iter().map(|(name, text)| (*name, (*text).to_owned())).collect()
}
