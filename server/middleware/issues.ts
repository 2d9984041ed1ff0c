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

/** What to do, for every complaint to which the schema itself has no sentence. */
export const sentenceOf: z.core.$ZodErrorMap = (complaint) => {
  if (complaint.input === undefined) return 'Fill this in.';
  switch (complaint.code) {
    case 'invalid_type':
      return typeSentences[complaint.expected] ?? 'Give another kind of value.';
    case 'invalid_value':
      return `Choose one of: ${complaint.values.join(', ')}.`;
    case 'invalid_format':
      return complaint.format === 'uuid'
        ? 'Give the id of a record, a UUID.'
        : 'Write this in another form.';
    case 'too_small':
      return `Give at least ${complaint.minimum}.`;
    case 'too_big':
      return `Give at most ${complaint.maximum}.`;
    case 'unrecognized_keys':
      return 'This field is not known here; leave it out.';
    default:
      return 'This is not accepted here.';
  }
};

const codes: Partial<Record<Complaint['code'], string>> = {
  too_small: 'out-of-range',
  too_big: 'out-of-range',
  invalid_value: 'unknown-name',
  invalid_format: 'wrong-format',
};

function codeOf(complaint: Complaint): string {
  if (complaint.input === undefined) return 'missing';
  if (complaint.code !== 'invalid_type') return codes[complaint.code] ?? 'not-accepted';
  return typeof complaint.input === 'number' ? 'not-finite' : `not-a-${complaint.expected}`;
}

/** The alternative that the input comes nearest to is the one that was meant. */
const nearest = (alternatives: readonly Complaint[][]): Complaint[] =>
  alternatives.reduce((best, other) => (other.length < best.length ? other : best));

function issuesOf(complaint: Complaint, before: Path): Issue[] {
  const path = [...before, ...complaint.path];
  const { message } = complaint;
  if (complaint.code === 'unrecognized_keys')
    return complaint.keys.map((key) => ({
      path: dotted([...path, key]),
      code: 'unknown-field',
      message,
    }));
  if (complaint.code === 'invalid_union' && complaint.errors.length > 0)
    return nearest(complaint.errors).flatMap((nested) => issuesOf(nested, path));
  return [{ path: dotted(path), code: codeOf(complaint), message }];
}

/** One issue a field: the first, since what fails the form of a field fails its range as well. */
export function issuesOfError(error: z.ZodError): Issue[] {
  const issues = error.issues.flatMap((complaint) => issuesOf(complaint, []));
  return issues.filter(
    (issue, index) => issues.findIndex(({ path }) => path === issue.path) === index,
  );
}
