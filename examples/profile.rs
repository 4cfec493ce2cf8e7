use faying::{compose, exchange, intent, joints, report, rulebook::Rulebook, shop};
use std::time::Instant;
fn main() {
    let path = std::env::args().nth(1).unwrap();
    let sched = std::env::args().nth(2);
    let bytes = std::fs::read(&path).unwrap();
    let s = sched.map(|p| std::fs::read(p).unwrap());
    let mut t = Instant::now();
    let mut lap = |what: &str| {
        println!("{what:10} {:8.1} ms", t.elapsed().as_secs_f64() * 1e3);
        t = Instant::now();
    };
    let rulebook = Rulebook::with_overrides(&[]).unwrap();
    lap("rules");
    let scheds: Vec<(&str, &[u8])> = s.iter().map(|b| ("schedule.toml", b.as_slice())).collect();
    let intent = intent::read_all(&scheds).unwrap();
    lap("intent");
    let ex = exchange::read(&bytes, "m").unwrap();
    lap("exchange");
    let steel = shop::take_up(&ex, &rulebook);
    lap("shop");
    let js = joints::recognise(&steel, &rulebook);
    lap("joints");
    let pairing = intent::pair(&intent, &js, &steel);
    lap("pair");
    let sources = compose::Sources {
        rulebook: &rulebook,
        exchange: &ex,
        steelwork: &steel,
        joints: &js,
        intent: &intent,
        pairing: &pairing,
        schedules: scheds.iter().map(|s| s.0).collect(),
    };
    let review = compose::review(&sources, "m", &bytes);
    lap("assess+find");
    let text = report::text::render(&review, &report::Options::default(), Some(&bytes));
    lap("text");
    let all = report::text::render(&review, &report::Options { all: true, ..Default::default() }, Some(&bytes));
    lap("text all");
    let json = report::json::review(&review).unwrap();
    lap("json");
    println!(
        "{} bytes in, {} joints, text {} lines, all {} lines, json {} bytes",
        bytes.len(),
        review.counts.found,
        text.lines().count(),
        all.lines().count(),
        json.len()
    );
}
