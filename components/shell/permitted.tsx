import type { ReactNode } from 'react';
import { Button } from '@/components/ui/button';
import { Screen } from '@/components/ui/screen';
import { EmptyState } from '@/components/ui/states';
import { shellText } from '@/constants/texts/shell';
import { useDesk } from '@/hooks/use-desk';
import { permissionSentence, type Permission } from '@/shared/permissions';

/** A page that says kindly why there is nothing to see, with the way back. */
export function PlainPage({ title, body }: { title: string; body: string }) {
  return (
    <Screen title={title}>
      <EmptyState
        body={body}
        action={<Button kind="secondary" label={shellText.toStart} href="/" />}
      />
    </Screen>
  );
}

/** Opens a screen only to those who may; an address typed by hand is answered with the reason. */
export function Permitted({
  permission,
  children,
}: {
  permission: Permission;
  children: ReactNode;
}) {
  const desk = useDesk();
  if (desk.permissions.includes(permission)) return children;
  return (
    <PlainPage
      title={shellText.notPermittedTitle}
      body={shellText.notPermitted(permissionSentence(permission), shellText.roles[desk.role])}
    />
  );
}
