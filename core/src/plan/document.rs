//! The plan as typed text: every amount is kept as it was written, so that saving never prints a float and a
//! half-typed amount can be held. `Eq` all through: two plans are compared by value.

/// The version of the plan document that this library reads and writes.
pub const PLAN_VERSION: u64 = 1;

/// One value of a field as the document holds it.
#[derive(Clone, Debug, PartialEq, Eq)]
pub enum Field {
    /// Text: an amount, a name, a word.
    Text(String),
    /// A bare number, kept as it was written.
    Number(String),
    /// Yes or no.
    YesNo(bool),
    /// Several named values in the order written: a mixture, a share for each material.
    Rows(Vec<(String, String)>),
}

/// A whole question.
#[derive(Clone, Debug, Default, PartialEq, Eq)]
pub struct Plan {
    /// What is asked.
    pub title: String,
    /// Free text that prints with the report.
    pub notes: Option<String>,
    /// The whole number from which draws of uncertain amounts follow; 1 when left out.
    pub seed: Option<Field>,
    /// The site: rules, date, streams.
    pub site: Site,
    /// Materials that the plan adds to the catalogue or overrides, each with its source.
    pub materials: Vec<OwnMaterial>,
    /// The pieces of work.
    pub workloads: Vec<Workload>,
    /// How the site's own records are read: one entry a file.
    pub logs: Vec<Log>,
}

/// How one of the site's records is read: a preparation log, a purchase ledger, a stock count and so on.
#[derive(Clone, Debug, Default, PartialEq, Eq)]
pub struct Log {
    /// Its name, as a rule that of the file.
    pub name: String,
    /// Which register it is, in a word of [`log::Register`](crate::log::Register).
    pub register: String,
    /// Headings with what stands below them, `amount in mL`.
    pub columns: Vec<(String, String)>,
    /// `day first` or `month first`, for dates with strokes.
    pub dates: Option<String>,
    /// `point` or `comma`.
    pub decimals: Option<String>,
    /// How far the amounts can be off, as a share.
    pub uncertainty: Option<String>,
    /// Names in the file with the names in the plan that they mean.
    pub means: Vec<(String, String)>,
}

/// The site whose work it is.
#[derive(Clone, Debug, Default, PartialEq, Eq)]
pub struct Site {
    /// Its name.
    pub name: String,
    /// `US`, `EU` or `none`.
    pub rules: Option<String>,
    /// The date on which the rules are read, `2026-12-01`.
    pub as_of: Option<String>,
    /// The temperature at which solvents are poured and stored.
    pub bench_temperature: Option<String>,
    /// The named permit under which something may go down the drain.
    pub drain_permit: Option<String>,
    /// Kept for the accounts of energy, climate and cost.
    pub electricity: Option<Electricity>,
    /// The room, for the account of its air.
    pub room: Option<Room>,
    /// The waste streams that the site keeps apart.
    pub streams: Vec<Stream>,
    /// The kind of work, for the chapter of the List of Waste.
    pub activity: Option<String>,
    /// Hazardous waste that the site makes beside this work.
    pub other_waste: Vec<OtherWaste>,
    /// The longest that waste may be stored on site.
    pub storage_limit: Option<String>,
    /// The interval of pick-ups.
    pub pick_up_every: Option<String>,
    /// Whether the receiving facility lies more than 200 miles away.
    pub far_receiver: Option<bool>,
    /// Where state or nation deviate from the rules read.
    pub deviations: Option<String>,
    /// Currency, prices of materials, disposal, labour and water, discount rate and years, in the order written.
    pub money: Vec<(String, Field)>,
    /// Hours in which instruments can run, in the order written.
    pub hours: Vec<(String, Field)>,
    /// Edition of warming potentials, origin of CO2, what is burnt, factors of production, in the order written.
    pub climate: Vec<(String, Field)>,
}

/// Hazardous waste that a site makes beside the work of the plan.
#[derive(Clone, Debug, Default, PartialEq, Eq)]
pub struct OtherWaste {
    /// What it is.
    pub name: String,
    /// Its mass in each of its months.
    pub each_month: String,
    /// Its months, `9-12, 1-5`; all when left out.
    pub months: Option<String>,
    /// Whether it is acutely hazardous.
    pub acute: Option<bool>,
}

/// What the site knows of its electricity.
#[derive(Clone, Debug, Default, PartialEq, Eq)]
pub struct Electricity {
    /// CO2-equivalent per energy.
    pub climate: Option<String>,
    /// Price per energy.
    pub price: Option<String>,
    /// The year for which the climate figure holds.
    pub year: Option<Field>,
    /// What the climate figure counts.
    pub boundary: Option<String>,
    /// Where these figures come from.
    pub source: Option<String>,
}

/// The room in which the work happens: what the plan gives, as text, by key.
#[derive(Clone, Debug, Default, PartialEq, Eq)]
pub struct Room {
    given: Vec<(&'static str, String)>,
}

impl Room {
    /// What the plan gives under a key.
    #[must_use]
    pub fn get(&self, key: &str) -> Option<&str> {
        self.given.iter().find(|(k, _)| *k == key).map(|(_, text)| text.as_str())
    }

