/** Threads for what would hold the event loop up. */
import path from 'node:path';
import { Piscina } from 'piscina';

const sourceExtension = path.extname(__filename);

/**
 * A pool that runs a function of a file in `threads/`; a task may name another function of that
 * file. Both in the source tree and in the built server that folder lies beside this file; from
 * source, a thread compiles as it loads.
 */
export const threadPool = (file: string, functionName: string, maxThreads: number) =>
  new Piscina({
    filename: path.join(__dirname, 'threads', `${file}${sourceExtension}`),
    name: functionName,
    execArgv: sourceExtension === '.ts' ? ['--require', 'tsx/cjs'] : [],
    minThreads: 0,
    maxThreads,
    idleTimeout: 60_000,
  });
