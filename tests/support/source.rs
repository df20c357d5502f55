//! Reads Rust source just far enough to judge it: tokens without comments and strings, paths, function lengths.

/// One token and the line it stands on, from 1.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Token {
    /// The text; string and character literals are left out altogether.
    pub text: String,
    /// The line.
    pub line: usize,
}

impl Token {
    fn is(&self, text: &str) -> bool {
        self.text == text
    }

    fn is_name(&self) -> bool {
        self.text.starts_with(|first: char| first.is_alphabetic() || first == '_')
    }
}

/// A path such as `crate::frame::Frame`, groups written out, and where it stands.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Path {
    /// Names from the left; `*` for a glob.
    pub names: Vec<String>,
    /// The line it begins on.
    pub line: usize,
    /// Inline modules of the file that it stands in.
    pub inside: Vec<String>,
}

/// Splits source text into tokens; comments, strings, characters and lifetimes are dropped.
pub fn tokens(text: &str) -> Vec<Token> {
    let mut reader = Reader { text: text.chars().collect(), at: 0, line: 1, tokens: Vec::new() };
    while reader.at < reader.text.len() {
        reader.step();
    }
    reader.tokens
}

struct Reader {
    text: Vec<char>,
    at: usize,
    line: usize,
    tokens: Vec<Token>,
}

impl Reader {
    fn peek(&self, ahead: usize) -> char {
        self.text.get(self.at + ahead).copied().unwrap_or('\0')
    }

    fn skip(&mut self, count: usize) {
        for _ in 0..count.min(self.text.len() - self.at) {
            self.line += usize::from(self.text[self.at] == '\n');
            self.at += 1;
        }
    }

    fn step(&mut self) {
        match (self.peek(0), self.peek(1)) {
            ('/', '/') => self.skip_while(|letter| letter != '\n'),
            ('/', '*') => self.block_comment(),
            ('"', _) => self.string(),
            ('\'', _) => self.quote(),
            (':', ':') => self.push("::".into(), 2),
            (letter, _) if letter.is_alphanumeric() || letter == '_' => self.word(),
            (letter, _) if letter.is_whitespace() => self.skip(1),
            (letter, _) => self.push(letter.into(), 1),
        }
    }

    fn push(&mut self, text: String, length: usize) {
        self.tokens.push(Token { text, line: self.line });
        self.skip(length);
    }

    fn skip_while(&mut self, keep: impl Fn(char) -> bool) {
        while self.at < self.text.len() && keep(self.peek(0)) {
            self.skip(1);
        }
    }

    fn block_comment(&mut self) {
        let mut depth = 0;
        loop {
            match (self.peek(0), self.peek(1)) {
                ('/', '*') => depth += 1,
                ('*', '/') => depth -= 1,
                _ => {
                    self.skip(1);
                    if self.at < self.text.len() { continue } else { return }
                }
            }
            self.skip(2);
            if depth == 0 {
                return;
            }
        }
    }

    fn string(&mut self) {
        self.skip(1);
        while self.at < self.text.len() && self.peek(0) != '"' {
            self.skip(if self.peek(0) == '\\' { 2 } else { 1 });
        }
        self.skip(1);
    }

    /// A character literal or a lifetime.
    fn quote(&mut self) {
        if self.peek(1) == '\\' {
            self.skip(3);
            self.skip_while(|letter| letter != '\'');
            self.skip(1);
        } else if self.peek(2) == '\'' {
            self.skip(3);
        } else {
            self.skip(1);
            self.skip_while(|letter| letter.is_alphanumeric() || letter == '_');
        }
    }

