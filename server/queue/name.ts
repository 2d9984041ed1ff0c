/** How a worker's connections are known to the database, and so to health. */
export const workerName = 'driftless-worker';
