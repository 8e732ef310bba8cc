//! What a plan may say of money, time, climate and equal work, declared once for forms; what it means is read in `money`,
//! `time` and `climate`.

use crate::climate::{Edition, Origin};
use crate::quantity::Kind;
use crate::source::DEFINITION;
use crate::step::{Control, Param};

/// Fields that stand together: below which key, what they are called, and the fields.
pub type Fields = (&'static str, &'static str, &'static [Param]);

/// What may stand under `site`.
pub static SITE_FIELDS: &[Fields] = &[
    (
        "electricity",
        "Electricity",
        &[
            Param::quantity("climate", "CO2-equivalent of electricity", Kind::ClimatePerEnergy),
            Param::quantity("price", "Price of electricity", Kind::PricePerEnergy),
            Param::new("year", "Year of the CO2-equivalent", Control::Count),
            Param::new("boundary", "What the CO2-equivalent counts", Control::Text)
                .hint("Such as generation only."),
            Param::new("source", "Source of these figures", Control::Text),
        ],
    ),
    (
        "money",
        "Prices and money",
        &[
            Param::new("currency", "Currency", Control::Text)
                .hint("Three letters, such as USD or EUR; every price is in it."),
            Param::new("prices", "Prices of materials", Control::PerMaterial(Kind::PricePerVolume))
                .hint("By mass, by volume, or of a pack: 17 USD/L, 3 USD/kg, 95 USD for 2.5 L."),
            Param::new("disposal", "Removal of waste", Control::PerStream(Kind::Money)).hint(
                "By kg, L, container or pick-up, or several of them: 85 USD/container + 140 USD/pick-up.",
            ),
            Param::quantity("pick_ups", "Pick-ups of waste a year", Kind::Number),
            Param::quantity("labour_hour", "An hour of labour", Kind::Money),
            Param::quantity("cooling_water", "Cooling water, sewerage included", Kind::PricePerVolume),
            Param::quantity("discount", "Yearly rate at which later money counts less", Kind::Fraction),
            Param::new("years", "Years of a case", Control::Count).hint("From 1 to 100."),
            Param::new("source", "Source of the prices", Control::Text),
        ],
    ),
    (
        "hours",
        "Hours of instruments",
        &[
            Param::quantity("attended", "Hours of a year with someone there", Kind::Time),
            Param::quantity("unattended", "Further hours in which instruments may run alone", Kind::Time),
        ],
    ),
    (
        "climate",
        "Climate",
        &[
            Param::new("gwp", "Warming potentials of", Control::Choice(Edition::WORDS))
                .default("AR6", DEFINITION),
            Param::new("co2_origin", "Bought CO2 comes from", Control::Choice(Origin::WORDS)),
            Param::new("incinerated", "Share that is burnt", Control::PerStream(Kind::Fraction)),
            Param::new(
                "upstream",
                "CO2-equivalent of making a material",
                Control::PerMaterial(Kind::MassPerMass),
            )
            .hint("Such as 0.9 ± 0.2 kg/kg; needs its source."),
            Param::new("source", "Source of the factors", Control::Text),
        ],
    ),
];

/// What may stand under a route; the first ones stand on the route itself.
pub static ROUTE_FIELDS: &[Fields] = &[
    (
        "",
        "Terms of equal work",
        &[
            Param::quantity("recovery", "Recovery of what is sought", Kind::Fraction)
                .hint("As this route reaches it."),
            Param::new("equivalence", "What the claim of equal work rests on", Control::Text)
                .hint("Paired samples, a standard method, a validation."),
            Param::new(
                "permission",
                "By which method, permit or agreement its results may be reported",
                Control::Text,
            )
            .hint("Without it the route is shown, but not ranked."),
            Param::new("ph", "Lowest and highest pH", Control::Text)
                .hint("Such as 2 to 7, where there is a water phase; for the NEMI criteria."),
        ],
    ),
    (
        "time",
        "Time and instruments",
        &[
            Param::quantity("run", "One run takes the instrument", Kind::Time),
            Param::quantity("at_once", "Extractions in one run", Kind::Number).default("1", DEFINITION),
            Param::quantity("attended", "People's time for each extraction", Kind::Time),
            Param::quantity("attended_batch", "People's time for each batch, beside it", Kind::Time),
            Param::new("unattended", "May run with nobody there", Control::YesNo)
                .default("false", DEFINITION),
            Param::quantity("instruments", "Instruments that are there", Kind::Number),
        ],
    ),
    (
        "money",
        "Money of this route",
        &[
            Param::quantity("instrument", "One more instrument, installed", Kind::Money),
            Param::quantity("validation", "Once, to show that the route works", Kind::Money),
            Param::quantity("residual", "Worth of each bought instrument at the end", Kind::Money),
            Param::quantity("service", "Service and spare parts, a year", Kind::Money),
            Param::quantity("rent", "Rent of cylinders and the like, a year", Kind::Money),
            Param::quantity("other", "Other cost, a year", Kind::Money),
        ],
    ),
];
