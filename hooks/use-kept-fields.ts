import { useState } from 'react';
import { forgetForm, keepForm, readKeptForm } from './kept-form';

/** Fields that outlive a reload, until the act that they are typed for is on record. */
export function useKeptFields<Values extends Record<string, string>>(
  keptAs: string,
  defaults: Values,
) {
  const [values, setValues] = useState(() => readKeptForm(keptAs, defaults));
  const change = (part: Partial<Values>) => {
    const next = { ...values, ...part };
    setValues(next);
    keepForm(keptAs, next);
  };
  return { values, change, forget: () => forgetForm(keptAs) };
}
