//! Places under keys, with little code: one index by hashes for every kind of key. A map of the standard library is compiled
//! anew for each kind, and takes kilobytes of the page.

/// Finds the place of a key by its hash, in the order in which keys were added.
#[derive(Clone, Debug, Default)]
pub(super) struct Places {
    /// Place + 1 by hash, 0 where there is none; a power of two of them, at most half of them taken.
    slots: Vec<u32>,
    hashes: Vec<u64>,
}

impl Places {
    /// The place of the key with this hash for which `same` holds.
    pub(super) fn find(&self, hash: u64, same: &dyn Fn(usize) -> bool) -> Option<usize> {
        let last = self.slots.len().checked_sub(1)?;
        let mut at = hash as usize & last;
        loop {
            let place = self.slots.get(at)?.checked_sub(1)? as usize;
            if self.hashes.get(place) == Some(&hash) && same(place) {
                return Some(place);
            }
            at = (at + 1) & last;
        }
    }

    /// Adds a key that is not there yet; its place.
    pub(super) fn add(&mut self, hash: u64) -> usize {
        let place = self.hashes.len();
        self.hashes.push(hash);
        if self.hashes.len() * 2 > self.slots.len() {
            self.slots = vec![0; self.slots.len() * 4 + 16 * usize::from(self.slots.is_empty())];
            for place in 0..=place {
                self.put(place);
            }
        } else {
            self.put(place);
        }
        place
    }

    fn put(&mut self, place: usize) {
        let (last, hash) = (self.slots.len() - 1, self.hashes.get(place).copied().unwrap_or_default());
        let mut at = hash as usize & last;
        while self.slots.get(at).is_some_and(|taken| *taken != 0) {
            at = (at + 1) & last;
        }
        if let Some(slot) = self.slots.get_mut(at) {
            *slot = u32::try_from(place + 1).unwrap_or(0);
        }
    }

    pub(super) fn clear(&mut self) {
        self.slots.clear();
        self.hashes.clear();
    }
}

/// FNV-1a over eight bytes at a time, mixed at the end: tells keys apart, keeps no secret.
pub(super) fn hash(bytes: &[u8], ends: &[u32]) -> u64 {
    const PRIME: u64 = 0x0000_0100_0000_01b3;
    let mut state = 0xcbf2_9ce4_8422_2325_u64;
    let mut chunks = bytes.chunks_exact(8);
    for chunk in &mut chunks {
        let word = chunk.iter().fold(0_u64, |word, b| word << 8 | u64::from(*b));
        state = (state ^ word).wrapping_mul(PRIME);
        state ^= state >> 29;
    }
    for b in chunks.remainder() {
        state = (state ^ u64::from(*b)).wrapping_mul(PRIME);
    }
    for end in ends {
        state = (state ^ u64::from(*end)).wrapping_mul(PRIME);
    }
    mixed(state)
}

/// The last steps of SplitMix64: every number to another one, near ones far apart.
pub(super) const fn mixed(mut state: u64) -> u64 {
    state = (state ^ (state >> 30)).wrapping_mul(0xbf58_476d_1ce4_e5b9);
    state = (state ^ (state >> 27)).wrapping_mul(0x94d0_49bb_1331_11eb);
    state ^ (state >> 31)
}

#[cfg(test)]
mod tests {
    use super::*;

    // Witness: the map of the standard library.
    #[test]
    fn finds_what_a_map_finds() {
        let (mut places, mut keys) = (Places::default(), Vec::new());
        let mut map = std::collections::BTreeMap::new();
        let mut state = 1_u32;
        for _ in 0..20_000 {
            state = state.wrapping_mul(1_664_525).wrapping_add(1_013_904_223);
            let key = (state >> 18).to_string();
            // Few hashes, so that many keys share one.
            let hash = hash(key.as_bytes(), &[]) & 0x3ff;
            let found = places.find(hash, &|at| keys.get(at) == Some(&key));
            assert_eq!(found, map.get(&key).copied());
            if found.is_none() {
                map.insert(key.clone(), places.add(hash));
                keys.push(key);
            }
        }
        assert_eq!(places.hashes.len(), map.len());
    }
}
