/** The form of a close: kept while it is typed, checked as the server checks it, sent once. */
import { useEffect, useState } from 'react';
import { useForm, useWatch, type Resolver } from 'react-hook-form';
import { marketEditorText } from '@/constants/texts/market-data';
import { ApiError } from '@/shared/api-client';
import type { Snapshot, SnapshotDraft } from '@/shared/contracts/market-data';
import type { DeskAccess } from '@/shared/contracts/sessions';
import { dateInZone, isCalendarDate } from '@/shared/dates';
import { marketWarnings, warningKey } from '@/shared/market-warnings';
import { forgetForm, keepForm, keyForContent, readKeptForm } from '@/hooks/kept-form';
import { storeKey } from '@/hooks/local-store';
import { usePreviousClose, useSendSnapshot } from '@/hooks/use-market-data';
import {
  fieldOfIssue,
  gridDefaults,
  readGrid,
  type GridUnderlying,
  type GridValues,
} from './market-form';

export type EditorProps = {
  desk: DeskAccess;
  userId: string;
  underlyings: readonly GridUnderlying[];
  /** The draft that is changed; null for a new one. */
  draft: Snapshot | null;
  onSaved: (id: string) => void;
};

const resolverFor =
  (underlyings: readonly GridUnderlying[]): Resolver<GridValues> =>
  (values) => {
    const { errors } = readGrid(values, underlyings);
    const entries = Object.entries(errors);
    if (entries.length === 0) return { values, errors: {} };
    const named = entries.map(([name, message]) => [name, { type: 'custom', message }]);
    return { values: {}, errors: Object.fromEntries(named) };
  };

function useKeptGrid({ desk, userId, underlyings, draft }: EditorProps) {
  const keptAs = storeKey(`close.${draft?.id ?? 'new'}`, userId, desk.id);
  const [today] = useState(() => dateInZone(Date.now(), desk.timeZone));
  const date = draft?.date ?? today;
  const defaults = gridDefaults(date, underlyings, draft?.quotes ?? []);
  const form = useForm<GridValues>({
    resolver: resolverFor(underlyings),
    defaultValues: readKeptForm(keptAs, defaults),
  });
  const { subscribe } = form;
  useEffect(
    () =>
      subscribe({
        formState: { values: true },
        callback: ({ values }) => keepForm(keptAs, values),
      }),
    [subscribe, keptAs],
  );
  const discard = () => {
    form.reset(defaults);
    forgetForm(keptAs);
  };
  return { form, keptAs, discard };
}

/** What is unlikely about the numbers as they are typed, and whether a person has looked at it. */
function useWarnings({ desk, underlyings }: EditorProps, values: GridValues) {
  const [confirmedKeys, setConfirmedKeys] = useState<readonly string[]>([]);
  const date = values.date.trim();
  const { data: previous } = usePreviousClose(desk.id, isCalendarDate(date) ? date : null);
  const before = new Map(previous?.quotes.map((quote) => [quote.underlyingId, quote.market]));
  const warnings = marketWarnings(readGrid(values, underlyings).quotes, before);
  const keys = warnings.map(warningKey);
  return {
    before,
    warnings,
    keys,
    confirmed: keys.every((key) => confirmedKeys.includes(key)),
    onConfirm: (confirmed: boolean) => setConfirmedKeys(confirmed ? keys : []),
  };
}

export function useMarketEditor(props: EditorProps) {
  const { desk, underlyings, draft, onSaved } = props;
  const { form, keptAs, discard } = useKeptGrid(props);
  const values = useWatch({ control: form.control, compute: (typed) => typed });
  const warnings = useWarnings(props, values);
  const { mutateAsync, isPending } = useSendSnapshot(desk.id, draft);
  const [failure, setFailure] = useState<string | null>(null);

  function complain({ code, issues, message }: ApiError, body: SnapshotDraft) {
    if (code === 'stale-version') return setFailure(marketEditorText.stale);
    const others = issues.filter((issue) => {
      const field = fieldOfIssue(issue, body);
      if (field !== null)
        form.setError(
          field,
          { type: 'server', message: issue.message },
          { shouldFocus: issue === issues[0] },
        );
      return field === null;
    });
    if (others.length > 0) setFailure(others[0].message);
    else setFailure(issues.length > 0 ? marketEditorText.correct : message);
  }

  async function send(read: GridValues) {
    const quotes = readGrid(read, underlyings).quotes.map(({ underlyingId, market }) => ({
      underlyingId,
      market,
    }));
    if (quotes.length === 0) return setFailure(marketEditorText.nothingFilled);
    if (!warnings.confirmed) return setFailure(marketEditorText.confirmFirst);
    const body: SnapshotDraft = {
      date: read.date.trim(),
      source: read.source === 'file' ? 'file' : 'typed',
      quotes,
      confirmedWarnings: warnings.keys,
    };
    try {
      const { id } = await mutateAsync({ body, idempotencyKey: keyForContent(keptAs, body) });
      forgetForm(keptAs);
      onSaved(id);
    } catch (error) {
      if (!(error instanceof ApiError)) throw error;
      complain(error, body);
    }
  }

  /** Numbers from elsewhere; cells that they do not name stay as they are. */
  function fill(cells: GridValues, source: 'typed' | 'file') {
    const next = { ...form.getValues(), ...cells, source };
    form.reset(next, { keepDefaultValues: true });
    keepForm(keptAs, next);
  }

  const onSubmit = form.handleSubmit(
    (read) => {
      setFailure(null);
      return send(read);
    },
    () => setFailure(marketEditorText.correct),
  );
  return { form, values, warnings, failure, busy: isPending, onSubmit, fill, discard };
}
