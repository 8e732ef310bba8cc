//! From a picture to elements: one tree, from which both the page and a saved file are made.

use super::shape::{Anchor, Hatch, Shape, pixel};
use super::{Drawing, Picture, Table};
use yew::prelude::*;
use yew::virtual_dom::{VNode, VTag, VText};

/// An element of HTML or SVG.
#[derive(Clone, Debug, PartialEq)]
pub struct Node {
    tag: &'static str,
    attributes: Vec<(&'static str, String)>,
    children: Vec<Child>,
}

#[derive(Clone, Debug, PartialEq)]
enum Child {
    Node(Node),
    Text(String),
}

impl Node {
    fn new(tag: &'static str) -> Self {
        Self { tag, attributes: Vec::new(), children: Vec::new() }
    }

    fn set(mut self, name: &'static str, value: impl Into<String>) -> Self {
        self.attributes.push((name, value.into()));
        self
    }

    fn put(mut self, child: Node) -> Self {
        self.children.push(Child::Node(child));
        self
    }

    fn put_all(mut self, children: impl IntoIterator<Item = Node>) -> Self {
        self.children.extend(children.into_iter().map(Child::Node));
        self
    }

    fn say(mut self, text: impl Into<String>) -> Self {
        self.children.push(Child::Text(text.into()));
        self
    }

    fn html(&self) -> VNode {
        let mut tag = VTag::new(self.tag);
        for (name, value) in &self.attributes {
            tag.add_attribute(name, clean(value));
        }
        for child in &self.children {
            tag.add_child(match child {
                Child::Node(node) => node.html(),
                Child::Text(text) => VText::new(clean(text)).into(),
            });
        }
        tag.into()
    }

    /// As text, escaped; drawings get a line for each element, so that differences can be read.
    #[must_use]
    pub fn text(&self) -> String {
        let mut out = String::new();
        self.write(&mut out);
        out
    }

