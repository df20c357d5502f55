//! The shape of the source: which module may use which, where the disk and some crates may be touched, how long files and
//! functions may grow.
#![allow(clippy::unwrap_used, clippy::expect_used, clippy::panic, reason = "a test fails by panicking")]

#[path = "support/source.rs"]
mod source;

use source::{Path, Token, functions, paths, tokens, without_tests};
use std::collections::BTreeSet;
use std::fs;

/// Top modules in the order of use: a module may use those of earlier rows and itself.
const ORDER: [&[&str]; 13] = [
    &["units", "progress"],
    &["frame"],
    &["lane"],
    &["response"],
    &["solve"],
    &["exact", "approx"],
    &["compare"],
    &["family"],
    &["review", "size"],
    &["report"],
    &["store"],
    &["cli"],
    // The roots of the library and of the program.
    &[""],
];

/// Paths that may be named in some top modules only.
const KEPT_IN: [(&[&str], &[&str]); 4] =
    [(&["clap"], &["cli"]), (&["plotters"], &["report"]), (&["rayon"], &["family"]), (&["std", "fs"], &["store"])];

/// Words that may not occur, and what they stand for.
const BANNED: [(&str, &str); 3] =
    [("unsafe", "unsafe code"), ("unsafe_code", "a lint level for unsafe code"), ("macro_rules", "a macro of our own")];

/// The one file of unsafe code: registers that not every processor has, and the way into code that uses them.
const UNSAFE_IN: &str = "src/lane/avx2.rs";

/// The most lines of a file and of a function.
const LONGEST_FILE: usize = 600;
const LONGEST_FUNCTION: usize = 60;

/// A source file: its path from the project's root, and its text.
struct File<'a> {
    path: &'a str,
    text: &'a str,
}

/// Every breach of the rules in a set of files, one sentence each.
fn breaches(files: &[File]) -> Vec<String> {
    let read: Vec<_> = files.iter().map(|file| (file, tokens(file.text))).collect();
    let test_files: BTreeSet<Vec<String>> = read.iter().flat_map(|(file, tokens)| test_modules(file, tokens)).collect();
    let mut found = Vec::new();
    for (file, tokens) in &read {
        let module = module_of(file.path);
        found.extend(sizes(file, tokens));
        if test_files.iter().any(|test| module.starts_with(test)) {
            continue;
        }
        let (code, _) = without_tests(tokens);
        found.extend(uses(file, &module, &code));
        for token in &code {
            let banned = BANNED.iter().find(|(word, _)| *word == token.text);
            let banned = banned.filter(|(word, _)| !(file.path == UNSAFE_IN && word.starts_with("unsafe")));
            found.extend(banned.map(|(_, what)| format!("{}:{}: {what}", file.path, token.line)));
        }
    }
    found
}

/// Modules of the file that are test code in files of their own.
fn test_modules(file: &File, tokens: &[Token]) -> Vec<Vec<String>> {
    let names = without_tests(tokens).1;
    names.into_iter().map(|name| [module_of(file.path), vec![name]].concat()).collect()
}

/// Names of the modules from the root to this file: `src/frame/fault.rs` is frame, fault; the roots have none.
fn module_of(path: &str) -> Vec<String> {
    let inner = path.strip_prefix("src/").unwrap_or(path);
    let names = inner.strip_suffix(".rs").unwrap_or(inner).split('/');
    names.filter(|name| !["mod", "lib", "main"].contains(name)).map(String::from).collect()
}

fn sizes(file: &File, tokens: &[Token]) -> Vec<String> {
    let mut found = Vec::new();
    let lines = file.text.lines().count();
    if lines > LONGEST_FILE {
        found.push(format!("{}: {lines} lines, at most {LONGEST_FILE}", file.path));
    }
    for function in functions(tokens).iter().filter(|function| function.length > LONGEST_FUNCTION) {
        let (path, line, length) = (file.path, function.line, function.length);
        found.push(format!("{path}:{line}: `{}` has {length} lines, at most {LONGEST_FUNCTION}", function.name));
    }
    found
}

/// Place of a top module in [`ORDER`].
fn rank(module: &str) -> Option<usize> {
    ORDER.iter().position(|row| row.contains(&module))
}

/// Breaches in the paths of one file.
fn uses(file: &File, module: &[String], code: &[Token]) -> Vec<String> {
    let own = module.first().map_or("", String::as_str);
    let Some(own_rank) = rank(own) else {
        return vec![format!("{}: module `{own}` has no place in the order", file.path)];
    };
    let mut found = Vec::new();
    for path in paths(code) {
        let place = format!("{}:{}: `{}`", file.path, path.line, path.names.join("::"));
        found.extend(misplaced(own, &path).map(|homes| format!("{place} belongs in {homes}")));
        let Some(used) = top_module(module, &path) else { continue };
        match (used.as_str(), rank(&used)) {
            (used, _) if used == own && !own.is_empty() => {}
            ("" | "*" | "self", _) => found.push(format!("{place} names the whole crate")),
            (_, Some(rank)) if rank < own_rank => {}
            (_, Some(_)) => found.push(format!("{place} is not before `{own}` in the order")),
            (_, None) if own.is_empty() => {}
            (_, None) => found.push(format!("{place} names no top module")),
        }
    }
    found
}

