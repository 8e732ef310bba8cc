//! What only the browser can do: files, the clipboard, storage, dialogs. The other side stands in `boot.js`.
use wasm_bindgen::prelude::{Closure, JsValue, wasm_bindgen};

#[wasm_bindgen]
extern "C" {
    /// Keeps the plan's text where the notice of a fault can save it from.
    #[wasm_bindgen(js_name = keepPlan)]
    pub(crate) fn keep_plan(name: &str, text: &str);
    /// Shows the notice of a fault.
    #[wasm_bindgen(js_name = showStopped)]
    pub(crate) fn show_stopped();
    /// Hears of every file that is chosen or dropped: its name, its size, its bytes (none of a file that is
    /// too large).
    #[wasm_bindgen(js_name = watchFiles)]
    fn watch_files_js(callback: &JsValue);
    /// Lets a person choose a file to open.
    #[wasm_bindgen(js_name = chooseFile)]
    pub(crate) fn choose_file();
    /// Reads every file of a field.
    #[wasm_bindgen(js_name = readFiles)]
    fn read_files_js(input: &web_sys::HtmlInputElement, callback: &JsValue);
    /// Saves a text: through the browser's own dialog where it has one, as a download elsewhere.
    #[wasm_bindgen(js_name = saveFile)]
    fn save_file_js(name: &str, text: &str, media_type: &str, callback: &JsValue);
    /// Copies a table as columns for a spreadsheet.
    #[wasm_bindgen(js_name = copyTable)]
    fn copy_table_js(id: &str, callback: &JsValue);
    /// Prints the labels and nothing else.
    #[wasm_bindgen(js_name = printLabels)]
    pub(crate) fn print_labels();
    /// Asks before the page is left.
    #[wasm_bindgen(js_name = guardLeaving)]
    pub(crate) fn guard_leaving(unsaved: bool);
    /// What is stored under a key; nothing where there is nothing or no storage.
    #[wasm_bindgen(js_name = storeGet)]
    pub(crate) fn store_get(key: &str) -> Option<String>;
    /// Stores a text, or removes it; returns why that failed, empty where it did not.
    #[wasm_bindgen(js_name = storePut)]
    pub(crate) fn store_put(key: &str, text: Option<String>) -> String;
    /// Moves the focus to the element with this id, or the nearest one above it.
    #[wasm_bindgen(js_name = focusOn)]
    pub(crate) fn focus_on(id: &str);
}

/// Calls `with` for every file that is chosen or dropped, for as long as the page lives.
pub(crate) fn watch_files(with: impl FnMut(String, f64, Vec<u8>) + 'static) {
    let callback = Closure::<dyn FnMut(String, f64, Vec<u8>)>::new(with);
    watch_files_js(&callback.into_js_value());
}

/// Reads every file of a field and calls `with` for each: its name and its bytes, none of a file that is too large or
/// cannot be read. The field is empty afterwards.
pub(crate) fn read_files(
    input: &web_sys::HtmlInputElement,
    with: impl FnMut(String, Option<Vec<u8>>) + 'static,
) {
    read_files_js(input, &Closure::<dyn FnMut(String, Option<Vec<u8>>)>::new(with).into_js_value());
}

/// Saves a text and calls `then` with the name that was chosen, or nothing when the person thought better of it.
pub(crate) fn save_file(
    name: &str,
    text: &str,
    media_type: &str,
    then: impl FnOnce(Option<String>) + 'static,
) {
    save_file_js(name, text, media_type, &Closure::once_into_js(then));
}

/// Copies a table and calls `then` with why that failed, empty where it did not.
pub(crate) fn copy_table(id: &str, then: impl FnOnce(String) + 'static) {
    copy_table_js(id, &Closure::once_into_js(then));
}
