//! Drawings made ready to stand inside a page: names that cannot clash, width left to the page.

/// The drawing from its `<svg` on, with every name and every reference to one under `prefix`, sized by the page. A
/// drawing without a role gets one and says `description`. Comments are dropped.
pub(super) fn inline(svg: &str, prefix: &str, description: &str) -> String {
    let mut rest = svg.find("<svg").map_or("", |start| &svg[start..]);
    let mut out = String::new();
    let mut root = true;
    while let Some(start) = rest.find('<') {
        out.push_str(&rest[..start]);
        rest = &rest[start..];
        if let Some(comment) = rest.strip_prefix("<!--") {
            rest = comment.split_once("-->").map_or("", |(_, behind)| behind);
            continue;
        }
        let (tag, behind) = rest.split_at(tag_end(rest));
        let tag = Tag::read(tag).renamed(prefix);
        out.push_str(&if root { tag.as_root(description).text() } else { tag.text() });
        (rest, root) = (behind, false);
    }
    out + rest
}

/// Where the tag at the start of the text ends: behind the first `>` outside quotes.
fn tag_end(text: &str) -> usize {
    let mut quote = None;
    for (index, letter) in text.char_indices() {
        match (quote, letter) {
            (None, '>') => return index + 1,
            (None, '"' | '\'') => quote = Some(letter),
            (Some(open), _) if letter == open => quote = None,
            _ => {}
        }
    }
    text.len()
}

/// A tag as its name, its attributes (values still escaped) and its end.
struct Tag<'a> {
    name: &'a str,
    attributes: Vec<(String, String)>,
    end: &'a str,
}

impl<'a> Tag<'a> {
    fn read(tag: &'a str) -> Self {
        let inner = tag.trim_start_matches('<').trim_end_matches('>');
        let (inner, end) = inner.strip_suffix('/').map_or((inner, ">"), |inner| (inner, "/>"));
        let (name, mut rest) = inner.split_at(inner.find(char::is_whitespace).unwrap_or(inner.len()));
        let mut attributes = Vec::new();
        while let Some((key, behind)) = rest.split_once('=') {
            let behind = behind.trim_start();
            let Some(quote) = behind.chars().next().filter(|letter| matches!(letter, '"' | '\'')) else { break };
            let Some((value, behind)) = behind[1..].split_once(quote) else { break };
            attributes.push((key.trim().to_string(), value.replace('"', "&quot;")));
            rest = behind;
        }
        Self { name, attributes, end }
    }

    fn renamed(mut self, prefix: &str) -> Self {
        for (key, value) in &mut self.attributes {
            *value = match key.as_str() {
                "id" => format!("{prefix}--{value}"),
                "aria-labelledby" | "aria-describedby" => {
                    value.split_whitespace().map(|name| format!("{prefix}--{name}")).collect::<Vec<_>>().join(" ")
                }
                "href" | "xlink:href" if value.starts_with('#') => format!("#{prefix}--{}", &value[1..]),
                _ => value.replace("url(#", &format!("url(#{prefix}--")),
            };
        }
        self
    }

    /// The outermost tag: a viewBox in place of width and height, and a role.
    fn as_root(mut self, description: &str) -> Self {
        let taken = |tag: &mut Self, key: &str| {
            let at = tag.attributes.iter().position(|(known, _)| known == key);
            at.map(|at| tag.attributes.remove(at).1.trim_end_matches("px").to_string())
        };
        let size = (taken(&mut self, "width"), taken(&mut self, "height"));
        if let ((Some(width), Some(height)), false) = (size, self.has("viewBox")) {
            self.attributes.push(("viewBox".into(), format!("0 0 {width} {height}")));
        }
        if !self.has("role") {
            self.attributes.push(("role".into(), "img".into()));
        }
        if !self.has("aria-labelledby") && !self.has("aria-label") {
            let escaped = maud::html! { (description) }.into_string();
            self.attributes.push(("aria-label".into(), escaped));
        }
        self
    }

    fn has(&self, key: &str) -> bool {
        self.attributes.iter().any(|(known, _)| known == key)
    }

    fn text(&self) -> String {
        let attributes: String = self.attributes.iter().map(|(key, value)| format!(" {key}=\"{value}\"")).collect();
        format!("<{}{attributes}{}", self.name, self.end)
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn names_and_their_references_get_the_prefix() {
        let svg = "<?xml version='1.0'?>\n<svg width=\"72\" height='48px' xmlns=\"http://www.w3.org/2000/svg\" \
                   aria-labelledby=\"t d\"><title id=\"t\">a > b</title><!-- gone --><clipPath id='c'/>\
                   <g clip-path=\"url(#c)\"><use href=\"#c\"/></g></svg>";
        let expected = "<svg xmlns=\"http://www.w3.org/2000/svg\" aria-labelledby=\"f--t f--d\" viewBox=\"0 0 72 48\" \
                        role=\"img\"><title id=\"f--t\">a > b</title><clipPath id=\"f--c\"/>\
                        <g clip-path=\"url(#f--c)\"><use href=\"#f--c\"/></g></svg>";
        assert_eq!(inline(svg, "f", "unused"), expected);
    }

    #[test]
    fn a_drawing_without_words_says_the_description() {
        let drawn = inline("<svg viewBox=\"0 0 1 1\"><path d=\"M0 0\"/></svg>", "f", "1 < 2 \"so\"");
        assert!(drawn.starts_with("<svg viewBox=\"0 0 1 1\" role=\"img\" aria-label=\"1 &lt; 2 &quot;so&quot;\">"));
        assert_eq!(inline("no drawing", "f", ""), "");
    }
}
