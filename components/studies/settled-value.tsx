import { Text } from '@/components/ui/text';

export type SettledValueProps = {
  /** The value as written, with separators and sign. */
  text: string;
  /** How many of its leading digits have settled. */
  digits: number;
};

const isDigit = (character: string) => character >= '0' && character <= '9';

/** Where the settled part of a written number ends: behind so many digits and what stands between. */
function settledLength(text: string, digits: number): number {
  let seen = 0;
  let end = 0;
  for (let i = 0; i < text.length && seen < digits; i++) {
    if (isDigit(text[i])) seen++;
    end = i + 1;
  }
  return text[end] === '.' ? end + 1 : end;
}

/** Settled digits in ink, moving ones muted: convergence is seen in the numbers themselves. */
export function SettledValue({ text, digits }: SettledValueProps) {
  const end = digits > 0 ? settledLength(text, digits) : 0;
  return (
    <Text tabular>
      {text.slice(0, end)}
      {end < text.length ? (
        <Text tabular tone="muted">
          {text.slice(end)}
        </Text>
      ) : null}
    </Text>
  );
}