/// The modules a path should stay in, where it does not.
fn misplaced(own: &str, path: &Path) -> Option<String> {
    let names: Vec<&str> = path.names.iter().map(String::as_str).collect();
    if names == ["std"] || names == ["std", "self"] || names == ["std", "*"] {
        return Some("no file: it hides what is used".into());
    }
    let (_, homes) = KEPT_IN.iter().find(|(kept, _)| names.starts_with(kept))?;
    (!homes.contains(&own)).then(|| homes.join(", "))
}

/// The top module that a path leads into, empty for the root itself; `None` where it leads out of the crate or
/// nowhere near the root.
fn top_module(module: &[String], path: &Path) -> Option<String> {
    let mut names = path.names.iter().map(String::as_str).peekable();
    let mut at: Vec<&str> = module.iter().chain(&path.inside).map(String::as_str).collect();
    match names.next()? {
        "crate" | "swaybound" => at.clear(),
        "super" => drop(at.pop()),
        "self" => {}
        _ => return None,
    }
    while names.next_if(|name| *name == "super").is_some() {
        at.pop();
    }
    at.extend(names);
    Some(at.first().copied().unwrap_or("").into())
}

/// Every Rust file under a folder.
fn read_all(folder: &std::path::Path, into: &mut Vec<(String, String)>) {
    for entry in fs::read_dir(folder).expect("the source folder can be listed") {
        let path = entry.expect("an entry can be read").path();
        if path.is_dir() {
            read_all(&path, into);
        } else if path.extension().is_some_and(|extension| extension == "rs") {
            let root = std::path::Path::new(env!("CARGO_MANIFEST_DIR"));
            let inner = path.strip_prefix(root).expect("source lies in the project");
            let name = inner.components().map(|part| part.as_os_str().to_string_lossy()).collect::<Vec<_>>().join("/");
            into.push((name, fs::read_to_string(&path).expect("source is text")));
        }
    }
}

#[test]
fn the_source_keeps_its_order() {
    let mut read = Vec::new();
    read_all(&std::path::Path::new(env!("CARGO_MANIFEST_DIR")).join("src"), &mut read);
    assert!(read.len() > 15, "only {} files were found", read.len());
    let files: Vec<File> = read.iter().map(|(path, text)| File { path, text }).collect();
    let found = breaches(&files);
    assert!(found.is_empty(), "{} breaches:\n{}", found.len(), found.join("\n"));
    let inner = |(path, text): &(String, String)| {
        let (code, _) = without_tests(&tokens(text));
        paths(&code).iter().filter(|used| top_module(&module_of(path), used).is_some()).count()
    };
    let seen: usize = read.iter().map(inner).sum();
    assert!(seen > 40, "only {seen} paths inside the crate were seen: the reader must have gone blind");
}

/// Breaches of one file of the given path and text.
fn of(path: &str, text: &str) -> Vec<String> {
    breaches(&[File { path, text }])
}

#[test]
fn planted_breaches_are_caught() {
    let planted = [
        ("src/frame/mod.rs", "use crate::response::Response;"),
        ("src/frame/mod.rs", "use crate::{units::{Unit, ReportUnits}, lane::{Lane}};"),
        ("src/frame/names.rs", "fn f() -> usize {\n    crate::approx::METHODS.len()\n}"),
        ("src/frame/names.rs", "use super::super::solve::Singular;"),
        ("src/frame/mod.rs", "use super::store;"),
        ("src/frame/mod.rs", "mod inner {\n    use super::super::exact;\n}"),
        ("src/units.rs", "use super::frame::Frame;"),
        ("src/units.rs", "use crate::progress::Progress;"),
        ("src/exact/stiffness.rs", "use crate::approx::find;"),
        ("src/approx/portal.rs", "use crate::exact::stiffness;"),
        ("src/review/mod.rs", "use crate::size::demand;"),
        ("src/lane/mod.rs", "type A = Vec<crate::response::Members<4>>;"),
        ("src/solve/mod.rs", "fn f() { let text = \"// not a comment\"; crate::exact::go(text) }"),
        ("src/solve/mod.rs", "fn f() { let text = r#\"a \" b\"#; crate::exact::go(text) }"),
        ("src/solve/mod.rs", "fn f(c: char) -> bool { c == '\"' || crate::exact::yes('\\'') }"),
        ("src/solve/mod.rs", "/* a /* nested */ comment */ use crate::exact;"),
        ("src/solve/mod.rs", "fn f<'a>(text: &'a str) { crate::exact::go(text) }"),
        ("src/solve/mod.rs", "#[cfg(test)]\nmod tests {\n    fn f() {}\n}\nuse crate::exact;"),
        ("src/solve/mod.rs", "#[cfg(not(test))]\nuse crate::exact;"),
        ("src/solve/mod.rs", "use crate::*;"),
        ("src/solve/mod.rs", "use crate as all;"),
        ("src/solve/mod.rs", "use crate::{self as all};"),
        ("src/report/mod.rs", "use swaybound::store::write;"),
        ("src/store/mod.rs", "use crate::cli::Options;"),
        ("src/store/mod.rs", "use crate::unheard_of::Thing;"),
        ("src/unheard_of/mod.rs", "fn f() {}"),
        ("src/report/text.rs", "use clap::ValueEnum;"),
        ("src/main.rs", "use ::clap::Parser;"),
        ("src/compare/mod.rs", "#[derive(clap::ValueEnum)]\nenum A { B }"),
        ("src/cli/compare.rs", "use plotters::prelude::*;"),
        ("src/exact/mod.rs", "use rayon::prelude::*;"),
        ("src/report/html.rs", "use std::{fmt, fs};"),
        ("src/report/html.rs", "use std::{fmt, fs::{File as Disk}};"),
        ("src/cli/mod.rs", "fn f() { let _ = std::fs::read(\"a\"); }"),
        ("src/main.rs", "use std::fs;"),
        ("src/main.rs", "use std as library;"),
        ("src/lane/mod.rs", "fn f() { unsafe { g() } }"),
        ("src/lane/form.rs", "#![allow(unsafe_code)]"),
        ("src/lane/avx2.rs", "macro_rules! lane { () => {} }"),
        ("src/units.rs", "macro_rules! unit { () => {} }"),
    ];
    for (path, text) in planted {
        assert_eq!(of(path, text).len(), 1, "in {path}: {text}\nfound {:?}", of(path, text));
    }
}

