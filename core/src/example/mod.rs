//! The example plans: scenarios of our own, in invented places, that open and account without an error.
//!
//! The files stand in `core/plans/` in the writer's own layout, so that opening and saving one gives back its bytes.
//! Places, numbers of work and measured figures are invented; where amounts follow a public procedure the plan's notes
//! say which.

/// One example plan.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Example {
    /// The key by which it is asked for; also the name of its file.
    pub key: &'static str,
    /// The question asked: the title in the plan.
    pub title: &'static str,
    /// What it shows, in a sentence or two.
    pub about: &'static str,
    /// The plan document.
    pub text: &'static str,
}

/// All examples; the first is the one that is shown where nobody asks for another.
pub static EXAMPLES: &[Example] = &[
    Example {
        key: "harbour-sediment",
        title: "Harbour sediment: leave the Soxhlet bench?",
        about: "A harbour laboratory reports PAH in sediment: Soxhlet, ultrasonic, pressurised liquid and supercritical CO2 \
                beside one another, with drying agent, rinses, concentration and disposables.",
        text: include_str!("../../plans/harbour-sediment.json"),
    },
    Example {
        key: "water-laboratory",
        title: "Pesticides in water: cartridges in place of separating funnels?",
        about: "A water laboratory with two pieces of work: liquid-liquid with dichloromethane beside solid-phase \
                extraction. No drain: the sample's water is a waste stream of its own.",
        text: include_str!("../../plans/water-laboratory.json"),
    },
    Example {
        key: "botanical-pilot",
        title: "Hop extract: close the hexane line and buy a CO2 unit?",
        about: "A pilot plant with a product: hexane that is distilled and drawn again beside CO2 in a closed loop, so \
                that E-factor and process mass intensity appear gross and net of recovery.",
        text: include_str!("../../plans/botanical-pilot.json"),
    },
    Example {
        key: "decaffeination",
        title: "Decaffeinated beans: residue or emission?",
        about: "A coffee works: dichloromethane, ethyl acetate and CO2 in a closed circuit, with what stays in the beans beside what goes to air.",
        text: include_str!("../../plans/decaffeination.json"),
    },
    Example {
        key: "textile-dyeing",
        title: "Polyester: dye from water or from CO2?",
        about: "A dye house: a water bath with its effluent beside CO2 that gives up its dye to the cloth; uptake and heat.",
        text: include_str!("../../plans/textile-dyeing.json"),
    },
    Example {
        key: "garment-cleaning",
        title: "Garments: tetrachloroethylene or CO2?",
        about: "A cleaner's: a closed machine with tetrachloroethylene beside baths of liquid CO2 with a still.",
        text: include_str!("../../plans/garment-cleaning.json"),
    },
    Example {
        key: "implant-cleaning",
        title: "Titanium implants: last traces of oil by solvent or by CO2?",
        about: "Medical metal parts: three rinses in 2-propanol beside three fillings of vented CO2 from cylinders.",
        text: include_str!("../../plans/implant-cleaning.json"),
    },
    Example {
        key: "timber-preservation",
        title: "Window timber: preservative from white spirit or from CO2?",
        about: "A joinery: white spirit that dries off the stack beside CO2 that leaves nothing behind but must be pumped and condensed.",
        text: include_str!("../../plans/timber-preservation.json"),
    },
];

/// The example of this key.
///
/// ```
/// let plan = thimbleworth::example::example("harbour-sediment").unwrap().text;
/// assert!(!thimbleworth::account::account_text(plan).broken());
/// assert!(thimbleworth::example::example("no-such-place").is_none());
/// ```
#[must_use]
pub fn example(key: &str) -> Option<&'static Example> {
    EXAMPLES.iter().find(|e| e.key == key)
}
