//! What was asked and of which program: the repeatable [`Record`] and the [`Run`] beside it.

use jiff::Timestamp;
use serde::{Serialize, Serializer};
use sha2::{Digest, Sha256};
use std::time::{Duration, SystemTime};

/// Name of the program in every record; a folder is ours if its record carries it.
pub const PROGRAM: &str = "swaybound";

/// The repeatable part of a result: the same request of the same version gives the same record. No clock.
#[derive(Debug, Clone, PartialEq, Eq, Serialize)]
pub struct Record {
    /// [`PROGRAM`].
    pub program: &'static str,
    /// Version of the program.
    pub version: &'static str,
    /// The command, such as `compare`.
    pub command: String,
    /// The command line as typed, see [`command_line`].
    pub command_line: String,
    /// The files read, in the order of the command line.
    pub inputs: Vec<Input>,
    /// Seed of the random draws, if there are any.
    pub seed: Option<u64>,
    /// Name of the random generator, if there are draws.
    pub generator: Option<String>,
    /// Options in force, defaults too, in order.
    #[serde(serialize_with = "as_map")]
    pub options: Vec<(String, String)>,
    /// What was counted, such as members or draws, in order.
    #[serde(serialize_with = "as_map")]
    pub counts: Vec<(String, u64)>,
}

impl Record {
    /// A record of this version of the program, yet without inputs, options and counts.
    pub fn new(command: impl Into<String>, command_line: String) -> Self {
        Self {
            program: PROGRAM,
            version: env!("CARGO_PKG_VERSION"),
            command: command.into(),
            command_line,
            inputs: Vec::new(),
            seed: None,
            generator: None,
            options: Vec::new(),
            counts: Vec::new(),
        }
    }

    /// Adds a file that was read.
    pub fn with_input(mut self, input: Input) -> Self {
        self.inputs.push(input);
        self
    }

    /// Sets seed and generator of the random draws.
    pub fn with_draws(mut self, seed: u64, generator: &str) -> Self {
        (self.seed, self.generator) = (Some(seed), Some(generator.into()));
        self
    }

    /// Sets an option; a name already there gets the new value.
    pub fn with_option(mut self, name: &str, value: impl ToString) -> Self {
        set(&mut self.options, name, value.to_string());
        self
    }

    /// Sets a count; a name already there gets the new value.
    pub fn with_count(mut self, name: &str, count: usize) -> Self {
        set(&mut self.counts, name, count as u64);
        self
    }

    /// The record as name and value, for people; input texts are left out.
    pub fn entries(&self) -> Vec<(String, String)> {
        let mut entries = vec![
            ("Program".into(), format!("{} {}", self.program, self.version)),
            ("Command line".into(), self.command_line.clone()),
        ];
        for input in &self.inputs {
            entries.push(("Input".into(), input.name.clone()));
            entries.push(("SHA-256".into(), input.sha256.clone()));
        }
        entries.extend(self.seed.map(|seed| ("Seed".into(), seed.to_string())));
        entries.extend(self.generator.iter().map(|generator| ("Generator".into(), generator.clone())));
        entries.extend(self.options.iter().cloned());
        entries.extend(self.counts.iter().map(|(name, count)| (name.clone(), count.to_string())));
        entries
    }
}

fn set<T>(entries: &mut Vec<(String, T)>, name: &str, value: T) {
    match entries.iter_mut().find(|(known, _)| known == name) {
        Some(entry) => entry.1 = value,
        None => entries.push((name.into(), value)),
    }
}

fn as_map<T: Serialize, S: Serializer>(entries: &[(String, T)], serializer: S) -> Result<S::Ok, S::Error> {
    serializer.collect_map(entries.iter().map(|(name, value)| (name, value)))
}

/// A file that was read.
#[derive(Debug, Clone, PartialEq, Eq, Serialize)]
pub struct Input {
    /// Name as typed.
    pub name: String,
    /// SHA-256 of the file's bytes, hexadecimal, small letters.
    pub sha256: String,
    /// The whole text, byte for byte.
    pub text: String,
}

impl Input {
    /// A file by its name as typed and its whole text, byte for byte as read.
    ///
    /// # References
    /// FIPS 180-4, Secure Hash Standard.
    pub fn new(name: impl Into<String>, text: impl Into<String>) -> Self {
        let text = text.into();
        let sha256 = Sha256::digest(text.as_bytes()).iter().map(|byte| format!("{byte:02x}")).collect();
        Self { name: name.into(), sha256, text }
    }
}

/// Words of a command line as one line, in quotes where a shell would need them.
pub fn command_line(words: impl IntoIterator<Item = String>) -> String {
    let safe = |letter: char| letter.is_alphanumeric() || "-_./\\:=,+@%".contains(letter);
    let quoted = |word: String| match !word.is_empty() && word.chars().all(safe) {
        true => word,
        false => format!("'{}'", word.replace('\'', r"'\''")),
    };
    words.into_iter().map(quoted).collect::<Vec<_>>().join(" ")
}

/// The part of a result that differs from run to run. It stands in JSON files only.
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct Run {
    /// Start, UTC, such as `2026-12-01T08:30:00Z`.
    pub start: String,
    /// How long it took, s.
    pub seconds: f64,
    /// Threads used.
    pub threads: usize,
    /// The machine, as the caller describes it.
    pub host: String,
}

impl Run {
    /// A run that started then, took so long, used so many threads, on that machine.
    pub fn new(start: SystemTime, took: Duration, threads: usize, host: impl Into<String>) -> Self {
        Self { start: rfc3339(start), seconds: took.as_secs_f64(), threads, host: host.into() }
    }
}

/// A time as UTC text, whole seconds, cut off; the latest time that can be written where it lies beyond.
///
/// # References
/// RFC 3339, section 5.6.
fn rfc3339(time: SystemTime) -> String {
    Timestamp::try_from(time).unwrap_or(Timestamp::MAX).strftime("%Y-%m-%dT%H:%M:%SZ").to_string()
}

#[cfg(test)]
mod tests {
    use super::*;
    use std::time::UNIX_EPOCH;

    #[test]
    fn known_moments_read_as_their_dates() {
        // Seconds checked with the date command: `date -u -d @...`.
        let moments = [
            (0, "1970-01-01T00:00:00Z"),
            (951_782_399, "2000-02-28T23:59:59Z"),
            (951_825_600, "2000-02-29T12:00:00Z"),
            (1_234_567_890, "2009-02-13T23:31:30Z"),
            (4_107_542_400, "2100-03-01T00:00:00Z"),
        ];
        for (seconds, text) in moments {
            assert_eq!(rfc3339(UNIX_EPOCH + Duration::from_secs(seconds)), text);
        }
    }

    #[test]
    fn the_hash_is_the_published_one() {
        // FIPS 180-4 example: SHA-256 of "abc".
        let hash = "ba7816bf8f01cfea414140de5dae2223b00361a396177a9cb410ff61f20015ad";
        assert_eq!(Input::new("a.toml", "abc").sha256, hash);
    }

    #[test]
    fn words_with_blanks_are_quoted() {
        let words = ["swaybound", "compare", "my frame.toml", "it's", ""].map(String::from);
        assert_eq!(command_line(words), r"swaybound compare 'my frame.toml' 'it'\''s' ''");
    }
}
