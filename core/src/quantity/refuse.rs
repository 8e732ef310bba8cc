//! Spellings that are refused with a reason or a question of their own, because a guess could be wrong by a factor.

use super::Kind;

/// A spelling, the kinds of which it would be a unit, and the reply.
struct Refused {
    spellings: &'static [&'static str],
    kind: Kind,
    reply: &'static str,
}

const fn no(kind: Kind, spellings: &'static [&'static str], reply: &'static str) -> Refused {
    Refused { spellings, kind, reply }
}

const GAUGE: &str = "a gauge pressure depends on the air pressure of the day; write the absolute pressure, which is \
                     gauge plus about 1.013 bar at sea level";
const GAS: &str = "a gas volume at reference conditions needs their temperature and pressure; write the mass, like 20 g \
                   or 20 g/min";
const CALORIE: &str = "4.184 J (thermochemical) or 4.1868 J (International Table)? Write it in kJ or kWh";

/// The numbers in the replies are for the reader's eye only; nothing is computed from them.
static REFUSED: &[Refused] = &[
    no(Kind::Mass, &["Mg"], "megagram or mg? Write t or mg"),
    no(
        Kind::Mass,
        &["ton", "tons", "MT", "mt", "metric ton"],
        "1000 kg (t), 907.2 kg (short) or 1016 kg (long)? Write t or kg",
    ),
    no(Kind::Mass, &["gr"], "grain or gram? Write g or mg"),
    no(Kind::Volume, &["ML", "Ml"], "that is a megalitre; is mL meant?"),
    no(
        Kind::Volume,
        &["gal", "gals", "gallon", "gallons"],
        "US gal (3.785 L) or imperial gallon (4.546 L)? Write US gal or L",
    ),
    no(
        Kind::Volume,
        &["qt", "quart", "quarts"],
        "US qt (0.946 L) or imperial quart (1.137 L)? Write US qt or L",
    ),
    no(Kind::Volume, &["fl oz", "pt", "pint", "pints"], "US or imperial measure? Write mL"),
    no(Kind::Volume, &["cc", "ccm"], "is mL meant?"),
    no(Kind::Volume, &["NL", "Nl", "SL", "Nm3", "Sm3", "Nml", "NmL", "scf"], GAS),
    no(Kind::VolumeFlow, &["sccm", "slm", "slpm", "scfm", "scfh"], GAS),
    no(Kind::Time, &["m"], "5 min or 5 months? Write min or month"),
    no(Kind::Time, &["M", "mo", "mon"], "5 min or 5 months? Write min or month"),
    no(Kind::Time, &["a", "y"], "write year"),
    no(Kind::Pressure, &["mPa"], "that is a millipascal; is MPa meant?"),
    no(Kind::Pressure, &["barg", "bar g", "bar(g)", "bar (g)", "bar gauge", "mbarg"], GAUGE),
    no(
        Kind::Pressure,
        &["psig", "psi g", "psi(g)", "psi (g)", "psi gauge", "kPag", "kPa(g)", "MPag", "MPa(g)"],
        GAUGE,
    ),
    no(Kind::Pressure, &["at", "kp/cm2", "kgf/cm2"], "a technical atmosphere is 0.980 665 bar; write bar"),
    no(Kind::Power, &["mW", "MW"], "milliwatt or megawatt? Write it in W or kW"),
    no(Kind::Power, &["hp", "PS"], "there are several horsepowers; write it in W or kW"),
    no(Kind::Energy, &["cal", "kcal", "Cal"], CALORIE),
    no(
        Kind::Energy,
        &["BTU", "Btu", "therm"],
        "there are several British thermal units; write it in kJ or kWh",
    ),
    no(Kind::Energy, &["mJ"], "that is a millijoule; is MJ meant?"),
    no(
        Kind::Fraction,
        &["ppb", "ppt"],
        "a billion is not the same everywhere; write it in ppm or as a power of ten",
    ),
    no(Kind::Temperature, &["°K", "degK"], "kelvin has no degree sign; write K"),
    no(Kind::Temperature, &["R", "°R", "°Re"], "write it in °C or K"),
    no(Kind::TemperatureDifference, &["°K", "degK"], "kelvin has no degree sign; write K"),
    no(Kind::Frequency, &["rpm", "RPM"], "write it per minute, like 200 /min"),
    no(Kind::Money, &["$"], "which dollar? Write USD, CAD, AUD or another three-letter code"),
    no(Kind::Money, &["¥"], "yen or yuan? Write JPY or CNY"),
    no(Kind::Money, &["kr"], "which crown? Write DKK, NOK, SEK or another three-letter code"),
];

/// The reply to a spelling that is refused as a unit of `kind`.
pub(super) fn refused(spelling: &str, kind: Kind) -> Option<&'static str> {
    REFUSED
        .iter()
        .find(|refused| refused.kind == kind && refused.spellings.contains(&spelling))
        .map(|refused| refused.reply)
}

/// The reply to a climate factor that names CO2 alone.
pub(super) const CO2_ALONE: &str =
    "CO2 alone or CO2-equivalent? Write kg CO2e/kWh, or kg/kWh, which is read as CO2-equivalent";