    /// A name or number, or the prefix of a raw, byte or C string.
    fn word(&mut self) {
        let start = self.at;
        let length = self.text[start..].iter().take_while(|letter| letter.is_alphanumeric() || **letter == '_').count();
        let word: String = self.text[start..start + length].iter().collect();
        let raw = word.ends_with('r') && matches!(word.as_str(), "r" | "br" | "cr");
        let hashes = self.text[start + length..].iter().take_while(|letter| **letter == '#').count();
        match self.peek(length + hashes) {
            '"' if raw => self.raw_string(length + hashes, hashes),
            '"' if hashes == 0 && matches!(word.as_str(), "b" | "c") => self.skip(length),
            '\'' if hashes == 0 && word == "b" => self.skip(length),
            _ if raw && hashes == 1 => self.skip(length + hashes),
            _ => self.push(word, length),
        }
    }

    fn raw_string(&mut self, prefix: usize, hashes: usize) {
        self.skip(prefix + 1);
        while self.at < self.text.len() {
            let closes = self.peek(0) == '"' && (1..=hashes).all(|ahead| self.peek(ahead) == '#');
            self.skip(if closes { 1 + hashes } else { 1 });
            if closes {
                return;
            }
        }
    }
}

/// What is left of a file without its test code, and the names of modules that stand in files of their own and are
/// test code.
pub fn without_tests(tokens: &[Token]) -> (Vec<Token>, Vec<String>) {
    let (mut kept, mut test_files, mut at) = (Vec::new(), Vec::new(), 0);
    while at < tokens.len() {
        let whole_file = tokens[at].is("#") && tokens.get(at + 1).is_some_and(|token| token.is("!"));
        let Some(end) = attribute_end(tokens, at) else {
            kept.push(tokens[at].clone());
            at += 1;
            continue;
        };
        if !marks_test(&tokens[at..end]) {
            kept.extend_from_slice(&tokens[at..end]);
            at = end;
        } else if whole_file {
            return (kept, test_files);
        } else {
            let item_end = item_end(tokens, end);
            test_files.extend(module_file(&tokens[end..item_end]));
            at = item_end;
        }
    }
    (kept, test_files)
}

/// End of the attribute that begins at `at`, if one does.
fn attribute_end(tokens: &[Token], at: usize) -> Option<usize> {
    let bracket = match (tokens.get(at)?, tokens.get(at + 1)?) {
        (hash, next) if hash.is("#") && next.is("[") => at + 1,
        (hash, next) if hash.is("#") && next.is("!") && tokens.get(at + 2)?.is("[") => at + 2,
        _ => return None,
    };
    Some(group_end(tokens, bracket))
}

/// End of the bracketed group that begins at `at`, after the closing bracket.
fn group_end(tokens: &[Token], at: usize) -> usize {
    let mut depth = 0;
    for (index, token) in tokens.iter().enumerate().skip(at) {
        match token.text.as_str() {
            "(" | "[" | "{" => depth += 1,
            ")" | "]" | "}" => depth -= 1,
            _ => {}
        }
        if depth == 0 {
            return index + 1;
        }
    }
    tokens.len()
}

/// Whether an attribute lets its item exist in tests only.
fn marks_test(attribute: &[Token]) -> bool {
    let text: String = attribute.iter().map(|token| token.text.as_str()).collect();
    let inner = text.trim_start_matches(['#', '!']);
    inner == "[test]" || inner == "[cfg(test)]" || inner.starts_with("[cfg(all(test,")
}

/// End of the item that begins at `at`, after its `;` or closing brace; more attributes may come first.
fn item_end(tokens: &[Token], mut at: usize) -> usize {
    while let Some(end) = attribute_end(tokens, at) {
        at = end;
    }
    while at < tokens.len() {
        match tokens[at].text.as_str() {
            ";" => return at + 1,
            "{" => return group_end(tokens, at),
            "(" | "[" => at = group_end(tokens, at),
            _ => at += 1,
        }
    }
    at
}

/// The module's name where the item is `mod name;`.
fn module_file(item: &[Token]) -> Option<String> {
    let module = item.iter().position(|token| token.is("mod"))?;
    item.last().filter(|last| last.is(";")).map(|_| item[module + 1].text.clone())
}

