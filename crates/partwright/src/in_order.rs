//! Work on many sheets at once, its results taken in the order of the sheets.
//!
//! Threads of the standard library do: what a pool would save is small beside a sheet, and the
//! results must be handed over one by one, in order and while the rest is still being worked on.

use std::collections::BTreeMap;
use std::panic::{AssertUnwindSafe, catch_unwind};
use std::sync::mpsc::{self, Receiver};
use std::sync::{Condvar, Mutex, MutexGuard, PoisonError};
use std::thread;

/// Results that may wait for an earlier one: work ahead of this stands still, so that the results
/// of a large folder need not all be in memory.
const AHEAD: usize = 64;

/// How far the work has come.
#[derive(Default)]
struct Pace {
    /// The next job nobody has begun.
    next: usize,
    /// Jobs whose results were taken.
    taken: usize,
}

/// Does the jobs, several at a time, and hands over their results in order, each with its place.
/// `None` stands for a job whose work broke off.
pub(crate) fn in_order<J: Sync, R: Send>(
    jobs: &[J],
    work: impl Fn(&J) -> R + Sync,
    mut take: impl FnMut(usize, Option<R>),
) {
    let threads = thread::available_parallelism().map_or(1, Into::into);
    let threads = threads.min(jobs.len());
    let guarded = |job: &J| catch_unwind(AssertUnwindSafe(|| work(job))).ok();
    if threads <= 1 {
        for (place, job) in jobs.iter().enumerate() {
            take(place, guarded(job));
        }
        return;
    }
    let pace = Mutex::new(Pace::default());
    let room = Condvar::new();
    thread::scope(|scope| {
        let (results, arriving) = mpsc::channel();
        for _ in 0..threads {
            let results = results.clone();
            scope.spawn(|| {
                let results = results;
                while let Some((place, job)) = next(&pace, &room, jobs) {
                    if results.send((place, guarded(job))).is_err() {
                        break;
                    }
                }
            });
        }
        drop(results);
        let mut waiting = BTreeMap::new();
        for place in 0..jobs.len() {
            let Some(result) = await_result(&arriving, &mut waiting, place) else {
                break;
            };
            take(place, result);
            lock(&pace).taken = place + 1;
            room.notify_all();
        }
    });
}

/// The next job, once it is not too far ahead.
fn next<'a, J>(pace: &Mutex<Pace>, room: &Condvar, jobs: &'a [J]) -> Option<(usize, &'a J)> {
    let mut pace = lock(pace);
    while pace.next < jobs.len() && pace.next >= pace.taken + AHEAD {
        pace = room.wait(pace).unwrap_or_else(PoisonError::into_inner);
    }
    let place = pace.next;
    pace.next += 1;
    jobs.get(place).map(|job| (place, job))
}

fn await_result<R>(
    arriving: &Receiver<(usize, R)>,
    waiting: &mut BTreeMap<usize, R>,
    place: usize,
) -> Option<R> {
    loop {
        if let Some(result) = waiting.remove(&place) {
            return Some(result);
        }
        let (other, result) = arriving.recv().ok()?;
        waiting.insert(other, result);
    }
}

fn lock(pace: &Mutex<Pace>) -> MutexGuard<'_, Pace> {
    pace.lock().unwrap_or_else(PoisonError::into_inner)
}

#[cfg(test)]
mod tests {
    use super::*;
    use std::time::Duration;

    #[test]
    fn results_come_in_order_whatever_takes_long() {
        let jobs: Vec<u64> = (0..300).collect();
        let mut taken = Vec::new();
        let slow = |job: &u64| {
            // The first of every ten is the slowest.
            thread::sleep(Duration::from_micros(if job.is_multiple_of(10) {
                2000
            } else {
                10
            }));
            job * 2
        };
        in_order(&jobs, slow, |place, result| taken.push((place, result)));
        let expected: Vec<_> = (0..300).map(|job| (job as usize, Some(job * 2))).collect();
        assert_eq!(taken, expected);
    }

    #[test]
    fn work_that_breaks_off_spoils_its_own_job_only() {
        let jobs: Vec<usize> = (0..200).collect();
        let mut lost = Vec::new();
        let work = |job: &usize| {
            if *job == 77 {
                // As a panic does, without its words.
                std::panic::resume_unwind(Box::new(()));
            }
        };
        in_order(&jobs, work, |place, result| {
            if result.is_none() {
                lost.push(place);
            }
        });
        assert_eq!(lost, [77]);
    }
}
