/** The forms as their screens use them: fetched when the first of them is opened. */
import { lazy, Suspense, type ComponentType, type ReactNode } from 'react';
import { SkeletonRows } from '@/components/ui/states';

const loadParts = () => import('./form-parts');
type Parts = Awaited<ReturnType<typeof loadParts>>;

function lazily<Props extends object>(
  pick: (parts: Parts) => ComponentType<Props>,
  placeholder: ReactNode,
): ComponentType<Props> {
  const Part: ComponentType<Props> = lazy(async () => ({ default: pick(await loadParts()) }));
  return function Lazily(props: Props) {
    return (
      <Suspense fallback={placeholder}>
        <Part {...props} />
      </Suspense>
    );
  };
}

const page = <SkeletonRows rows={6} height={60} />;

export const AmendScreen = lazily((parts) => parts.AmendScreen, page);
export const MarketEditor = lazily((parts) => parts.MarketEditor, page);
export const PolicyFormScreen = lazily((parts) => parts.PolicyFormScreen, page);
export const ProposeScreen = lazily((parts) => parts.ProposeScreen, page);

export const OpenBookDialog = lazily((parts) => parts.OpenBookDialog, null);
export const PermissionDialog = lazily((parts) => parts.PermissionDialog, null);
export const ReasonDialog = lazily((parts) => parts.ReasonDialog, null);
export const RestateDialog = lazily((parts) => parts.RestateDialog, null);
export const RoleDialog = lazily((parts) => parts.RoleDialog, null);
export const TradeActDialog = lazily((parts) => parts.TradeActDialog, null);
