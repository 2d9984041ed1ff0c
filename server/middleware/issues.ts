/** Turns the complaints of a schema into issues that a form shows at its fields. */
import type { z } from 'zod';
import type { Issue } from '@/shared/errors';

type Complaint = z.core.$ZodIssue;
type Path = readonly PropertyKey[];

const dotted = (path: Path) => path.map(String).join('.');

const typeSentences: Record<string, string> = {
  number: 'Give a number.',
  int: 'Give a whole number.',
  string: 'Give a text.',
  object: 'Give an object.',
  array: 'Give a list.',
  boolean: 'Give true or false.',
};

/** The alternative that the input comes nearest to is the one that was meant. */
const nearest = (alternatives: readonly Complaint[][]): Complaint[] =>
  alternatives.reduce((best, other) => (other.length < best.length ? other : best));

const codes: Partial<Record<Complaint['code'], string>> = {
  too_small: 'out-of-range',
  too_big: 'out-of-range',
  invalid_value: 'unknown-name',
  invalid_format: 'wrong-format',
};

function typeIssue(complaint: z.core.$ZodIssueInvalidType, path: string): Issue {
  const { input, expected } = complaint;
  if (input === undefined) return { path, code: 'missing', message: 'Fill this in.' };
  const code = typeof input === 'number' ? 'not-finite' : `not-a-${expected}`;
  return { path, code, message: typeSentences[expected] ?? complaint.message };
}

function issuesOf(complaint: Complaint, before: Path): Issue[] {
  const path = [...before, ...complaint.path];
  switch (complaint.code) {
    case 'invalid_type':
      return [typeIssue(complaint, dotted(path))];
    case 'unrecognized_keys':
      return complaint.keys.map((key) => ({
        path: dotted([...path, key]),
        code: 'unknown-field',
        message: 'This field is not known here; leave it out.',
      }));
    case 'invalid_union':
      if (complaint.errors.length === 0) break;
      return nearest(complaint.errors).flatMap((nested) => issuesOf(nested, path));
    case 'invalid_value':
      if (complaint.input === undefined)
        return [{ path: dotted(path), code: 'missing', message: 'Fill this in.' }];
      break;
  }
  const code = codes[complaint.code] ?? 'not-accepted';
  return [{ path: dotted(path), code, message: complaint.message }];
}

export const issuesOfError = (error: z.ZodError): Issue[] =>
  error.issues.flatMap((complaint) => issuesOf(complaint, []));
