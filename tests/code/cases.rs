//! The classifications in `cases.toml`, where each cites its rule.
use thimbleworth::code::{Activity, Answer, Charge, Contents, Flash, Part, Rules, classify};
use thimbleworth::material::{Class, Substance, catalogue};
use thimbleworth::room::Day;
use toml::{Table, Value};

/// What the catalogue does not hold: name, CAS number, density in kg/m³ where it is a liquid.
const OWN: [(&str, &str, Option<f64>); 6] = [
    ("lead", "7439-92-1", None),
    ("cadmium", "7440-43-9", None),
    ("o-cresol", "95-48-7", None),
    ("m-cresol", "108-39-4", None),
    ("oil", "8001-21-6", Some(920.0)),
    ("hexadecane", "544-76-3", Some(773.0)),
];

fn substance(name: &str) -> (Substance, Option<f64>) {
    if let Some((_, cas, density)) = OWN.iter().find(|o| o.0 == name) {
        let mut own = Substance::blank(name.to_owned(), Class::Solute);
        own.cas = Some((*cas).into());
        return (own, *density);
    }
    let known = catalogue().find(name).expect(name).clone();
    let liquid = matches!(known.class, Class::Solvent | Class::Water | Class::Reagent);
    // Water of exactly 1 kg/L, so that milligrams in a litre are round.
    let density = if known.class == Class::Water {
        1000.0
    } else {
        known.density_kg_m3(293.15).map_or(1000.0, |f| f.value)
    };
    (known, liquid.then_some(density))
}

fn rows(value: &Value) -> Vec<(&str, f64)> {
    value.as_table().unwrap().iter().map(|(k, v)| (k.as_str(), v.as_float().unwrap())).collect()
}

fn texts(case: &Value, key: &str) -> Vec<String> {
    case[key].as_array().unwrap().iter().map(|v| v.as_str().unwrap().to_owned()).collect()
}

#[test]
fn worked_classifications() {
    let table: Table = include_str!("cases.toml").parse().unwrap();
    let cases = table["case"].as_array().unwrap();
    assert!(cases.len() >= 60, "{}", cases.len());
    let mut wrong = String::new();
    for case in cases {
        let name = case["name"].as_str().unwrap();
        assert!(!case["source"].as_str().unwrap().is_empty(), "{name} cites nothing");
        let parts: Vec<(Substance, Option<f64>, f64)> =
            rows(&case["parts"]).into_iter().map(|(n, kg)| (substance(n).0, substance(n).1, kg)).collect();
        let charged: Vec<Vec<(Substance, f64)>> = case
            .get("charges")
            .and_then(Value::as_array)
            .into_iter()
            .flatten()
            .map(|c| rows(c).into_iter().map(|(n, share)| (substance(n).0, share)).collect())
            .collect();
        let flag = |key: &str| case.get(key).and_then(Value::as_bool).unwrap_or(false);
        let ph = case.get("ph").and_then(Value::as_array);
        let contents = Contents {
            solid: flag("solid"),
            unused: flag("unused"),
            parts: parts
                .iter()
                .map(|(substance, density_kg_m3, kg)| Part {
                    substance,
                    kg: *kg,
                    density_kg_m3: *density_kg_m3,
                })
                .collect(),
            charges: charged
                .iter()
                .enumerate()
                .map(|(i, c)| Charge {
                    what: format!("charge {i}"),
                    volumes_m3: c.iter().map(|(s, v)| (s, *v)).collect(),
                })
                .collect(),
            ph: ph.map(|p| (p[0].as_float().unwrap(), p[1].as_float().unwrap())),
            flash: case.get("flash_c").and_then(Value::as_float).map(|c| Flash::AtK(c + 273.15)),
            activity: case
                .get("activity")
                .and_then(Value::as_str)
                .map_or(Activity::Laboratory, |w| Activity::of(w).unwrap()),
        };
        let day = case.get("as_of").and_then(Value::as_str).unwrap_or("2026-12-01");
        let rules = Rules::of(case["rules"].as_str().unwrap());
        let verdicts = classify(&contents, rules, Some(Day::parse(day).unwrap()));
        let codes = |open: bool| {
            let mut found: Vec<String> = verdicts
                .iter()
                .filter(|v| v.rule.key != "transport" && v.rule.key != "notice")
                .filter(|v| if open { v.open() } else { v.applies() })
                .map(|v| v.code.to_string())
                .collect();
            found.sort();
            found
        };
        for (key, open) in [("applies", false), ("test", true)] {
            let (found, wanted) = (codes(open), texts(case, key));
            if found != wanted {
                wrong.push_str(&format!("{name}: {key} {found:?}, not {wanted:?}\n"));
            }
        }
        for v in &verdicts {
            let cited = v.rule.citation();
            assert!(
                !v.why.is_empty() && !v.change.is_empty() && !cited.cite.is_empty(),
                "{name}: {}",
                v.code
            );
            assert!(v.answer != Answer::No || !v.applies());
        }
        let transport = verdicts.iter().find(|v| v.rule.key == "transport").unwrap();
        if let Some(un) = case.get("un").and_then(Value::as_str) {
            let found = if transport.code == "UN" { "" } else { &*transport.code };
            let words = case.get("words").and_then(Value::as_str).unwrap_or("");
            if found != un || !transport.why.contains(words) {
                wrong.push_str(&format!("{name}: transport {found}: {}; not {un} {words}\n", transport.why));
            }
        }
    }
    assert!(wrong.is_empty(), "{wrong}");
}
