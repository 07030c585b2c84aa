//! What this machine can do at best: bandwidth of a streaming read, sizes of its caches, what else runs on it.

use std::fs;
use std::hint::black_box;
use std::time::Instant;

use crate::sample::{count, median};

/// Sums read side by side, so that the additions keep up with the memory.
const LANES: usize = 32;
/// Bytes read for one measurement, at least, so that short arrays are read often.
const LEAST_READ: usize = 1 << 29;

/// Bytes a second that one thread reads from an array of `bytes`, median of five.
pub(crate) fn read_bandwidth(bytes: usize) -> f64 {
    let array: Vec<f64> = vec![1.0; (bytes / size_of::<f64>()).max(LANES)];
    let passes = LEAST_READ.div_ceil(array.len() * size_of::<f64>());
    let pass = |array: &[f64]| {
        let mut sums = [0.0; LANES];
        for chunk in array.chunks_exact(LANES) {
            sums.iter_mut().zip(chunk).for_each(|(s, x)| *s += x);
        }
        black_box(sums);
    };
    pass(&array);
    let measure = |_| {
        let begin = Instant::now();
        for _ in 0..passes {
            pass(black_box(&array));
        }
        count(passes * array.len() * size_of::<f64>()) / begin.elapsed().as_secs_f64()
    };
    median(&(0..5).map(measure).collect::<Vec<f64>>())
}

/// An array that is read to push everything else out of the caches.
pub(crate) struct Sweeper {
    array: Vec<f64>,
}

impl Sweeper {
    /// As large as memory is taken to be for a bandwidth: [`far_beyond_caches`].
    pub(crate) fn new() -> Self {
        Self { array: vec![1.0; far_beyond_caches() / size_of::<f64>()] }
    }

    /// Reads it once.
    pub(crate) fn sweep(&self) {
        black_box(self.array.iter().step_by(8).sum::<f64>());
    }
}

/// Bytes of an array far larger than the last cache: four times it, and at least 512 MiB.
pub(crate) fn far_beyond_caches() -> usize {
    let last = caches().last().map_or(0, |c| c.1);
    (4 * last).max(1 << 29)
}

/// Name and bytes of the data caches, inner to outer, as the kernel tells them; empty where it doesn't.
pub(crate) fn caches() -> Vec<(String, usize)> {
    let of = |k: usize| {
        let read = |what: &str| fs::read_to_string(format!("/sys/devices/system/cpu/cpu0/cache/index{k}/{what}")).ok();
        let (level, kind, size) = (read("level")?, read("type")?, read("size")?);
        let kib: usize = size.trim().strip_suffix('K')?.parse().ok()?;
        (kind.trim() != "Instruction").then(|| (format!("L{}", level.trim()), kib << 10))
    };
    (0..8).filter_map(of).collect()
}

/// The smallest cache that holds `bytes`, or "memory".
pub(crate) fn home(bytes: usize) -> String {
    caches().into_iter().find(|c| c.1 >= bytes).map_or_else(|| "memory".to_owned(), |c| c.0)
}

/// Processor seconds that this process has used on all its threads, to a hundredth; `None` where the kernel doesn't tell.
pub(crate) fn processor_seconds() -> Option<f64> {
    let stat = fs::read_to_string("/proc/self/stat").ok()?;
    let fields: Vec<&str> = stat.rsplit(')').next()?.split_whitespace().collect();
    let ticks = |k: usize| fields.get(k).and_then(|f| f.parse::<f64>().ok());
    // utime and stime are fields 14 and 15 of the line, 12 and 13 after the name; the kernel's clock ticks 100 times a second.
    Some((ticks(11)? + ticks(12)?) / 100.0)
}

/// A line of /proc/self/status in bytes, for example `VmHWM`.
pub(crate) fn status_bytes(key: &str) -> Option<f64> {
    let status = fs::read_to_string("/proc/self/status").ok()?;
    let line = status.lines().find(|l| l.starts_with(key))?;
    line.split_whitespace().nth(1)?.parse::<f64>().ok().map(|kib| kib * 1024.0)
}

/// Prints what the figures were measured on.
pub(crate) fn describe() {
    let model = fs::read_to_string("/proc/cpuinfo").unwrap_or_default();
    let model = model
        .lines()
        .find_map(|l| l.strip_prefix("model name"))
        .map_or("processor unknown", |m| m.trim_start_matches([' ', '\t', ':']));
    let cores = std::thread::available_parallelism().map_or(1, std::num::NonZero::get);
    let caches: Vec<String> =
        caches().iter().map(|(name, bytes)| format!("{name} {:.3} MiB", count(*bytes) / 1048576.0)).collect();
    let load = fs::read_to_string("/proc/loadavg").unwrap_or_default();
    println!("{model}, {cores} cores, {}", caches.join(", "));
    println!("load before the run (should be near 0): {}", load.split_whitespace().next().unwrap_or("unknown"));
}
