/** A run as its readers meet it: what needs somebody first, then every value, then the sign-off. */
import { QueryClient, QueryClientProvider } from '@tanstack/react-query';
import { render, screen, waitFor, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { RunScreen, type RunView } from '@/components/runs/run-screen';
import type { ExceptionalValuation, Run } from '@/shared/contracts/runs';
import { playDialogs, playWindow } from '../browser';
import { saying } from '../saying';
import { ada, ben, cleo, deskOf, playServer, problem } from '../trades/play-trades';
import {
  agreeing,
  disagreeing,
  finishedRun,
  page,
  runId,
  runningRun,
  withoutValue,
} from './play-runs';

jest.setTimeout(60_000);

jest.mock('expo-router', () => ({ useRouter: () => ({ push: jest.fn(), replace: jest.fn() }) }));

const plainView: RunView = {
  exceptionId: null,
  exceptions: { state: null, kind: null },
  values: { verdict: null, bookId: null },
};

type Served = { run: Run; exceptions: readonly ExceptionalValuation[] };

/** A server of one run; what is sent may change it. */
function serve(
  first: Partial<Served> = {},
  answer: (served: Served) => ReturnType<typeof problem> | 'away' = () =>
    problem(405, 'method-not-allowed'),
) {
  const served: Served = {
    run: finishedRun,
    exceptions: [disagreeing, withoutValue],
    ...first,
  };
  const sent = playServer(
    () => ({
      [`/runs/${runId}`]: served.run,
      '/exceptions': page(served.exceptions),
      '/valuations': page([...served.exceptions, agreeing]),
      '/studies': page([]),
    }),
    () => answer(served),
  );
  return { served, sent };
}

type Opening = { role?: 'analyst' | 'risk-officer' | 'auditor'; userId?: string; view?: object };

function open({ role = 'risk-officer', userId = cleo.id, view = {} }: Opening = {}) {
  const onView = jest.fn();
  const onRerun = jest.fn();
  const { unmount } = render(
    <QueryClientProvider client={new QueryClient()}>
      <RunScreen
        desk={deskOf(role)}
        userId={userId}
        runId={runId}
        view={{ ...plainView, ...view }}
        onView={onView}
        onRerun={onRerun}
      />
    </QueryClientProvider>,
  );
  return { onView, onRerun, unmount };
}

beforeEach(() => {
  playWindow({ wide: true });
  playDialogs();
  localStorage.clear();
});

const cardOf = async (trade: string) => {
  const list = await screen.findByRole('list', { name: /^Exceptions/ });
  const card = within(list)
    .getAllByRole('listitem')
    .find((item) => within(item).queryByText(trade));
  if (!card) throw new Error(`No exception of ${trade} is in sight.`);
  return within(card);
};

describe('a finished run', () => {
  it('says in one sentence what was found and how many need an answer', async () => {
    serve();
    open();
    expect(
      await screen.findByRole('heading', {
        level: 1,
        name: '2 of 4 values agree; 2 need an answer',
      }),
    ).toBeTruthy();
    expect(screen.getByText('close of 2026-11-30').getAttribute('href')).toMatch(/market-data\/4+/);
    expect(screen.getByText(saying(/started by Ada, 2026-12-01 08:00/))).toBeTruthy();
    expect(screen.getByText(/1 left out/)).toBeTruthy();
  });

  it('tells of each exception its cause and what it means in money', async () => {
    serve();
    open();
    const first = await cardOf('T-0001');
    expect(
      first.getByText(/^Routes differ by 0\.0100, more than the tolerance 0\.0010/),
    ).toBeTruthy();
    expect(first.getByText('5.00 EUR apart on the position')).toBeTruthy();
    const second = await cardOf('T-0002');
    expect(second.getByText('Heat grid gave no value. Give more steps.')).toBeTruthy();
    expect(second.getByText(/How much it matters is not known/)).toBeTruthy();
  });

  it('opens one to both routes with their estimates, and keeps that in the address', async () => {
    serve();
    const { onView } = open({ view: { exceptionId: disagreeing.exception.id } });
    const table = await screen.findByRole('table', { name: 'Routes of T-0001' });
    expect(within(table).getByText('13.2343')).toBeTruthy();
    expect(within(table).getByText('13.2443')).toBeTruthy();
    const other = await cardOf('T-0002');
    await userEvent.click(other.getByRole('button', { name: 'Show why' }));
    expect(onView).toHaveBeenCalledWith({ ...plainView, exceptionId: withoutValue.exception.id });
  });

  it('lists every value with its verdict, and hands filters on', async () => {
    serve();
    const { onView } = open();
    const table = await screen.findByRole('table', { name: /^Values of the run/ });
    const row = within(table).getByText('T-0003').closest('tr');
    if (!row) throw new Error('The trade stands in no row.');
    expect(within(row).getByText('agree')).toBeTruthy();
    expect(within(row).getByText('+0.1160')).toBeTruthy();
    expect(
      within(row).getByRole('link', { name: '13.2343: value of T-0003 with its inputs' }),
    ).toBeTruthy();
    await userEvent.selectOptions(screen.getByRole('combobox', { name: 'Verdict' }), 'disagree');
    const values = { verdict: 'disagree', bookId: null };
    expect(onView).toHaveBeenCalledWith({ ...plainView, values });
  });

  it('shows cards on a phone', async () => {
    playWindow({ wide: false });
    serve();
    open();
    const list = await screen.findByRole('list', { name: /^Values of the run/ });
    expect(within(list).getAllByRole('listitem')).toHaveLength(3);
    expect(screen.queryByRole('table', { name: /^Values of the run/ })).toBeNull();
  });
});

describe('a run that is being worked off', () => {
  it('shows how far it is, and can be cancelled after a word of warning', async () => {
    const { sent } = serve({ run: runningRun, exceptions: [] }, (served) => {
      served.run = {
        ...runningRun,
        status: 'cancelled',
        cancellation: { by: cleo, at: '2026-12-01T07:00:05.000Z' },
      };
      return { status: 200, body: served.run };
    });
    open();
    const bar = await screen.findByRole('progressbar', { name: '1 of 4 trades valued' });
    expect(bar.getAttribute('aria-valuenow')).toBe('1');
    await userEvent.click(screen.getByRole('button', { name: 'Cancel the run' }));
    const dialog = screen.getByRole('dialog', { name: 'Cancel run R-0007' });
    expect(sent).toEqual([]);
    await userEvent.click(within(dialog).getByRole('button', { name: 'Cancel the run' }));
    expect(await screen.findByText(/^Cancelled by Cleo/)).toBeTruthy();
    expect(sent.map(({ path }) => path)).toEqual([`runs/${runId}/cancel`]);
  });

  it('follows the run until it has ended', async () => {
    const { served } = serve({ run: runningRun, exceptions: [] });
    open();
    await screen.findByRole('progressbar');
    served.run = finishedRun;
    served.exceptions = [disagreeing, withoutValue];
    expect(await cardOf('T-0001')).toBeTruthy();
    expect(screen.queryByRole('progressbar')).toBeNull();
  });
});

describe('an answer', () => {
  const answered: ExceptionalValuation = {
    ...disagreeing,
    exception: {
      ...disagreeing.exception,
      state: 'answered',
      answer: {
        kind: 'override',
        by: cleo,
        at: '2026-12-01T08:00:00.000Z',
        value: '13.24',
        reason: 'Two dealers confirmed it.',
      },
    },
  };

  it('by a note reads the value and wants a reason, then stands on the card', async () => {
    const { sent } = serve({}, (served) => {
      served.exceptions = [answered, withoutValue];
      served.run = { ...finishedRun, openExceptions: 1, makerIds: [ada.id, cleo.id] };
      return { status: 200, body: answered };
    });
    open();
    const card = await cardOf('T-0001');
    await userEvent.click(card.getByRole('button', { name: 'Write a note' }));
    const dialog = within(screen.getByRole('dialog', { name: 'Note on T-0001' }));
    await userEvent.type(dialog.getByRole('textbox', { name: 'Value to use instead' }), '13.24');
    await userEvent.click(dialog.getByRole('button', { name: 'Write a note' }));
    expect(dialog.getByText(/at least 8 characters/)).toBeTruthy();
    expect(
      dialog.getByText(/^13\.24 stands beside the model’s value of T-0001, 13\.2343/),
    ).toBeTruthy();
    expect(dialog.getByText(/cannot sign this run off afterwards/)).toBeTruthy();
    expect(sent).toEqual([]);
    const reason = 'Two dealers confirmed it.';
    await userEvent.type(dialog.getByRole('textbox', { name: 'Reason' }), reason);
    await userEvent.click(dialog.getByRole('button', { name: 'Write a note' }));
    expect(await screen.findByText('Answered by a note')).toBeTruthy();
    expect(screen.getByText('13.24 beside the model’s 13.2343')).toBeTruthy();
    expect(sent).toMatchObject([{ body: { value: '13.24', reason } }]);
    expect(sent[0].path).toMatch(/exceptions\/a+-.*\/override$/);
  });

  it('by a note is kept over a reload until it is on record', async () => {
    serve();
    const { unmount } = open();
    const noteOf = async (trade: string) => {
      const card = await cardOf(trade);
      await userEvent.click(card.getByRole('button', { name: 'Write a note' }));
      const dialog = within(screen.getByRole('dialog', { name: `Note on ${trade}` }));
      return dialog.getByRole('textbox', { name: 'Reason' });
    };
    await userEvent.type(await noteOf('T-0001'), 'Two dealers');
    unmount();
    open();
    expect(await noteOf('T-0001')).toHaveProperty('value', 'Two dealers');
    expect(await noteOf('T-0002')).toHaveProperty('value', '');
  });

  it('by a note is refused to whoever had a hand in it, with why', async () => {
    serve();
    open({ role: 'analyst', userId: ben.id });
    const own = await cardOf('T-0002');
    expect(own.queryByRole('button', { name: 'Write a note' })).toBeNull();
    expect(own.getByText(/^You proposed, amended or approved this trade/)).toBeTruthy();
    const other = await cardOf('T-0001');
    expect(other.getByRole('button', { name: 'Write a note' })).toBeTruthy();
  });

  it('by a study says what to do where there is none yet', async () => {
    serve();
    open();
    const card = await cardOf('T-0001');
    await userEvent.click(card.getByRole('button', { name: 'Answer by a study' }));
    const dialog = within(await screen.findByRole('dialog', { name: /T-0001/ }));
    expect(await dialog.findByText(/^No study of these terms is finished yet/)).toBeTruthy();
    expect(dialog.getByRole('link', { name: 'Start a study' })).toBeTruthy();
  });

  it('by a new run sends it once and leads there', async () => {
    const rerun = { ...runningRun, id: '99999999-9999-4999-8999-999999999902', number: 'R-0008' };
    const { sent } = serve({}, () => ({ status: 201, body: rerun }));
    const { onRerun } = open();
    const card = await cardOf('T-0001');
    await userEvent.click(card.getByRole('button', { name: 'Run again' }));
    const dialog = within(screen.getByRole('dialog', { name: 'Run R-0007 again' }));
    await userEvent.click(dialog.getByRole('button', { name: 'Run again' }));
    await waitFor(() => expect(onRerun).toHaveBeenCalledWith(rerun.id));
    expect(sent).toHaveLength(1);
    expect(sent[0].key).toMatch(/^[0-9a-f-]{36}$/);
  });

  it('is not offered to those who only read', async () => {
    serve();
    open({ role: 'auditor' });
    const card = await cardOf('T-0001');
    expect(card.queryByRole('button', { name: 'Run again' })).toBeNull();
    expect(card.getByText(/^It is answered by a convergence study/)).toBeTruthy();
  });
});

describe('the sign-off', () => {
  const clean: Run = { ...finishedRun, openExceptions: 0 };

  it.each([
    ['exceptions are open', finishedRun, cleo.id, /opens when the 2 exceptions are answered/],
    ['one started the run', clean, ada.id, /^You started this run/],
    ['one touched a trade', { ...clean, makerIds: [cleo.id] }, cleo.id, /^You touched one of/],
  ])('is closed while %s, and says so', async (_, run, userId, sentence) => {
    serve({ run });
    open({ userId });
    expect(await screen.findByText(sentence)).toBeTruthy();
    expect(screen.queryByRole('button', { name: 'Sign off' })).toBeNull();
  });

  it('says to others who signs off', async () => {
    serve({ run: clean });
    open({ role: 'analyst', userId: ben.id });
    expect(await screen.findByText(/^A risk officer signs it off/)).toBeTruthy();
  });

  it('wants a comment, sends the version that was read, and then stands there', async () => {
    const comment = 'All were looked into.';
    const { sent } = serve({ run: clean }, (served) => {
      const signOff = { by: cleo, at: '2026-12-01T09:00:00.000Z', comment };
      served.run = { ...clean, status: 'signed-off', signOff };
      return { status: 200, body: served.run };
    });
    open();
    await userEvent.click(await screen.findByRole('button', { name: 'Sign off' }));
    const dialog = within(screen.getByRole('dialog', { name: 'Sign off run R-0007' }));
    await userEvent.click(dialog.getByRole('button', { name: 'Sign off' }));
    expect(dialog.getByText(/at least 8 characters/)).toBeTruthy();
    await userEvent.type(dialog.getByRole('textbox', { name: 'Comment' }), comment);
    await userEvent.click(dialog.getByRole('button', { name: 'Sign off' }));
    expect(await screen.findByText(saying(/^Signed off by Cleo, 2026-12-01 10:00$/))).toBeTruthy();
    expect(sent).toMatchObject([{ body: { version: 12, comment } }]);
  });

  it('names what somebody quicker has done, and keeps the comment, also over a reload', async () => {
    const message = 'Someone was first: run R-0007 was signed off.';
    serve({ run: clean }, () =>
      problem(409, 'wrong-state', [{ path: '', code: 'wrong-state', message }]),
    );
    const { unmount } = open();
    await userEvent.click(await screen.findByRole('button', { name: 'Sign off' }));
    const dialog = within(screen.getByRole('dialog', { name: 'Sign off run R-0007' }));
    const field = dialog.getByRole('textbox', { name: 'Comment' });
    await userEvent.type(field, 'All were looked into.');
    await userEvent.click(dialog.getByRole('button', { name: 'Sign off' }));
    expect(await dialog.findByText(message)).toBeTruthy();
    expect(field).toHaveProperty('value', 'All were looked into.');
    unmount();
    open();
    await userEvent.click(await screen.findByRole('button', { name: 'Sign off' }));
    expect(screen.getByRole('textbox', { name: 'Comment' })).toHaveProperty(
      'value',
      'All were looked into.',
    );
  });
});
