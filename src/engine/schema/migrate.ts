import { LIMITS } from './limits';
import { FORMAT_NAME, FORMAT_VERSION, presetSchema, type PresetDocument } from './preset';

/** What keeps a document from being read, and where in it. */
export interface ReadProblem {
  /** Path into the document as read, empty for the whole. */
  readonly path: readonly (string | number)[];
  readonly message: string;
}

export type ReadResult =
  | { readonly ok: true; readonly document: PresetDocument; readonly migratedFrom: number | null }
  | { readonly ok: false; readonly problems: readonly ReadProblem[] };

/** Nesting of a document; the deepest honest one has 8 levels. */
const DEPTH_LIMIT = 24;
/** Problems told at once; more would bury the first. */
const PROBLEM_LIMIT = 20;

type Raw = Readonly<Record<string, unknown>>;

/** Step k turns a document of version k into one of version k + 1. */
export type Migrations = Readonly<Record<number, (document: Raw) => Raw>>;

/** Version 1 is the first, so there is nothing to migrate from yet. */
const MIGRATIONS: Migrations = {};

/**
 * A preset document from JSON of unknown origin: checks size, format and version, brings older
 * versions up to date step by step, then checks the shape. Refusals name the place in plain words.
 */
export function readPreset(json: unknown): ReadResult {
  const size = measure(json);
  if (size === 'too deep') return refuse(`The file is nested more than ${DEPTH_LIMIT} levels deep.`);
  if (size > LIMITS.documentBytes) {
    return refuse(
      `The document holds about ${Math.ceil(size / 1024)} KiB and at most ${LIMITS.documentBytes / 1024} KiB are allowed; shorten its notes or split the model.`,
    );
  }
  if (!isRecord(json)) return refuse('A preset document is a JSON object; this file holds something else.');
  if (json['format'] !== FORMAT_NAME) {
    return refuse(
      `This is not a preset document: its "format" should read "${FORMAT_NAME}". Choose a file that ends in .moiety.json.`,
      ['format'],
    );
  }
  const upgraded = migrateDocument(json, MIGRATIONS, FORMAT_VERSION);
  if (!upgraded.ok) return upgraded;
  const parsed = presetSchema.safeParse(upgraded.document);
  if (!parsed.success) {
    return { ok: false, problems: parsed.error.issues.slice(0, PROBLEM_LIMIT).map(problemOf) };
  }
  const from = json['formatVersion'];
  return {
    ok: true,
    document: parsed.data,
    migratedFrom: typeof from === 'number' && from !== FORMAT_VERSION ? from : null,
  };
}

/** Brings a raw document from its own version to `target` through the given steps. */
export function migrateDocument(
  raw: Raw,
  migrations: Migrations,
  target: number,
):
  | { readonly ok: true; readonly document: Raw }
  | { readonly ok: false; readonly problems: readonly ReadProblem[] } {
  const version = raw['formatVersion'];
  if (typeof version !== 'number' || !Number.isInteger(version) || version < 1) {
    return refuse('The document does not say which version of the format it is in ("formatVersion").', [
      'formatVersion',
    ]);
  }
  if (version > target) {
    return refuse(
      `The document is in version ${version} of the format and this program reads up to version ${target}; update the program to open it.`,
      ['formatVersion'],
    );
  }
  let document = raw;
  for (let step = version; step < target; step += 1) {
    const migrate = migrations[step];
    if (migrate === undefined) {
      return refuse(`Documents in version ${step} of the format can no longer be read.`, ['formatVersion']);
    }
    document = { ...migrate(document), formatVersion: step + 1 };
  }
  return { ok: true, document };
}

function refuse(message: string, path: readonly (string | number)[] = []) {
  return { ok: false as const, problems: [{ path, message }] };
}

function isRecord(value: unknown): value is Raw {
  return typeof value === 'object' && value !== null && !Array.isArray(value);
}

