//! The plan with an id for everything that stands in a list, so that a card keeps its place in the document object model
//! when its neighbours move. Ids are never saved.
use thimbleworth::plan::{Field, Plan, Route, Stream, Workload};

/// A plan and the ids of its parts.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Document {
    /// The plan.
    pub plan: Plan,
    /// The ids, parallel to the lists of the plan.
    pub ids: Ids,
}

/// Ids parallel to the lists of a plan.
#[derive(Clone, Debug, Default, PartialEq, Eq)]
pub struct Ids {
    /// The next id to be given.
    pub next: u32,
    /// Of the streams.
    pub streams: Vec<u32>,
    /// Of the plan's own materials.
    pub materials: Vec<u32>,
    /// Of the workloads and what is in them.
    pub workloads: Vec<WorkloadIds>,
}

/// Ids of a workload and its routes.
#[derive(Clone, Debug, Default, PartialEq, Eq)]
pub struct WorkloadIds {
    /// Of the workload.
    pub id: u32,
    /// Of its routes.
    pub routes: Vec<RouteIds>,
}

/// Ids of a route and its steps.
#[derive(Clone, Debug, Default, PartialEq, Eq)]
pub struct RouteIds {
    /// Of the route.
    pub id: u32,
    /// Of its steps.
    pub steps: Vec<u32>,
}

impl Ids {
    /// A fresh id.
    pub fn give(&mut self) -> u32 {
        self.next += 1;
        self.next
    }

    /// Fresh ids for a route with so many steps.
    pub fn give_route(&mut self, steps: usize) -> RouteIds {
        RouteIds { id: self.give(), steps: (0..steps).map(|_| self.give()).collect() }
    }

    /// Fresh ids for a workload.
    pub fn give_workload(&mut self, workload: &Workload) -> WorkloadIds {
        WorkloadIds {
            id: self.give(),
            routes: workload.routes.iter().map(|route| self.give_route(route.steps.len())).collect(),
        }
    }
}

impl Document {
    /// The plan with ids above `after`.
    #[must_use]
    pub fn new(plan: Plan, after: u32) -> Self {
        let mut ids = Ids { next: after, ..Ids::default() };
        ids.streams = plan.site.streams.iter().map(|_| ids.give()).collect();
        ids.materials = plan.materials.iter().map(|_| ids.give()).collect();
        ids.workloads = plan.workloads.iter().map(|workload| ids.give_workload(workload)).collect();
        Self { plan, ids }
    }

    /// Where the route with this id stands: workload and route.
    #[must_use]
    pub fn route(&self, id: u32) -> Option<(usize, usize)> {
        self.ids
            .workloads
            .iter()
            .enumerate()
            .find_map(|(w, workload)| workload.routes.iter().position(|route| route.id == id).map(|r| (w, r)))
    }

    /// The id of a route.
    #[must_use]
    pub fn route_id(&self, workload: usize, route: usize) -> Option<u32> {
        Some(self.ids.workloads.get(workload)?.routes.get(route)?.id)
    }
}

/// A plan to begin with: one piece of work, one route without steps, and two streams as most sites keep them.
#[must_use]
pub fn blank() -> Plan {
    let mut plan = Plan::default();
    plan.site.streams = vec![
        Stream { name: "solvents".into(), container: Some("20 L".into()), ..Stream::default() },
        Stream {
            name: "solids".into(),
            holds: Some("solid".into()),
            container: Some("60 L".into()),
            ..Stream::default()
        },
    ];
    plan.workloads.push(blank_workload("Work 1"));
    plan
}

/// A piece of work with one route without steps.
#[must_use]
pub fn blank_workload(name: &str) -> Workload {
    Workload {
        name: name.into(),
        batch_samples: Some(Field::Number("1".into())),
        present: "Present route".into(),
        routes: vec![Route { name: "Present route".into(), ..Route::default() }],
        ..Workload::default()
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn ids_are_parallel_and_unique() {
        let mut plan = blank();
        plan.workloads.push(blank_workload("Work 2"));
        let document = Document::new(plan, 40);
        assert_eq!(document.ids.streams.len(), 2);
        assert_eq!(document.ids.workloads.len(), 2);
        let id = document.route_id(1, 0).expect("a route");
        assert!(id > 40);
        assert_eq!(document.route(id), Some((1, 0)));
        assert_eq!(document.route(40), None);
    }
}
