import type pg from 'pg';

const hourMs = 3_600_000;

/**
 * Removes counts whose minute is over, now and hourly: one row stays for each address and person who ever asked.
 * Answers what ends it.
 */
export function pruneRateLimits(pool: pg.Pool, onError: (error: unknown) => void): () => void {
  const prune = async (): Promise<void> => {
    try {
      await pool.query('delete from rate_limits where expire < $1', [Date.now()]);
    } catch (error) {
      onError(error);
    }
  };
  void prune();
  const timer = setInterval(() => void prune(), hourMs).unref();
  return () => clearInterval(timer);
}
