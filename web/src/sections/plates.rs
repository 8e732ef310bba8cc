//! The pictures of a section. They follow the figures with it, so that no key stroke waits for a drawing.
use crate::parts::ByRc;
use crate::picture::{self, Per, Picture, to_html};
use crate::reckon::{Basis, Book};
use yew::prelude::*;

/// What is drawn.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum What {
    /// Mass by place, every route.
    Places,
    /// The flow of one route; its place in the plan.
    Flow(usize),
    /// The headline figures of one route beside the present one.
    Difference(usize),
    /// The states of CO2 that the plan uses.
    Co2,
    /// The first circuit of CO2 of one route.
    Circuit(usize),
    /// The first extraction curve of one route.
    Extraction(usize),
    /// What is lost on one route at its full cost.
    Lost(usize),
    /// The air of the room on one route.
    Air(usize),
    /// The first mixture that one route takes down.
    WayDown(usize),
}

#[derive(Properties, PartialEq)]
pub(super) struct Props {
    pub(super) book: ByRc<Book>,
    pub(super) work: usize,
    pub(super) basis: Basis,
    pub(super) what: What,
}

fn per(basis: Basis) -> Per {
    match basis {
        Basis::Year | Basis::Month => Per::Year,
        Basis::Batch => Per::Batch,
        Basis::Result => Per::Result,
        Basis::Product => Per::KgProduct,
    }
}

fn draw(props: &Props) -> Option<Picture> {
    let (book, w) = (&*props.book, props.work);
    // Any route that can be accounted tells where its work stands in the account.
    let routes = book.works.get(w)?.routes.len();
    let (at, _) = (0..routes).find_map(|r| book.in_account(w, r))?;
    match props.what {
        What::Places => picture::mass_by_place(&format!("places-{w}"), &book.account, at, per(props.basis)),
        What::Flow(r) => {
            let (at, route) = book.in_account(w, r)?;
            picture::flow(&format!("flow-{w}"), &book.account, at, route, per(props.basis))
        }
        What::Difference(r) => {
            let program = book.account.program.as_ref()?;
            picture::difference(&format!("difference-{w}-{r}"), program, at, book.beside(w, r)?)
        }
        What::Circuit(r) | What::Extraction(r) => {
            let (at, route) = book.in_account(w, r)?;
            let account = book.account.workloads.get(at)?.routes.get(route)?.as_ref()?;
            let name = &book.account.program.as_ref()?.workloads.get(at)?.routes.get(route)?.name;
            if let What::Circuit(_) = props.what {
                let (_, dense) = account.dense.first()?;
                return Some(picture::circuit(&format!("circuit-{w}-{r}"), name, dense));
            }
            let dense = account.dense.iter().map(|(_, d)| d).find(|d| d.study.is_some())?;
            picture::extraction(&format!("extraction-{w}-{r}"), name, dense)
        }
        What::Lost(r) => {
            let (at, route) = book.in_account(w, r)?;
            picture::cost_flow(&format!("cost-flow-{w}-{r}"), &book.account, at, route, per(props.basis))
        }
        What::Co2 => picture::co2_map(&format!("co2-map-{w}"), &book.account, at),
        What::WayDown(r) => {
            let (route, account) = book.route(w, r)?;
            let path = thimbleworth::account::batch_paths(route, account).into_iter().next()?;
            picture::way_down(&format!("way-down-{w}-{r}"), &route.name, &path)
        }
        What::Air(r) => {
            let (route, account) = book.route(w, r)?;
            picture::air_course(&format!("air-course-{w}-{r}"), &route.name, account.air.as_ref()?)
        }
    }
}

/// A picture, drawn again only for other figures.
#[component]
pub(super) fn Plate(props: &Props) -> Html {
    draw(props).map_or_else(Html::default, |picture| to_html(&picture))
}
