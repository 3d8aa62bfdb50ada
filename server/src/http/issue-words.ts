import type * as z from 'zod/mini';

type Issue = z.core.$ZodIssue;

const escapePointer = (part: PropertyKey): string => String(part).replaceAll('~', '~0').replaceAll('/', '~1');

/** RFC 6901 pointer to a place in what was sent. */
export const jsonPointer = (path: readonly PropertyKey[]): string =>
  path.map((part) => `/${escapePointer(part)}`).join('');

/** Words for one thing that is wrong, written for the person at the form. */
function wordsFor(issue: Issue): string {
  switch (issue.code) {
    case 'invalid_type':
      return issue.input === undefined ? 'This is missing.' : `This has to be ${articleFor(issue.expected)}.`;
    case 'too_small':
      return tooSmall(issue);
    case 'too_big':
      return tooBig(issue);
    case 'invalid_format':
      return formatWords(issue.format);
    case 'invalid_value':
      return `Choose one of: ${issue.values.map(String).join(', ')}.`;
    case 'invalid_union':
      return 'This kind isn’t known.';
    default:
      return 'This can’t be used.';
  }
}

function articleFor(expected: string): string {
  const names: Record<string, string> = {
    string: 'text',
    number: 'a number',
    int: 'a whole number',
    boolean: 'yes or no',
    array: 'a list',
    object: 'a group of values',
  };
  return names[expected] ?? expected;
}

function tooSmall({ origin, minimum, inclusive }: z.core.$ZodIssueTooSmall): string {
  if (origin === 'string') return Number(minimum) <= 1 ? 'This can’t be empty.' : `At least ${minimum} characters.`;
  if (origin === 'array') return `At least ${minimum} of them.`;
  return `This has to be ${inclusive === false ? 'more than' : 'at least'} ${minimum}.`;
}

function tooBig({ origin, maximum, inclusive }: z.core.$ZodIssueTooBig): string {
  if (origin === 'string') return `At most ${maximum} characters.`;
  if (origin === 'array') return `At most ${maximum} of them.`;
  return `This has to be ${inclusive === false ? 'less than' : 'at most'} ${maximum}.`;
}

function formatWords(format: string): string {
  if (format === 'email') return 'This is not an e-mail address.';
  if (format === 'uuid') return 'This is not an id.';
  return 'This is not written the way it has to be.';
}

/**
 * Every issue with its pointer; an unknown member is an issue of its own.
 * @param prefix where the checked thing stands: empty for the body, `query` or `params` for parts of the address
 */
export function issueEntries(issues: readonly Issue[], prefix: string): { pointer: string; detail: string }[] {
  return issues.flatMap((issue) => {
    const at = `${prefix}${jsonPointer(issue.path)}`;
    if (issue.code !== 'unrecognized_keys') return [{ pointer: at, detail: wordsFor(issue) }];
    return issue.keys.map((key) => ({ pointer: `${at}${jsonPointer([key])}`, detail: 'This isn’t known here.' }));
  });
}
