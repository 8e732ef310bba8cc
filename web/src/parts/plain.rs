//! A table of texts with what has to be said beside it, as the reports write it.
use thimbleworth::letter::sentence;
use thimbleworth::report::Sheet;
use yew::prelude::*;

/// Draws such a table under an id of its own.
pub(crate) fn plain(id: &str, sheet: &Sheet) -> Html {
    let caption = format!("{id}-caption");
    html! {
        <div class="sheet">
            <div class="scroll" role="region" tabindex="0" aria-labelledby={caption.clone()}>
                <table id={id.to_owned()} class="figures">
                    <caption id={caption}><span>{ &sheet.title }</span></caption>
                    <thead><tr>{ for sheet.head.iter().map(|h| html! { <th scope="col">{ sentence(h) }</th> }) }</tr></thead>
                    <tbody>
                        { for sheet.rows.iter().map(|row| html! {
                            <tr>
                                { for row.iter().enumerate().map(|(i, cell)| if i == 0 {
                                    html! { <th scope="row">{ cell }</th> }
                                } else {
                                    html! { <td>{ cell }</td> }
                                }) }
                            </tr>
                        }) }
                    </tbody>
                </table>
            </div>
            { for sheet.notes.iter().map(|note| html! { <p class="hint">{ note }</p> }) }
        </div>
    }
}