#[test]
fn lawful_source_is_left_alone() {
    let lawful = [
        ("src/lib.rs", "pub mod frame;\npub use crate::frame::Frame;"),
        ("src/main.rs", "mod cli;\nfn main() -> ExitCode { cli::run(swaybound::store::read) }"),
        ("src/cli/mod.rs", "use clap::Parser;\nuse swaybound::{store, report::text};\nuse crate::cli::common;"),
        ("src/store/mod.rs", "use std::fs;\nuse crate::report::Dataset;"),
        ("src/frame/mod.rs", "mod names;\npub use names::line_name;\nuse crate::units::Unit;"),
        ("src/frame/names.rs", "use super::Frame;\nuse super::super::units::Unit;\nuse crate::frame::fault::Fault;"),
        ("src/frame/mod.rs", "/// See `crate::store`.\n// use crate::store;\n/* use crate::store; */\nfn f() {}"),
        ("src/frame/mod.rs", "const A: &str = \"use crate::store; unsafe\";\nconst B: &str = r\"crate::cli::x\";"),
        ("src/frame/mod.rs", "#[cfg(test)]\nmod tests {\n    use crate::store;\n    use std::fs;\n}"),
        ("src/frame/mod.rs", "#[cfg(test)]\nuse crate::store;\nfn f() {}"),
        ("src/frame/mod.rs", "#[test]\nfn f() { let _ = std::fs::read(\"a\"); }"),
        ("src/frame/mod.rs", "pub(crate) fn f() -> std::fmt::Result { Ok(()) }"),
        ("src/frame/mod.rs", "fn f(fs: usize, clap: usize) -> usize { fs + clap }"),
        ("src/lane/avx2.rs", "#![allow(unsafe_code)]\nfn f() { unsafe { g() } }"),
    ];
    for (path, text) in lawful {
        assert_eq!(of(path, text), [""; 0], "in {path}: {text}");
    }
}

#[test]
fn test_code_in_a_file_of_its_own_is_left_alone() {
    let parent = File { path: "src/frame/mod.rs", text: "#[cfg(test)]\nmod tests;" };
    let tests = File { path: "src/frame/tests.rs", text: "use crate::store;\nmod deeper;" };
    let deeper = File { path: "src/frame/tests/deeper.rs", text: "use crate::cli;" };
    let other = File { path: "src/lane/tests.rs", text: "use crate::store;" };
    let found = breaches(&[parent, tests, deeper, other]);
    assert!(found.len() == 1 && found[0].starts_with("src/lane/tests.rs:1"), "{found:?}");
}

#[test]
fn long_files_and_functions_are_caught() {
    let function = |lines: usize| format!("fn long(a: [u8; 2]) -> usize {{\n{}}}\n", "    go();\n".repeat(lines - 2));
    assert_eq!(of("src/units.rs", &function(60)).len(), 0);
    assert_eq!(of("src/units.rs", &function(61)).len(), 1);
    let nested = format!("impl A {{\n    fn short() {{}}\n{}}}\n", function(61));
    assert_eq!(of("src/units.rs", &nested).len(), 1);
    let braces =
        format!("trait A {{ fn none(&self);\nfn text(&self) -> char {{ '{{' }}\n}}\n{}", "fn a() {}\n".repeat(100));
    assert_eq!(of("src/units.rs", &braces).len(), 0);
    assert_eq!(of("src/units.rs", &"fn a() {}\n".repeat(600)).len(), 0);
    assert_eq!(of("src/units.rs", &"fn a() {}\n".repeat(601)).len(), 1);
}