    fn write(&self, out: &mut String) {
        out.push('<');
        out.push_str(self.tag);
        for (name, value) in &self.attributes {
            out.push(' ');
            out.push_str(name);
            out.push_str("=\"");
            escape(value, out);
            out.push('"');
        }
        out.push('>');
        for child in &self.children {
            match child {
                Child::Node(node) => {
                    out.push('\n');
                    node.write(out);
                }
                Child::Text(text) => escape(text, out),
            }
        }
        if matches!(self.children.last(), Some(Child::Node(_))) {
            out.push('\n');
        }
        out.push_str("</");
        out.push_str(self.tag);
        out.push('>');
    }
}

/// Without the characters that no XML file may hold.
fn clean(text: &str) -> String {
    text.chars().filter(|c| !c.is_control() && !matches!(c, '\u{fffe}' | '\u{ffff}')).collect()
}

fn escape(text: &str, out: &mut String) {
    for c in clean(text).chars() {
        match c {
            '&' => out.push_str("&amp;"),
            '<' => out.push_str("&lt;"),
            '>' => out.push_str("&gt;"),
            '"' => out.push_str("&quot;"),
            _ => out.push(c),
        }
    }
}

fn hatches(id: &str) -> Node {
    let pattern = |name: &str, mark: Node| {
        Node::new("pattern")
            .set("id", format!("{id}-{name}"))
            .set("width", "5")
            .set("height", "5")
            .set("patternUnits", "userSpaceOnUse")
            .set("patternTransform", "rotate(45)")
            .put(mark)
    };
    Node::new("defs")
        .put(pattern("lines", Node::new("path").set("class", "hatch").set("d", "M0 0V5")))
        .put(pattern("dots", Node::new("path").set("class", "hatch-dot").set("d", "M1 1H3V3H1Z")))
}

fn shape_node(id: &str, shape: &Shape) -> Vec<Node> {
    let over = |node: Node, class: &str, hatch: Hatch| {
        let name = match hatch {
            Hatch::No => return vec![node.set("class", class)],
            Hatch::Lines => "lines",
            Hatch::Dots => "dots",
        };
        vec![node.clone().set("class", class), node.set("fill", format!("url(#{id}-{name})"))]
    };
    match shape {
        Shape::Rect { x, y, width, height, class, hatch } => {
            let node = Node::new("rect")
                .set("x", pixel(*x))
                .set("y", pixel(*y))
                .set("width", pixel(*width))
                .set("height", pixel(*height));
            over(node, class, *hatch)
        }
        Shape::Path { d, class, hatch } => over(Node::new("path").set("d", d.as_str()), class, *hatch),
        Shape::Line { from, to, class } => vec![
            Node::new("line")
                .set("x1", pixel(from.0))
                .set("y1", pixel(from.1))
                .set("x2", pixel(to.0))
                .set("y2", pixel(to.1))
                .set("class", *class),
        ],
        Shape::Text { at, anchor, size, class, text } => {
            let anchor = match anchor {
                Anchor::Start => "start",
                Anchor::Middle => "middle",
                Anchor::End => "end",
            };
            vec![
                Node::new("text")
                    .set("x", pixel(at.0))
                    .set("y", pixel(at.1))
                    .set("text-anchor", anchor)
                    .set("font-size", pixel(*size))
                    .set("class", *class)
                    .say(text.clone()),
            ]
        }
    }
}

/// One drawing of a picture as an `svg` element, with ids that start with `id`.
pub(super) fn svg(picture: &Picture, drawing: &Drawing, id: &str, class: &str) -> Node {
    Node::new("svg")
        .set("xmlns", "http://www.w3.org/2000/svg")
        .set("class", class)
        .set("viewBox", format!("0 0 {} {}", pixel(drawing.width), pixel(drawing.height)))
        .set("width", pixel(drawing.width))
        .set("height", pixel(drawing.height))
        .set("role", "img")
        .set("aria-labelledby", format!("{id}-title {id}-desc"))
        .put(Node::new("title").set("id", format!("{id}-title")).say(picture.title.clone()))
        .put(Node::new("desc").set("id", format!("{id}-desc")).say(picture.description.clone()))
        .put(hatches(id))
        .put_all(drawing.shapes.iter().flat_map(|s| shape_node(id, s)))
}

fn table_node(table: &Table) -> Node {
    let head = Node::new("tr").put_all(table.head.iter().map(|h| {
        let cell = Node::new("th").set("scope", "col").say(h.text.clone());
        if h.number { cell.set("class", "number") } else { cell }
    }));
    let rows = table.rows.iter().map(|row| {
        Node::new("tr").put_all(row.iter().enumerate().map(|(i, text)| {
            let number = table.head.get(i).is_some_and(|h| h.number);
            match (i, number) {
                (0, _) => Node::new("th").set("scope", "row").say(text.clone()),
                (_, true) => Node::new("td").set("class", "number").say(text.clone()),
                (_, false) => Node::new("td").say(text.clone()),
            }
        }))
    });
    Node::new("table")
        .put(Node::new("caption").say(table.caption.clone()))
        .put(Node::new("thead").put(head))
        .put(Node::new("tbody").put_all(rows))
}

/// The whole picture with caption, both drawings (the style sheet shows the one that fits), notes and tables.
#[must_use]
pub fn plate(picture: &Picture) -> Node {
    let key = &picture.key;
    let scroll = |(i, table): (usize, &Table)| {
        // A region that scrolls must be reachable by keyboard.
        let id = format!("{key}-table-{i}");
        Node::new("div")
            .set("class", "picture-scroll")
            .set("role", "region")
            .set("tabindex", "0")
            .set("id", id)
            .set("aria-label", table.caption.clone())
            .put(table_node(table))
    };
    Node::new("figure")
        .set("class", "picture")
        .put(
            Node::new("figcaption")
                .put(Node::new("strong").say(picture.title.clone()))
                .put(Node::new("p").say(picture.description.clone())),
        )
        .put(svg(picture, &picture.wide, &format!("{key}-wide"), "drawing drawing-wide"))
        .put(svg(picture, &picture.narrow, &format!("{key}-narrow"), "drawing drawing-narrow"))
        .put_all(picture.notes.iter().map(|n| Node::new("p").set("class", "picture-note").say(n.clone())))
        .put(
            Node::new("details")
                .set("class", "picture-data")
                .put(Node::new("summary").say("The same figures as a table"))
                .put_all(picture.tables.iter().enumerate().map(scroll)),
        )
}

/// The picture for the page.
pub fn to_html(picture: &Picture) -> Html {
    plate(picture).html()
}

/// The wide drawing as a file of its own: title and description inside, the style sheet with it, on white.
#[must_use]
pub fn to_svg_text(picture: &Picture) -> String {
    let drawing = &picture.wide;
    let paper = Shape::Rect {
        x: 0.0,
        y: 0.0,
        width: drawing.width,
        height: drawing.height,
        class: "paper",
        hatch: Hatch::No,
    };
    let mut svg = svg(picture, drawing, &picture.key, "drawing drawing-file");
    // After title, description and patterns, before the first shape.
    let style = Node::new("style").say(include_str!("../../style/picture.css").replace('\n', " "));
    let before = [style].into_iter().chain(shape_node(&picture.key, &paper)).map(Child::Node);
    svg.children.splice(3..3, before);
    format!("<?xml version=\"1.0\" encoding=\"UTF-8\"?>\n{}\n", svg.text())
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn markup_and_control_characters_stay_text() {
        let node = Node::new("text").set("x", "\"><script>").say("<b>&\u{1}\u{0}amp;</b>");
        assert_eq!(node.text(), "<text x=\"&quot;&gt;&lt;script&gt;\">&lt;b&gt;&amp;amp;&lt;/b&gt;</text>");
    }

    #[test]
    fn the_page_gets_the_same_tree() {
        let node = Node::new("g").set("class", "a").put(Node::new("text").say("1 < 2"));
        let VNode::VTag(tag) = node.html() else { panic!("no element") };
        assert_eq!((tag.tag(), tag.attributes.iter().next()), ("g", Some(("class", "a"))));
        let VNode::VList(children) = tag.children().unwrap() else { panic!("no children") };
        assert_eq!(children.len(), 1);
    }

    #[test]
    fn the_style_sheet_needs_no_escape() {
        let sheet = include_str!("../../style/picture.css");
        assert!(!sheet.contains(['<', '&', '"', '>']), "the sheet stands in saved files as it is");
    }
}