/** About how many bytes the JSON text has; walks without recursion and stops at either limit. */
function measure(json: unknown): number | 'too deep' {
  let size = 0;
  const waiting: { value: unknown; depth: number }[] = [{ value: json, depth: 0 }];
  while (waiting.length > 0 && size <= LIMITS.documentBytes) {
    const next = waiting.pop();
    if (next === undefined) break;
    if (next.depth > DEPTH_LIMIT) return 'too deep';
    const { value, depth } = next;
    if (typeof value === 'string') size += value.length + 3;
    else if (typeof value !== 'object' || value === null) size += 5;
    else {
      for (const [key, inner] of Object.entries(value)) {
        size += Array.isArray(value) ? 1 : key.length + 4;
        waiting.push({ value: inner, depth: depth + 1 });
      }
      size += 2;
    }
  }
  return size;
}

interface Issue {
  readonly code?: string;
  readonly path: readonly PropertyKey[];
  readonly message: string;
  readonly expected?: unknown;
  readonly values?: readonly unknown[];
  readonly maximum?: unknown;
  readonly minimum?: unknown;
  readonly origin?: unknown;
}

const EXPECTED: Readonly<Record<string, string>> = {
  string: 'text is needed here',
  number: 'a number is needed here',
  int: 'a whole number is needed here',
  boolean: 'true or false is needed here',
  array: 'a list is needed here',
  object: 'an object is needed here',
};

function problemOf(issue: Issue): ReadProblem {
  const path = issue.path.map((step) => (typeof step === 'number' ? step : String(step)));
  return { path, message: `${placeInWords(path)}: ${reasonInWords(issue)}.` };
}

function reasonInWords(issue: Issue): string {
  const amount = (value: unknown) => String(value);
  switch (issue.code) {
    case 'invalid_type':
      return EXPECTED[String(issue.expected)] ?? 'something of another kind is needed here';
    case 'invalid_value':
      return `one of ${(issue.values ?? []).map((value) => `"${amount(value)}"`).join(', ')} is needed here`;
    case 'too_big':
      if (issue.origin === 'string') return `at most ${amount(issue.maximum)} characters are allowed`;
      if (issue.origin === 'array') return `at most ${amount(issue.maximum)} entries are allowed`;
      return `the value may be at most ${amount(issue.maximum)}`;
    case 'too_small':
      if (issue.origin === 'array') return `at least ${amount(issue.minimum)} entry is needed`;
      if (issue.origin === 'string' && issue.message.startsWith('Too small')) return 'it may not be empty';
      if (issue.origin === 'string') return trimStop(issue.message);
      return `the value must be at least ${amount(issue.minimum)}`;
    case 'invalid_union':
      return 'its "kind" is not one that is known';
    default:
      return trimStop(issue.message.charAt(0).toLowerCase() + issue.message.slice(1));
  }
}

function trimStop(text: string): string {
  return text.replace(/\.$/, '');
}

const PLURALS: Readonly<Record<string, string>> = {
  populations: 'population',
  classes: 'class',
  traits: 'trait',
  entries: 'entry',
  parameters: 'parameter',
  intermediates: 'intermediate formula',
  processes: 'process',
  effects: 'effect',
  sweeps: 'sweep',
  knownFacts: 'known fact',
  tags: 'tag',
  panes: 'pane',
  constantsOfMotion: 'constant of motion',
  box: 'box side',
};

/** ['populations', 0, 'classes', 1, 'start'] -> "Population 1, class 2, start". */
export function placeInWords(path: readonly (string | number)[]): string {
  const words: string[] = [];
  for (let k = 0; k < path.length; k += 1) {
    const [step, next] = [path[k], path[k + 1]];
    if (typeof step === 'string' && typeof next === 'number') {
      words.push(`${PLURALS[step] ?? step} ${next + 1}`);
      k += 1;
    } else {
      words.push(String(step).replace(/([A-Z])/g, (letter) => ` ${letter.toLowerCase()}`));
    }
  }
  if (words.length === 0) return 'The document';
  const text = words.join(', ');
  return text.charAt(0).toUpperCase() + text.slice(1);
}