    /// Gives a text under a key, or takes it away; false where the room has no such key. The keys keep their order.
    ///
    /// ```
    /// use thimbleworth::plan::Room;
    /// let mut room = Room::default();
    /// assert!(room.set("air_changes", Some("8 /h".to_owned())) && room.set("volume", Some("140 m3".to_owned())));
    /// assert_eq!(room.given().next(), Some(("volume", "140 m3")));
    /// assert!(!room.set("windows", None));
    /// ```
    pub fn set(&mut self, key: &str, text: Option<String>) -> bool {
        let rank = |key: &str| super::keys::ROOM.keys.iter().position(|k| k.name == key);
        let Some(at) = rank(key) else { return false };
        self.given.retain(|(k, _)| *k != key);
        if let Some(text) = text {
            let place = self.given.iter().position(|(k, _)| rank(k) > Some(at)).unwrap_or(self.given.len());
            self.given.insert(place, (super::keys::ROOM.keys[at].name, text));
        }
        true
    }

    /// All that is given, in the order of the keys.
    pub fn given(&self) -> impl Iterator<Item = (&'static str, &str)> {
        self.given.iter().map(|(k, text)| (*k, text.as_str()))
    }
}

/// A waste stream that the site keeps apart.
#[derive(Clone, Debug, Default, PartialEq, Eq)]
pub struct Stream {
    /// Its name; steps and ends refer to it.
    pub name: String,
    /// `liquid` or `solid`; liquid when left out.
    pub holds: Option<String>,
    /// The size of one container.
    pub container: Option<String>,
    /// How full a container is when it is closed.
    pub fill: Option<String>,
    /// Bulk density, for solids.
    pub bulk_density: Option<String>,
    /// `none`, `recycling`, `degradation` or `passivation`: what happens to it on site.
    pub treatment: Option<String>,
    /// Lowest and highest pH measured in its containers.
    pub ph: Option<String>,
    /// Flash point by a closed-cup test, or `none`.
    pub flash_point: Option<String>,
    /// Whether what goes in is unused product.
    pub unused: Option<bool>,
    /// What its containers are made of.
    pub made_of: Option<String>,
    /// The relative density up to which the mark on the container allows a liquid.
    pub density_mark: Option<Field>,
    /// `central` or `satellite`.
    pub area: Option<String>,
    /// `when made`, `reclaimed`, `reclaimed at once` or `treated at once`.
    pub counted: Option<String>,
    /// What goes round of a reclaimed stream.
    pub goes_round: Option<String>,
    /// How far the air that filling pushes out is saturated with vapour; not counted when left out.
    pub saturation: Option<String>,
    /// `hood` or `room`: where that air goes.
    pub vented_to: Option<String>,
}

/// A material that the plan adds to the catalogue or overrides there.
#[derive(Clone, Debug, Default, PartialEq, Eq)]
pub struct OwnMaterial {
    /// Its name.
    pub name: String,
    /// Its fields in the order written: `class`, `cas`, `density`, `hazards`, `source` and so on.
    pub fields: Vec<(String, Field)>,
}

/// One piece of work, done by any of several routes.
#[derive(Clone, Debug, Default, PartialEq, Eq)]
pub struct Workload {
    /// Its name.
    pub name: String,
    /// Results reported (or product batches made) in a year.
    pub results_per_year: Option<Field>,
    /// Samples in a batch as batches really leave, results only.
    pub batch_samples: Option<Field>,
    /// Blanks and other control samples that go with each batch.
    pub batch_controls: Option<Field>,
    /// Share of results that have to be done again.
    pub repeats: Option<String>,
    /// Whether repeats bring their own controls (yes when left out).
    pub repeats_bring_controls: Option<bool>,
    /// Whether controls carry feed like a sample (yes when left out).
    pub controls_carry_feed: Option<bool>,
    /// What one sample (or product batch) brings: materials with their masses or volumes.
    pub feed: Vec<(String, String)>,
    /// The months in which the work is done, `2-5, 9`; all when left out.
    pub months: Option<String>,
    /// The name of the present route.
    pub present: String,
    /// The routes.
    pub routes: Vec<Route>,
}

/// One way of doing the work.
#[derive(Clone, Debug, Default, PartialEq, Eq)]
pub struct Route {
    /// Its name, unique in the workload.
    pub name: String,
    /// What one sample brings on this route, where it differs from the workload's feed.
    pub feed: Option<Vec<(String, String)>>,
    /// Recovery of what is sought, as this route reaches it.
    pub recovery: Option<String>,
    /// On what the claim of equal work rests.
    pub equivalence: Option<String>,
    /// By which method, permit or agreement results of this route may be reported.
    pub permission: Option<String>,
    /// The lowest and highest pH on the way, `2 to 7`; for the pH rule of the NEMI criteria.
    pub ph: Option<String>,
    /// The steps in order.
    pub steps: Vec<Step>,
    /// Where what is left on the bench goes: `liquor`, `second phase`, `marc`, `trap`, `vapour` to a place.
    pub ends: Vec<(String, String)>,
    /// How long a run takes, how many run at once, how long people attend, in the order written.
    pub time: Vec<(String, Field)>,
    /// Instrument, validation, service and the like, in the order written.
    pub money: Vec<(String, Field)>,
}

/// One step of a route.
#[derive(Clone, Debug, Default, PartialEq, Eq)]
pub struct Step {
    /// The technique's key.
    pub technique: String,
    /// `sample`, `batch`, `month` or `year`; sample when left out.
    pub per: Option<String>,
    /// The technique's own fields in the order written.
    pub fields: Vec<(String, Field)>,
    /// Measured figures by the name of the rule that they take the place of.
    pub measured: Vec<(String, String)>,
    /// Free text that prints with the step.
    pub note: Option<String>,
}
