/**
 * How fast valuations are sealed, a chain is verified and an export is written, on this machine:
 *
 *   DATABASE_URL=… DATABASE_OWNER_URL=… npx tsx tests/bench/chain.ts [values]
 *
 * on a cluster for tests; the bench makes a database of its own there and removes it.
 */
import {
  createEmptyDatabase,
  dropDatabase,
  removeFolder,
  testEnvironment,
} from '../server/support/environment';
import { randomUUID } from 'node:crypto';
import { monitorEventLoopDelay, performance } from 'node:perf_hooks';
import { chainOf } from '@/server/chain/append';
import { verifyChain } from '@/server/chain/verify';
import { sequelize } from '@/server/database';
import { migrate } from '@/server/migrate';
import type { Desk } from '@/server/models/desk';
import { HistoryExport } from '@/server/models/history-export';
import type { Underlying } from '@/server/models/underlying';
import { closeExportThreads, makeExportFile } from '@/server/services/export-file';
import { listHistory } from '@/server/services/history';
import { exportFormats } from '@/shared/contracts/exports';
import { makeUnderlying } from '../factories/market';
import { makeDesk, makeUser } from '../factories/people';
import { storeValuations, valuationPair } from '../factories/valuations';

const say = (line: string) => process.stdout.write(`${line}\n`);

/** As many trades in a chunk of a run. */
const chunkSize = 250;

async function seconds(work: () => Promise<unknown>): Promise<number> {
  const began = performance.now();
  await work();
  return (performance.now() - began) / 1000;
}

const perSecond = (count: number, taken: number) =>
  `${Math.round(count / taken)} a second (${count} in ${taken.toFixed(2)} s)`;

async function seal(desk: Desk, underlying: Underlying, values: number) {
  const [primary, check] = valuationPair(underlying);
  for (let from = 0; from < values; from += chunkSize) {
    const day = new Date(Date.UTC(2026, 0, 1) + Math.floor(from / chunkSize) * 86_400_000);
    const shared = { runId: randomUUID(), valuedAt: day.toISOString() };
    const chunk = Array.from({ length: Math.min(chunkSize, values - from) }, (_, index) => {
      const own = { tradeVersionId: randomUUID(), tradeNumber: `T-${index}` };
      return [
        { ...primary, ...shared, ...own },
        { ...check, ...shared, ...own },
      ];
    });
    await storeValuations(desk, chunk.flat());
  }
}

const nothing = async () => undefined;

async function measureExports(desk: Desk, values: number) {
  const { id: createdById } = await makeUser();
  for (const format of exportFormats) {
    const row = HistoryExport.build({
      deskId: desk.id,
      format,
      filter: {},
      upToPosition: String(2 * values),
      total: values,
      createdById,
    });
    const delay = monitorEventLoopDelay({ resolution: 5 });
    delay.enable();
    let bytes = 0;
    const taken = await seconds(async () => {
      bytes = (await makeExportFile(desk, row, [], nothing)).bytes.length;
    });
    delay.disable();
    const held = Math.round(delay.percentile(99) / 1e6);
    say(
      `export as ${format}: ${perSecond(values, taken)}, ${Math.round(bytes / 1024)} KiB, event loop held up at most ${held} ms at p99`,
    );
  }
}

async function measurePages(desk: Desk) {
  for (const filter of [{}, { trade: 'T-7' }, { verdict: 'disagree' as const }]) {
    const taken: number[] = [];
    for (let time = 0; time < 20; time += 1)
      taken.push(1000 * (await seconds(() => listHistory(desk, { ...filter, limit: 100 }))));
    taken.sort((a, b) => a - b);
    say(`a page of 100, ${JSON.stringify(filter)}: p95 ${taken[18].toFixed(1)} ms`);
  }
}

async function main() {
  const values = Number(process.argv[2] ?? 10_000);
  await createEmptyDatabase();
  await migrate(testEnvironment.DATABASE_OWNER_URL, testEnvironment.DATABASE_URL);
  try {
    const desk = await makeDesk();
    const underlying = await makeUnderlying(desk);
    const sealed = await seconds(() => seal(desk, underlying, values));
    say(`append: ${perSecond(2 * values, sealed)}`);
    const verified = await seconds(() =>
      verifyChain(chainOf('valuations', desk.id), null, nothing),
    );
    say(`verify: ${perSecond(2 * values, verified)}`);
    await measurePages(desk);
    await measureExports(desk, values);
  } finally {
    await closeExportThreads();
    await sequelize.close();
    await dropDatabase();
    removeFolder();
  }
}

void main();
