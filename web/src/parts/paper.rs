//! A paper of the waste desk: sentences and tables of words, the same as the command writes.
use crate::browser;
use crate::show::{unbroken, with_minus};
use thimbleworth::report::{Paper, PaperTable, words_csv};
use yew::prelude::*;

/// Rows that a table shows; a longer one is saved whole.
pub(crate) const MOST_ROWS: usize = 200;

/// A table of words.
pub(crate) fn words_table(id: String, table: &PaperTable) -> Html {
    words(id, &table.title, table.head, &table.rows)
}

/// The same, of what is no paper.
pub(crate) fn words(id: String, title: &str, head: &[&'static str], rows: &[Vec<String>]) -> Html {
    let drawn = rows.iter().take(MOST_ROWS).map(|row| {
        html! {
            <tr>{ for row.iter().enumerate().map(|(i, cell)| if i == 0 {
                html! { <th scope="row">{ with_minus(&unbroken(cell)) }</th> }
            } else {
                html! { <td>{ with_minus(&unbroken(cell)) }</td> }
            }) }</tr>
        }
    });
    let whole = (rows.len() > MOST_ROWS).then(|| {
        let text = words_csv(head, rows);
        Callback::from(move |id: String| browser::save_file(&(id + ".csv"), &text, "text/csv", |_| {}))
    });
    framed(id, title, head.to_vec(), drawn.collect(), rows.len(), whole)
}

/// A table in its frame: caption, headings, as many of `count` rows as `drawn` has, and what may be done with it. `whole` saves
/// all rows where not all are shown.
pub(crate) fn framed(
    id: String,
    title: &str,
    head: Vec<&'static str>,
    drawn: Vec<Html>,
    count: usize,
    whole: Option<Callback<String>>,
) -> Html {
    let caption = [&id, "-caption"].concat();
    let whole = whole.map(|whole| {
        let id = id.clone();
        whole.reform(move |_: MouseEvent| id.clone())
    });
    html! {
        <div class="sheet">
            <div class="scroll" role="region" tabindex="0" aria-labelledby={caption.clone()}>
                <table id={id.clone()} class="figures words">
                    <caption id={caption}><span>{ title.to_owned() }</span></caption>
                    if head.iter().any(|h| !h.is_empty()) {
                        <thead><tr>{ for head.into_iter().map(|h| html! { <th scope="col">{ h }</th> }) }</tr></thead>
                    }
                    <tbody>{ drawn }</tbody>
                </table>
            </div>
            if count > MOST_ROWS {
                <p class="hint">{ MOST_ROWS }{ " of " }{ count }{ " rows are shown." }</p>
            }
            <p class="tools">
                <button type="button" class="small" data-copy={id}
                    aria-label={["Copy as columns: ", title].concat()}>{ "Copy as columns" }</button>
                if let Some(onclick) = whole {
                    <button type="button" class="small" {onclick}
                        aria-label={["Save all rows as CSV: ", title].concat()}>{ "Save all rows as CSV" }</button>
                }
            </p>
        </div>
    }
}

/// A paper that unfolds.
pub(crate) fn folded(key: &str, paper: &Paper) -> Html {
    html! {
        <details class="more">
            <summary>{ &paper.title }</summary>
            { unfolded(key, paper) }
        </details>
    }
}

/// A paper as it stands.
pub(crate) fn unfolded(key: &str, paper: &Paper) -> Html {
    html! {
        <>
            { for paper.lead.iter().map(|line| html! { <p>{ unbroken(line) }</p> }) }
            { for paper.tables.iter().enumerate().map(|(i, t)| words_table([key, "-", &i.to_string()].concat(), t)) }
            <ul class="foot">{ for paper.foot.iter().map(|line| html! { <li>{ unbroken(line) }</li> }) }</ul>
        </>
    }
}
