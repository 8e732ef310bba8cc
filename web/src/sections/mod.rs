//! The numbered sections of the page. A section is a file of its own, which declares it as `SECTION`, and two lines below:
//! its `mod` and its place in [`SECTIONS`], from which number and contents entry follow.
mod air;
mod assumptions;
mod carbon_dioxide;
mod climate;
mod comparison;
mod cost;
mod declared;
mod desk;
mod energy;
mod finding;
mod hazard;
mod labels;
mod leaf;
mod logs;
mod places;
mod plates;
mod question;
mod routes;
mod site;
mod sure;
mod view;
mod waste;

pub(crate) use leaf::{Contents, Leaves, catch_up};
pub(crate) use view::View;

use yew::Html;

/// All sections in the order of the page.
static SECTIONS: &[&Section] = &[
    &question::SECTION,
    &routes::SECTION,
    &finding::SECTION,
    &places::SECTION,
    &waste::SECTION,
    &desk::SECTION,
    &site::SECTION,
    &logs::SECTION,
    &carbon_dioxide::SECTION,
    &energy::SECTION,
    &air::SECTION,
    &hazard::SECTION,
    &comparison::SECTION,
    &cost::SECTION,
    &climate::SECTION,
    &sure::SECTION,
    &assumptions::SECTION,
];

/// What a section declares of itself.
struct Section {
    /// The id of its element, which the contents list links to.
    id: &'static str,
    title: &'static str,
    /// One sentence: what stands here.
    lead: &'static str,
    when: When,
    /// What stands below the lead. Called only when something in the view has changed.
    body: fn(&View) -> Html,
}

/// When a section is drawn again.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
enum When {
    /// With every stroke: it holds what is typed into.
    AtOnce,
    /// A moment after the last change, and before printing: it holds figures, and no key stroke waits for it.
    Follows,
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn every_section_has_its_own_id_title_and_lead() {
        for (i, section) in SECTIONS.iter().enumerate() {
            assert!(
                section.id.bytes().all(|b| b.is_ascii_lowercase() || b.is_ascii_digit() || b == b'-'),
                "{}",
                section.id
            );
            assert!(section.lead.ends_with('.'), "{}: a lead is a sentence", section.id);
            for other in &SECTIONS[i + 1..] {
                assert!(section.id != other.id && section.title != other.title, "{} twice", section.id);
            }
        }
    }

    #[test]
    fn the_page_can_be_used_once_its_first_section_stands() {
        assert_eq!(SECTIONS[0].when, When::AtOnce);
    }
}
