import { useState } from 'react';
import { z } from 'zod';
import { readStored, storeKey, writeStored } from './local-store';

const hiddenSchema = z.array(z.string());

/** Which columns of a table this person does not want to see on this desk. */
export function useHiddenColumns(table: string, userId: string, deskId: string) {
  const key = storeKey(`hidden-columns.${table}`, userId, deskId);
  const [hidden, setHidden] = useState<readonly string[]>(
    () => readStored(key, hiddenSchema) ?? [],
  );
  const toggle = (id: string) => {
    const next = hidden.includes(id) ? hidden.filter((other) => other !== id) : [...hidden, id];
    writeStored(key, next);
    setHidden(next);
  };
  return { hidden, toggle };
}
