/** A study of a trade prices it as a valuation run on the same close does. */
import { call, withServer } from './support/server';
import { randomUUID } from 'node:crypto';
import type { Desk } from '@/server/models/desk';
import type { Underlying } from '@/server/models/underlying';
import {
  createStudy,
  listStudies,
  type Study as StudyOnTheWire,
  type StudyDraft,
} from '@/shared/contracts/studies';
import { makeApprovedClose, makeUnderlying } from '../factories/market';
import { makeDesk, makeMember, makeUser, type TestMember } from '../factories/people';
import { makeBook, makeTrade } from '../factories/trades';

withServer();

let desk: Desk;
let underlying: Underlying;
let analyst: TestMember;

beforeAll(async () => {
  desk = await makeDesk();
  underlying = await makeUnderlying(desk);
  analyst = await makeMember(desk, 'analyst');
});

describe('a study of a trade', () => {
  const ladders: StudyDraft['ladders'] = [{ name: 'lattice-crr', rows: 3 }];
  const of = (tradeId: string, snapshotId: string | null = null): StudyDraft => ({
    source: { kind: 'trade', tradeId, snapshotId },
    ladders,
  });

  it('prices it as a run on that close would, and is found by it', async () => {
    const here = await makeDesk();
    const wheat = await makeUnderlying(here);
    const { token } = await makeMember(here, 'risk-officer');
    const earlier = await makeApprovedClose(here, wheat, '2026-11-27');
    await makeApprovedClose(here, wheat, '2026-11-30');
    const trade = await makeTrade(await makeBook(here), wheat, await makeUser());
    const params = { deskId: here.id };
    const studyOf = async (body: StudyDraft) =>
      (await call(createStudy, { params, body, token })).body as StudyOnTheWire;
    const study = await studyOf(of(trade.id, earlier.id));
    expect(study).toMatchObject({
      source: 'trade',
      trade: { id: trade.id, number: trade.number },
      quote: null,
      exercise: 'american',
      // The desk's cut-off of that day: common practice, no source.
      pricedAt: '2026-11-27T16:30:00.000Z',
    });
    expect((await studyOf(of(trade.id))).pricedAt).toBe('2026-11-30T16:30:00.000Z');
    const query = { tradeId: trade.id };
    const { body } = await call(listStudies, { params, query, token });
    expect(body.items).toHaveLength(2);
  });

  it('is refused where there is no such trade, close or market', async () => {
    const trade = await makeTrade(await makeBook(desk), underlying, await makeUser());
    const elsewhere = await makeDesk();
    const foreign = await makeTrade(
      await makeBook(elsewhere),
      await makeUnderlying(elsewhere),
      await makeUser(),
    );
    const other = await makeApprovedClose(desk, await makeUnderlying(desk), '2026-11-26');
    const issueOf = async (body: StudyDraft) => {
      const sent = call(createStudy, { params: { deskId: desk.id }, body, token: analyst.token });
      return ((await sent).body.issues as { path: string; code: string }[]).map(
        ({ path, code }) => `${path} ${code}`,
      );
    };
    expect(await issueOf(of(foreign.id))).toEqual(['source.tradeId unknown-trade']);
    expect(await issueOf(of(trade.id, randomUUID()))).toEqual(['source.snapshotId not-approved']);
    expect(await issueOf(of(trade.id, other.id))).toEqual(['source.snapshotId incomplete-close']);
  });
});
