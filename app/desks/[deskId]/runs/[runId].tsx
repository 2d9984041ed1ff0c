import { useLocalSearchParams, useRouter } from 'expo-router';
import { useCallback, useMemo } from 'react';
import { RunScreen, type RunView } from '@/components/runs/run-screen';
import { Permitted } from '@/components/shell/permitted';
import { useDesk } from '@/hooks/use-desk';
import { useSession } from '@/hooks/use-session';
import { verdicts } from '@/pricing/contract';
import { exceptionKinds, exceptionStates } from '@/shared/contracts/runs';

type Params = Partial<Record<'exception' | 'answers' | 'kind' | 'verdict' | 'book', string>> & {
  runId: string;
};

/** What of the run is in sight stands in the address: a link opens the same view. */
export default function RunRoute() {
  const desk = useDesk();
  const router = useRouter();
  const { me } = useSession();
  const { runId, exception, answers, kind, verdict, book } = useLocalSearchParams<Params>();
  const view = useMemo(
    (): RunView => ({
      exceptionId: exception || null,
      exceptions: {
        state: exceptionStates.find((one) => one === answers) ?? null,
        kind: exceptionKinds.find((one) => one === kind) ?? null,
      },
      values: { verdict: verdicts.find((one) => one === verdict) ?? null, bookId: book || null },
    }),
    [exception, answers, kind, verdict, book],
  );
  const onView = useCallback(
    ({ exceptionId, exceptions, values }: RunView) =>
      router.setParams({
        exception: exceptionId ?? undefined,
        answers: exceptions.state ?? undefined,
        kind: exceptions.kind ?? undefined,
        verdict: values.verdict ?? undefined,
        book: values.bookId ?? undefined,
      }),
    [router],
  );
  if (!me) return null;
  return (
    <Permitted permission="read-desk">
      <RunScreen
        key={runId}
        desk={desk}
        userId={me.user.id}
        runId={runId}
        view={view}
        onView={onView}
        onRerun={(id) => router.push(`/desks/${desk.id}/runs/${id}`)}
      />
    </Permitted>
  );
}
