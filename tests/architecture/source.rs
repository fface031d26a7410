//! Rust sources as tokens, as far as imports need them.

use std::fs;
use std::path::{Path, PathBuf};

/// A source file of the crate.
pub struct Source {
    /// Its place below `src`.
    pub path: PathBuf,
    /// The room it belongs to; empty for `lib.rs` and `main.rs`.
    pub room: String,
    /// Its text.
    pub text: String,
}

impl Source {
    /// The source at `path` below `src`.
    pub fn of(path: &str, text: &str) -> Self {
        let path = PathBuf::from(path);
        let first = path.iter().next().map(|part| part.to_string_lossy());
        let room = match first.as_deref() {
            Some("lib.rs" | "main.rs") | None => String::new(),
            Some(name) => name.trim_end_matches(".rs").to_string(),
        };
        Source {
            path,
            room,
            text: text.to_string(),
        }
    }

    /// How deep its module lies: 1 for the root of a room.
    fn depth(&self) -> usize {
        let file = self.path.file_stem().map(|stem| stem.to_string_lossy());
        let parts = self.path.iter().count();
        match file.as_deref() {
            Some("mod") => parts - 1,
            Some("lib" | "main") if parts == 1 => 0,
            _ => parts,
        }
    }
}

/// Every source file of the crate.
pub fn sources() -> Vec<Source> {
    let root = Path::new(env!("CARGO_MANIFEST_DIR")).join("src");
    let mut found = Vec::new();
    let mut open = vec![root.clone()];
    while let Some(directory) = open.pop() {
        for entry in fs::read_dir(&directory).unwrap() {
            let path = entry.unwrap().path();
            if path.is_dir() {
                open.push(path);
            } else if path.extension().is_some_and(|ending| ending == "rs") {
                let text = fs::read_to_string(&path).unwrap();
                let below = path.strip_prefix(&root).unwrap();
                found.push(Source::of(&below.to_string_lossy(), &text));
            }
        }
    }
    found
}

/// Paths that leave the module: `["crate", room]`, or `["", crate]` for another crate.
pub fn paths_used(source: &Source) -> Vec<Vec<String>> {
    let tokens = tokens(&source.text);
    let token = |at: usize| tokens.get(at).map_or("", String::as_str);
    let mut found = Vec::new();
    let mut inline: Vec<bool> = Vec::new();
    for at in 0..tokens.len() {
        match token(at) {
            "{" => inline.push(at >= 2 && token(at - 2) == "mod"),
            "}" => {
                inline.pop();
            }
            _ => {}
        }
        let starts = at == 0 || !matches!(token(at - 1), "::" | "." | "mod" | "fn" | "let");
        if !starts || !is_word(token(at)) {
            continue;
        }
        let depth = source.depth() + inline.iter().filter(|module| **module).count();
        match token(at) {
            "crate" | "coilstay" if token(at + 1) == "::" => {
                for name in heads(&tokens, at + 2) {
                    found.push(vec!["crate".into(), name]);
                }
            }
            "super" => {
                let mut next = at;
                let mut ups = 0;
                while token(next) == "super" && token(next + 1) == "::" {
                    ups += 1;
                    next += 2;
                }
                if ups >= depth {
                    for name in heads(&tokens, next) {
                        found.push(vec!["crate".into(), name]);
                    }
                }
            }
            word if token(at + 1) == "::" || (at > 0 && token(at - 1) == "use") => {
                found.push(vec![String::new(), word.to_string()]);
            }
            _ => {}
        }
    }
    found
}

/// First names of the path or group of paths that starts at `at`.
fn heads(tokens: &[String], at: usize) -> Vec<String> {
    let token = |at: usize| tokens.get(at).map_or("", String::as_str);
    if token(at) != "{" {
        return vec![token(at).to_string()];
    }
    let mut names = Vec::new();
    let mut depth = 0;
    for next in at..tokens.len() {
        match token(next) {
            "{" => depth += 1,
            "}" => depth -= 1,
            word if depth == 1 && is_word(word) && matches!(token(next - 1), "{" | ",") => {
                names.push(word.to_string());
            }
            _ => {}
        }
        if depth == 0 {
            break;
        }
    }
    names
}

fn is_word(token: &str) -> bool {
    token.starts_with(|c: char| c.is_alphabetic() || c == '_')
}

/// Words, `::`, and every other character that is not blank; comments and literals left out.
fn tokens(text: &str) -> Vec<String> {
    let all: Vec<char> = text.chars().collect();
    let char_at = |at: usize| all.get(at).copied().unwrap_or('\0');
    let mut tokens = Vec::new();
    let mut at = 0;
    while at < all.len() {
        let character = all[at];
        if character == '/' && char_at(at + 1) == '/' {
            while at < all.len() && all[at] != '\n' {
                at += 1;
            }
        } else if character == '/' && char_at(at + 1) == '*' {
            at = after_block_comment(&all, at);
        } else if character == '"' {
            at = after_string(&all, at);
        } else if character == '\'' {
            at = after_quote(&all, at);
        } else if character.is_alphanumeric() || character == '_' {
            let start = at;
            while char_at(at).is_alphanumeric() || char_at(at) == '_' {
                at += 1;
            }
            let word: String = all[start..at].iter().collect();
            let raw = matches!(word.as_str(), "r" | "br") && matches!(char_at(at), '"' | '#');
            match raw.then(|| after_raw_string(&all, at)).flatten() {
                Some(after) => at = after,
                None => tokens.push(word),
            }
        } else if character == ':' && char_at(at + 1) == ':' {
            tokens.push("::".to_string());
            at += 2;
        } else {
            if !character.is_whitespace() {
                tokens.push(character.to_string());
            }
            at += 1;
        }
    }
    tokens
}

fn after_block_comment(all: &[char], start: usize) -> usize {
    let mut depth = 0;
    let mut at = start;
    while at < all.len() {
        match (all[at], all.get(at + 1)) {
            ('/', Some('*')) => {
                depth += 1;
                at += 2;
            }
            ('*', Some('/')) => {
                depth -= 1;
                at += 2;
                if depth == 0 {
                    return at;
                }
            }
            _ => at += 1,
        }
    }
    at
}

fn after_string(all: &[char], start: usize) -> usize {
    let mut at = start + 1;
    while at < all.len() && all[at] != '"' {
        at += if all[at] == '\\' { 2 } else { 1 };
    }
    at + 1
}

/// Behind a character literal, or behind the mark of a lifetime.
fn after_quote(all: &[char], start: usize) -> usize {
    if all.get(start + 1) == Some(&'\\') {
        let mut at = start + 3;
        while at < all.len() && all[at] != '\'' {
            at += 1;
        }
        return at + 1;
    }
    if all.get(start + 2) == Some(&'\'') {
        start + 3
    } else {
        start + 1
    }
}

/// Behind a raw string whose hashes or quote begin at `start`; `None` for a raw name (`r#type`).
fn after_raw_string(all: &[char], start: usize) -> Option<usize> {
    let hashes = all[start..].iter().take_while(|c| **c == '#').count();
    if all.get(start + hashes) != Some(&'"') {
        return None;
    }
    let mut at = start + hashes + 1;
    while at < all.len() {
        let closes =
            all[at] == '"' && all[at + 1..].iter().take_while(|c| **c == '#').count() >= hashes;
        at += 1;
        if closes {
            return Some(at + hashes);
        }
    }
    Some(at)
}
