//! Where mass can be.

/// A place: outside the bench, on the bench while a route runs, or one of the site's waste streams.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub struct Place(u8);

/// How many places outside the bench are not waste streams.
pub const OUTSIDE_PLACES: usize = 10;
/// How many places are on the bench.
pub const BENCH_PLACES: usize = 5;

const NAMES: [&str; OUTSIDE_PLACES + BENCH_PLACES] = [
    "feed",
    "store",
    "held",
    "product",
    "by-product",
    "hood",
    "room",
    "drain",
    "destroyed",
    "elsewhere",
    "liquor",
    "second phase",
    "marc",
    "vapour",
    "trap",
];

impl Place {
    /// Where samples and raw material come from. Nothing is ever returned to it.
    pub const FEED: Self = Self(0);
    /// Drawn from it and returned to it; bought = drawn - returned, so that recovery needs no special case.
    pub const STORE: Self = Self(1);
    /// Shelf stock, a cylinder's heel, what an apparatus keeps.
    pub const HELD: Self = Self(2);
    /// What the work is done for.
    pub const PRODUCT: Self = Self(3);
    /// Sold or used beside the product.
    pub const BY_PRODUCT: Self = Self(4);
    /// Air taken by the hood.
    pub const HOOD: Self = Self(5);
    /// Air of the room.
    pub const ROOM: Self = Self(6);
    /// The drain.
    pub const DRAIN: Self = Self(7);
    /// Destroyed in an abatement device on site.
    pub const DESTROYED: Self = Self(8);
    /// Reclaimed or disposed of off site, outside the declared streams.
    pub const ELSEWHERE: Self = Self(9);
    /// On the bench: the extract in its solvent.
    pub const LIQUOR: Self = Self(10);
    /// On the bench: the other liquid phase, as a rule the water.
    pub const SECOND_PHASE: Self = Self(11);
    /// On the bench: the extracted solid and what clings to it.
    pub const MARC: Self = Self(12);
    /// On the bench: vapour or dense gas under way.
    pub const VAPOUR: Self = Self(13);
    /// On the bench: the trap behind a supercritical extractor.
    pub const TRAP: Self = Self(14);

    /// The bench places in the order in which the book is closed.
    pub const BENCH: [Self; BENCH_PLACES] =
        [Self::LIQUOR, Self::SECOND_PHASE, Self::MARC, Self::TRAP, Self::VAPOUR];
    /// The places outside the bench that are not streams, in the order in which they are shown.
    pub const OUTSIDE: [Self; OUTSIDE_PLACES] = [
        Self::FEED,
        Self::STORE,
        Self::HELD,
        Self::PRODUCT,
        Self::BY_PRODUCT,
        Self::HOOD,
        Self::ROOM,
        Self::DRAIN,
        Self::DESTROYED,
        Self::ELSEWHERE,
    ];

    /// The waste stream with this index in the site's list; `None` beyond 200 streams.
    #[must_use]
    pub fn stream(index: usize) -> Option<Self> {
        if index < 200 { u8::try_from(OUTSIDE_PLACES + BENCH_PLACES + index).ok().map(Self) } else { None }
    }

    /// The index of the stream in the site's list, where the place is a stream.
    #[must_use]
    pub fn stream_index(self) -> Option<usize> {
        (self.0 as usize).checked_sub(OUTSIDE_PLACES + BENCH_PLACES)
    }

    /// Whether the place is on the bench.
    #[must_use]
    pub fn on_bench(self) -> bool {
        (OUTSIDE_PLACES..OUTSIDE_PLACES + BENCH_PLACES).contains(&(self.0 as usize))
    }

    /// Whether what comes here has gone to air.
    ///
    /// ```
    /// use thimbleworth::ledger::Place;
    /// assert!(Place::HOOD.is_air() && Place::ROOM.is_air() && !Place::VAPOUR.is_air());
    /// ```
    #[must_use]
    pub fn is_air(self) -> bool {
        self == Self::HOOD || self == Self::ROOM
    }

    /// The index among all places.
    #[must_use]
    pub fn index(self) -> usize {
        self.0 as usize
    }

    /// The name of a place that is not a stream.
    ///
    /// ```
    /// use thimbleworth::ledger::Place;
    /// assert_eq!(Place::MARC.name(), Some("marc"));
    /// assert_eq!(Place::stream(0).and_then(Place::name), None);
    /// ```
    #[must_use]
    pub fn name(self) -> Option<&'static str> {
        NAMES.get(self.0 as usize).copied()
    }

    /// The place of this name, where it is not a stream.
    #[must_use]
    pub fn named(name: &str) -> Option<Self> {
        NAMES.iter().position(|n| *n == name).and_then(|i| u8::try_from(i).ok()).map(Self)
    }
}