/// Every path of two names or more, and every single name that is imported, groups written out.
pub fn paths(tokens: &[Token]) -> Vec<Path> {
    let (mut found, mut at, mut depth) = (Vec::new(), 0, 0);
    let mut inside: Vec<(String, usize)> = Vec::new();
    while at < tokens.len() {
        match tokens[at].text.as_str() {
            "{" => depth += 1,
            "}" => {
                depth -= 1;
                inside.retain(|(_, opened)| *opened <= depth);
            }
            "mod" if tokens.get(at + 2).is_some_and(|token| token.is("{")) => {
                inside.push((tokens[at + 1].text.clone(), depth + 1));
            }
            _ => {}
        }
        if !begins_path(tokens, at) {
            at += 1;
            continue;
        }
        let mut names = Vec::new();
        let end = read_path(tokens, at, &[], &mut names);
        let imported = at > 0 && tokens[at - 1].is("use");
        let modules: Vec<String> = inside.iter().map(|(name, _)| name.clone()).collect();
        names.retain(|names: &Vec<String>| names.len() > 1 || imported);
        found.extend(names.into_iter().map(|names| Path { names, line: tokens[at].line, inside: modules.clone() }));
        at = end;
    }
    found
}

/// Words that may stand before a path that begins with `::`.
const BEFORE_PATHS: [&str; 8] = ["use", "return", "in", "else", "match", "dyn", "impl", "as"];

fn begins_path(tokens: &[Token], at: usize) -> bool {
    if !tokens[at].is_name() || tokens[at].is("use") || tokens[at].is("mod") {
        return false;
    }
    let before = |back: usize| at.checked_sub(back).map(|index| &tokens[index]);
    match before(1) {
        Some(previous) if previous.is("::") => {
            before(2).is_none_or(|word| !(word.is_name() || word.is(">")) || BEFORE_PATHS.contains(&word.text.as_str()))
        }
        _ => true,
    }
}

/// Reads the path that begins at `at` behind the names of `prefix`; returns its end.
fn read_path(tokens: &[Token], mut at: usize, prefix: &[String], found: &mut Vec<Vec<String>>) -> usize {
    let mut names = prefix.to_vec();
    let is = |at: usize, text: &str| tokens.get(at).is_some_and(|token| token.is(text));
    loop {
        if is(at, "{") {
            at += 1;
            while at < tokens.len() && !is(at, "}") {
                at = if is(at, ",") { at + 1 } else { read_path(tokens, at, &names, found) };
            }
            return at + 1;
        }
        let Some(token) = tokens.get(at) else { break };
        names.push(token.text.clone());
        at += 1;
        if !is(at, "::") || !tokens.get(at + 1).is_some_and(|next| next.is_name() || next.is("{") || next.is("*")) {
            break;
        }
        at += 1;
    }
    if is(at, "as") {
        at += 2;
    }
    found.push(names);
    at
}

/// A function: its name, the line of its `fn`, and its length in lines.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Function {
    /// Name.
    pub name: String,
    /// Line of the word `fn`.
    pub line: usize,
    /// Lines from there to the closing brace.
    pub length: usize,
}

/// Every function with a body.
pub fn functions(tokens: &[Token]) -> Vec<Function> {
    let starts = tokens.windows(2).enumerate().filter(|(_, pair)| pair[0].is("fn") && pair[1].is_name());
    let measured = starts.filter_map(|(at, pair)| {
        let mut body = at + 2;
        while body < tokens.len() && !tokens[body].is("{") {
            match tokens[body].text.as_str() {
                ";" => return None,
                "(" | "[" => body = group_end(tokens, body),
                _ => body += 1,
            }
        }
        let last = tokens.get(group_end(tokens, body).checked_sub(1)?)?;
        Some(Function { name: pair[1].text.clone(), line: pair[0].line, length: last.line - pair[0].line + 1 })
    });
    measured.collect()
}
