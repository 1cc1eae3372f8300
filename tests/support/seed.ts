/** Fresh problems on every run; a failure names the seed, and EVENSWING_SEED brings it back. */
export const SEED = Number(process.env.EVENSWING_SEED ?? Date.now() % 1_000_000);
