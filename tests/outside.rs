//! Truth outside ourselves: the checker held to treatises, chorales and judged passages.
//!
//! The data stands in a folder of its own beside the repository (or where `PARTWRIGHT_SHARED`
//! points) and is no part of it; where it is absent these tests say so and are left out.

#![allow(clippy::unwrap_used, clippy::panic, clippy::print_stdout)]

#[path = "outside/beats.rs"]
mod beats;
#[path = "outside/consecutives.rs"]
mod consecutives;
#[path = "outside/figured.rs"]
mod figured;
#[path = "outside/figures.rs"]
mod figures;
#[path = "outside/harmony.rs"]
mod harmony;
#[path = "outside/hurts.rs"]
mod hurts;
#[path = "outside/invariance.rs"]
mod invariance;
#[path = "outside/judged.rs"]
mod judged;
#[path = "outside/moves.rs"]
mod moves;
#[path = "outside/rewrite.rs"]
mod rewrite;
#[path = "outside/scores.rs"]
mod scores;
#[path = "outside/stated.rs"]
mod stated;
#[path = "outside/table.rs"]
mod table;
#[path = "outside/treatise.rs"]
mod treatise;
