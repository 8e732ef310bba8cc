//! A paper of the waste desk: sentences and tables of words, the same as the command writes.
use crate::show::{unbroken, with_minus};
use thimbleworth::report::{Paper, PaperTable};
use yew::prelude::*;

/// Rows that a table shows here; the command writes all of them.
const MOST: usize = 200;

/// A table of words.
pub(crate) fn words_table(id: String, table: &PaperTable) -> Html {
    words(id, &table.title, table.head, &table.rows)
}

/// The same, of what is no paper.
pub(crate) fn words(id: String, title: &str, head: &[&'static str], rows: &[Vec<String>]) -> Html {
    let caption = [&id, "-caption"].concat();
    let left = rows.len().saturating_sub(MOST);
    html! {
        <div class="sheet">
            <div class="scroll" role="region" tabindex="0" aria-labelledby={caption.clone()}>
                <table id={id.clone()} class="figures words">
                    <caption id={caption}><span>{ title.to_owned() }</span></caption>
                    if head.iter().any(|h| !h.is_empty()) {
                        <thead><tr>{ for head.iter().map(|h| html! { <th scope="col">{ *h }</th> }) }</tr></thead>
                    }
                    <tbody>{ for rows.iter().take(MOST).map(|row| html! {
                        <tr>{ for row.iter().enumerate().map(|(i, cell)| if i == 0 {
                            html! { <th scope="row">{ with_minus(&unbroken(cell)) }</th> }
                        } else {
                            html! { <td>{ with_minus(&unbroken(cell)) }</td> }
                        }) }</tr>
                    }) }</tbody>
                </table>
            </div>
            if left > 0 { <p class="hint">{ left }{ " more rows are in what the command writes." }</p> }
            <p class="tools"><button type="button" class="small" data-copy={id}
                aria-label={["Copy as columns: ", title].concat()}>{ "Copy as columns" }</button></p>
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
