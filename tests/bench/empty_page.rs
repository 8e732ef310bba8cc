//! An empty Yew page, packed like the page itself by `cargo page --empty`: what its first drawing is measured beside.
use wasm_bindgen::prelude::wasm_bindgen;
use yew::prelude::*;

#[component]
fn Empty() -> Html {
    html! { <p id="drawn">{ "Nothing stands here." }</p> }
}

/// Draws the page into the element `app` of the shell.
#[wasm_bindgen]
pub fn start_page() {
    if let Some(root) = gloo::utils::document().get_element_by_id("app") {
        yew::Renderer::<Empty>::with_root(root).render();
    }
}
