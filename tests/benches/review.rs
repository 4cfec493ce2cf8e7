//! How long and how much memory a review takes, as ratios within one run: these machines are noisy.
//!
//! `cargo bench` measures buildings of 100 and 1 000 joints as ifcXML and as STEP; `cargo bench -- 10000` that many (some
//! 260 MB of ifcXML). The models lie in the folder for temporary files, or stay in a folder that is given as an
//! argument. Times are the least of several runs; memory is the peak of the built program.

#[path = "../writer/mod.rs"]
#[allow(dead_code)]
mod writer;

use std::fs;
use std::hint::black_box;
use std::path::{Path, PathBuf};
use std::process::{Command, Stdio};
use std::time::{Duration, Instant};

use comfy_table::Table;
use faying::compose::{self, Sources};
use faying::exchange::Exchange;
use faying::intent::{self, Intent};
use faying::rulebook::Rulebook;
use faying::run::{Inputs, run};
use faying::{exchange, joints, shop};
use quick_xml::Reader;
use quick_xml::events::Event;
use writer::Form;
use writer::building::End;
use writer::frames::frames;
use writer::ifcxml::Style;
use writer::version::Version;

/// The forms that are measured: file extension, form, and the yardstick, a bare pass over the same bytes.
type Measured = (&'static str, Form, fn(&[u8]));

const FORMS: [Measured; 2] = [
    ("ifcxml", Form::IfcXml(Style { flat: false, prefixed: false }), bare_loop),
    ("ifc", Form::Step(Version::Ifc4), bare_scan),
];

fn main() {
    let arguments: Vec<String> = std::env::args().skip(1).filter(|argument| !argument.starts_with("--")).collect();
    let asked: Vec<usize> = arguments.iter().filter_map(|a| a.parse().ok()).collect();
    let sizes = if asked.is_empty() { vec![100, 1000] } else { asked };
    let temporary = tempfile::tempdir().expect("a folder for temporary files");
    let kept = arguments.iter().find(|a| a.parse::<usize>().is_err()).map(PathBuf::from);
    let folder = kept.as_deref().unwrap_or(temporary.path());
    fs::create_dir_all(folder).expect("a folder for the models");
    let mut reading = Table::new();
    reading.set_header([
        "joints",
        "form",
        "file MB",
        "bare pass MB/s",
        "review / bare pass",
        "read",
        "take up",
        "recognise",
        "rest",
        "µs a joint",
        "peak memory / file",
    ]);
    let mut assessing = Table::new();
    assessing.set_header(["joints", "review of equal joints", "of joints that all differ"]);
    for joints in sizes {
        for (extension, form, bare) in FORMS {
            let path = folder.join(format!("{joints}.{extension}"));
            let file = std::io::BufWriter::new(fs::File::create(&path).expect("a new file"));
            writer::write(&frames(joints, false), form, file).expect("room for the model");
            let bytes = fs::read(&path).expect("the model that was just written");
            reading
                .add_row([vec![joints.to_string(), extension.into()], measure(joints, &path, &bytes, bare)].concat());
        }
        let times = [false, true].map(|differ| format!("{:.3} s", assess(joints, differ).as_secs_f64()));
        assessing.add_row([vec![joints.to_string()], times.to_vec()].concat());
    }
    println!("{reading}\nfrom recognised joints to the review, without a schedule:\n{assessing}");
}

/// How long it takes from the recognised joints to their review; where they differ, no detail is solved twice.
fn assess(joints: usize, differ: bool) -> Duration {
    let mut building = frames(joints, false);
    let ends = building.beams.iter_mut().flat_map(|beam| &mut beam.ends);
    for (number, end) in ends.enumerate().filter(|_| differ) {
        if let End::Joint { joint, .. } = end {
            joint.detail.plate.top += number as f64 * 1e-3;
        }
    }
    let bytes = writer::bytes(&building, Form::Step(Version::Ifc4));
    let (rulebook, exchange) = (Rulebook::embedded(), entities(&bytes));
    let steelwork = shop::take_up(&exchange, &rulebook);
    let joints = joints::recognise(&steelwork, &rulebook);
    let intent = Intent::default();
    let pairing = intent::pair(&intent, &joints, &steelwork);
    let sources = Sources {
        rulebook: &rulebook,
        exchange: &exchange,
        steelwork: &steelwork,
        joints: &joints,
        intent: &intent,
        pairing: &pairing,
        schedules: Vec::new(),
    };
    least(|| drop(black_box(compose::review(&sources, "model", b""))))
}

fn entities(bytes: &[u8]) -> Exchange {
    exchange::read(bytes, "model").expect("our own writer's model")
}

/// The least time of a few runs.
fn least(mut work: impl FnMut()) -> Duration {
    let runs = if cfg!(debug_assertions) { 1 } else { 5 };
    let mut best = Duration::MAX;
    let begun = Instant::now();
    for _ in 0..runs {
        let start = Instant::now();
        work();
        best = best.min(start.elapsed());
        if begun.elapsed() > Duration::from_secs(60) {
            break;
        }
    }
    best
}

/// A bare quick-xml event loop that also looks at every attribute: the yardstick.
fn bare_loop(bytes: &[u8]) {
    let mut reader = Reader::from_reader(bytes);
    let mut seen = 0_usize;
    loop {
        match reader.read_event() {
            Ok(Event::Start(element) | Event::Empty(element)) => {
                seen += element.attributes().flatten().map(|a| a.value.len()).sum::<usize>();
            }
            Ok(Event::Eof) => break,
            Ok(_) => {}
            Err(error) => panic!("{error}"),
        }
    }
    black_box(seen);
}

/// A bare scan of a STEP file that finds the end of each line and each reference: the yardstick.
fn bare_scan(bytes: &[u8]) {
    let ends = memchr::memchr2_iter(b'\n', b'#', bytes).map(|at| at & 1).sum::<usize>();
    black_box(ends);
}

fn measure(joints: usize, path: &Path, bytes: &[u8], bare: fn(&[u8])) -> Vec<String> {
    let rulebook = Rulebook::embedded();
    let bare = least(|| bare(bytes));
    let inputs = Inputs { model: ("model", bytes), schedules: Vec::new(), rules: Vec::new() };
    let whole = least(|| drop(black_box(run(&inputs))));
    let read = least(|| drop(black_box(entities(bytes))));
    let exchange = entities(bytes);
    let take_up = least(|| drop(black_box(shop::take_up(&exchange, &rulebook))));
    let steelwork = shop::take_up(&exchange, &rulebook);
    let recognise = least(|| drop(black_box(joints::recognise(&steelwork, &rulebook))));
    let rest = whole.saturating_sub(read + take_up + recognise);
    let ratio = |time: Duration| format!("{:.2}", time.as_secs_f64() / bare.as_secs_f64());
    vec![
        format!("{:.1}", bytes.len() as f64 / 1e6),
        format!("{:.0}", bytes.len() as f64 / 1e6 / bare.as_secs_f64()),
        ratio(whole),
        ratio(read),
        ratio(take_up),
        ratio(recognise),
        ratio(rest),
        format!("{:.0}", whole.as_secs_f64() * 1e6 / joints as f64),
        peak_memory(path).map_or("not measured".into(), |peak| format!("{:.2}", peak / bytes.len() as f64)),
    ]
}

/// Peak resident memory of the built program reviewing the model, in bytes; only where the system tells it.
fn peak_memory(path: &Path) -> Option<f64> {
    let mut child = Command::new(env!("CARGO_BIN_EXE_faying"))
        .args(["review", "--format", "json"])
        .arg(path)
        .stdout(Stdio::null())
        .stderr(Stdio::null())
        .spawn()
        .ok()?;
    let status = format!("/proc/{}/status", child.id());
    let mut peak = None;
    while child.try_wait().ok()?.is_none() {
        if let Ok(text) = fs::read_to_string(&status) {
            let line = text.lines().find_map(|line| line.strip_prefix("VmHWM:"));
            let kib = line.and_then(|line| line.trim().trim_end_matches(" kB").parse::<f64>().ok());
            peak = kib.map(|kib| kib * 1024.0).or(peak);
        }
        std::thread::sleep(Duration::from_millis(2));
    }
    peak
}
