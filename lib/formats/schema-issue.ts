/** Turns a schema's complaints into sentences that say where, what was found and what belongs there. */
import type { z } from 'zod';
import type { PathWanted } from './json-locate';
import type { JsonPath } from './json-walk';

export interface ExplainedIssue extends PathWanted {
  message: string;
  expected?: string;
}

type Issue = z.core.$ZodIssue;

/** `root` is the parsed text that the schema refused. Most issues give one explanation; unknown names one each. */
export function explainIssue(issue: Issue, root: unknown): ExplainedIssue[] {
  const { path } = issue;
  switch (issue.code) {
    case 'unrecognized_keys':
      return issue.keys.map((key) => ({
        path: [...path, key],
        atName: true,
        message: `There is no field “${key}” here: remove it or correct its name.`,
      }));
    case 'invalid_key':
      return [
        {
          path,
          atName: true,
          message: `“${String(path.at(-1))}” cannot be a name here. ${rule(issue.issues)}`,
        },
      ];
    case 'custom':
      return [{ path, message: issue.message }];
    default:
      return [explainValue(issue, root)];
  }
}

const rule = (issues: readonly { message: string }[]): string =>
  `${issues[0]?.message ?? 'It is malformed'}.`;

function explainValue(issue: Issue, root: unknown): ExplainedIssue {
  const { path } = issue;
  const expected = expectation(issue);
  const found = valueAt(root, path);
  if (found === undefined && path.length > 0) {
    return { path, message: `The field “${String(path.at(-1))}” is missing: give ${expected}.`, expected };
  }
  const subject = found === undefined ? 'The value' : brief(found);
  // Formats are described by whole sentences.
  if (issue.code === 'invalid_format')
    return { path, message: `${subject} cannot stand here. ${expected}.`, expected };
  return { path, message: `${subject} cannot stand here: give ${shortened(issue, expected)}.`, expected };
}

/** What would have been right, as the end of a sentence. */
function expectation(issue: Issue): string {
  switch (issue.code) {
    case 'invalid_type':
      return TYPE_NAMES[issue.expected] ?? `a value of type ${issue.expected}`;
    case 'invalid_value':
      return oneOf(issue.values.map((value) => JSON.stringify(value)));
    case 'too_small':
      return `${sizeSubject(issue.origin)}${issue.inclusive ? 'at least' : 'more than'} ${issue.minimum}${sizeUnit(issue.origin)}`;
    case 'too_big':
      return `${sizeSubject(issue.origin)}${issue.inclusive ? 'at most' : 'less than'} ${issue.maximum}${sizeUnit(issue.origin)}`;
    case 'invalid_format':
      return issue.message;
    case 'invalid_union':
      return unionExpectation(issue);
    default:
      return issue.message;
  }
}

const NAMED_CHOICES = 6;

/** Long lists of choices are left to `expected`. */
const shortened = (issue: Issue, expected: string): string =>
  issue.code === 'invalid_value' && issue.values.length > NAMED_CHOICES
    ? `one of the ${issue.values.length} names known here`
    : expected;

const TYPE_NAMES: Partial<Record<string, string>> = {
  string: 'a string',
  number: 'a number',
  int: 'an integer',
  boolean: 'true or false',
  array: 'an array',
  object: 'an object',
  record: 'an object',
};

const sizeSubject = (origin: string): string =>
  origin === 'number' || origin === 'int' ? 'a number of ' : origin === 'array' ? 'an array of ' : 'text of ';
const sizeUnit = (origin: string): string =>
  origin === 'number' || origin === 'int' ? '' : origin === 'array' ? ' elements' : ' characters';

function unionExpectation(issue: Extract<Issue, { code: 'invalid_union' }>): string {
  if ('options' in issue && Array.isArray(issue.options)) {
    return oneOf(issue.options.map((value) => JSON.stringify(value)));
  }
  const branches = issue.errors.flatMap((branch) => branch.slice(0, 1).map(expectation));
  return oneOf([...new Set(branches)]);
}

function oneOf(texts: readonly (string | undefined)[]): string {
  const last = texts.at(-1) ?? 'another value';
  return texts.length < 2 ? last : `${texts.slice(0, -1).join(', ')} or ${last}`;
}

function valueAt(root: unknown, path: JsonPath): unknown {
  let at: unknown = root;
  for (const part of path) {
    if (typeof at !== 'object' || at === null || !Object.hasOwn(at, part)) return undefined;
    at = (at as Record<PropertyKey, unknown>)[part];
  }
  return at;
}

const BRIEF_LENGTH = 40;

function brief(value: unknown): string {
  if (Array.isArray(value)) return 'An array';
  if (typeof value === 'object' && value !== null) return 'An object';
  const text = typeof value === 'number' ? String(value) : JSON.stringify(value);
  return text.length > BRIEF_LENGTH ? `${text.slice(0, BRIEF_LENGTH)}…` : text;
}
