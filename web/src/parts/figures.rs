//! A table of figures, a column a route. Every figure is a button that opens its working.
use crate::reckon::{Basis, Book};
use crate::show::Scale;
use thimbleworth::account::Measure;
use yew::prelude::*;

/// One line of a table.
#[derive(Clone, Debug, PartialEq)]
pub(crate) struct Line {
    pub(crate) label: String,
    /// The figure's id.
    pub(crate) id: String,
    pub(crate) measure: Measure,
    /// Whether it is a part of the line above.
    pub(crate) part: bool,
}

/// A table to be drawn.
pub(crate) struct Sheet<'a> {
    pub(crate) id: String,
    pub(crate) caption: String,
    /// What stands in the first column.
    pub(crate) first: &'a str,
    pub(crate) lines: Vec<Line>,
    pub(crate) book: &'a Book,
    pub(crate) work: usize,
    pub(crate) basis: Basis,
    /// Whether each route is set beside the present one, in per cent and words.
    pub(crate) beside: bool,
}

/// A figure as a button. What it opens is said by its attribute, so that one listener serves all of them.
pub(crate) fn figure_button(w: usize, r: usize, id: &str, text: &str, full: String) -> Html {
    html! {
        <button type="button" class="figure" data-figure={format!("{w}.{r}.{id}")} title={full}>{ text.to_owned() }</button>
    }
}

impl Sheet<'_> {
    fn values(&self, line: &Line) -> Vec<Option<f64>> {
        let routes = self.book.works.get(self.work).map_or(0, |w| w.routes.len());
        (0..routes).map(|r| self.book.value(self.work, r, &line.id, line.measure, self.basis)).collect()
    }

    fn unit(&self, measure: Measure, scale: &Scale) -> String {
        match (measure.extensive(), scale.unit()) {
            (false, unit) => unit.to_owned(),
            (true, "containers") => self.basis.words().to_owned(),
            (true, unit) => format!("{unit} {}", self.basis.words()),
        }
    }

    pub(crate) fn draw(&self) -> Html {
        let Some(work) = self.book.works.get(self.work) else { return Html::default() };
        let measure = self.lines.first().map(|l| l.measure);
        let values: Vec<Vec<Option<f64>>> = self.lines.iter().map(|l| self.values(l)).collect();
        // One unit for the whole table where all lines measure the same.
        let common = measure
            .filter(|m| !self.beside && self.lines.iter().all(|l| l.measure == *m))
            .map(|m| (m, Scale::of(m, values.iter().flatten().flatten().copied())));
        let first = match &common {
            Some((m, scale)) if !scale.unit().is_empty() => {
                format!("{} / {}", self.first, self.unit(*m, scale))
            }
            _ => self.first.to_owned(),
        };
        let caption = format!("{}-caption", self.id);
        html! {
            <div class="sheet">
                <div class="scroll" role="region" tabindex="0" aria-labelledby={caption.clone()}>
                    <table id={self.id.clone()} class="figures">
                        <caption id={caption}><span>{ &self.caption }</span></caption>
                        <thead>
                            <tr>
                                <th scope="col">{ first }</th>
                                { for work.routes.iter().enumerate().map(|(r, column)| html! {
                                    <th scope="col" class="num">
                                        { &column.name }
                                        if Some(r) == work.present { <span class="present">{ " present" }</span> }
                                    </th>
                                }) }
                            </tr>
                        </thead>
                        <tbody>
                            { for self.lines.iter().zip(&values).map(|(line, values)| {
                                let scale = common.map_or_else(
                                    || Scale::of(line.measure, values.iter().flatten().copied()),
                                    |(_, scale)| scale,
                                );
                                self.row(line, values, &scale, common.is_none(), work.present)
                            }) }
                        </tbody>
                    </table>
                </div>
                <p class="tools"><button type="button" class="small" data-copy={self.id.clone()}
                    aria-label={format!("Copy as columns: {}", self.caption)}>{ "Copy as columns" }</button></p>
            </div>
        }
    }

    fn row(
        &self,
        line: &Line,
        values: &[Option<f64>],
        scale: &Scale,
        unit: bool,
        present: Option<usize>,
    ) -> Html {
        let unit = if unit { self.unit(line.measure, scale) } else { String::new() };
        let before = present.and_then(|p| values.get(p).copied().flatten());
        html! {
            <tr class={line.part.then_some("part")}>
                <th scope="row">
                    { &line.label }
                    if !unit.is_empty() { <span class="unit">{ format!(" / {unit}") }</span> }
                </th>
                { for values.iter().enumerate().map(|(r, value)| match value {
                    None => html! { <td class="num" data-value=""><span aria-hidden="true">{ "–" }</span><span class="unseen">{ "not given" }</span></td> },
                    Some(value) => {
                        let text = scale.write(*value);
                        let known = self.book.figure(self.work, r, &line.id).is_some();
                        let change = (self.beside && Some(r) != present)
                            .then(|| crate::show::change(before?, *value))
                            .flatten();
                        html! {
                            <td class="num" data-value={scale.plain(*value)}>
                                if known { { figure_button(self.work, r, &line.id, &text, scale.full(*value)) } } else { { text } }
                                if let Some(change) = change { <span class="change">{ change }</span> }
                            </td>
                        }
                    }
                }) }
            </tr>
        }
    }
}
