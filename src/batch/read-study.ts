import type { ZodError } from 'zod';

import { documentFromEquations } from '@/engine/schema/equations';
import { placeInWords, readPreset } from '@/engine/schema/migrate';
import type { PresetDocument } from '@/engine/schema/preset';
import { equationsSchema, studySchema, type StudyTask } from '@/engine/schema/study';

/** A study ready to run. */
export interface ReadStudy {
  readonly document: PresetDocument;
  readonly tasks: readonly StudyTask[];
}

export type ReadStudyResult =
  | { readonly ok: true; readonly study: ReadStudy }
  | { readonly ok: false; readonly problems: readonly string[] };

/**
 * A study from JSON of unknown origin: its preset, a whole document or equations as text, and its tasks.
 * Refusals name the place in words.
 */
export function readStudy(json: unknown): ReadStudyResult {
  if (typeof json !== 'object' || json === null || Array.isArray(json))
    return refuse('A study is a JSON object with "preset" and "tasks".');
  const { preset, tasks, ...rest } = json as Record<string, unknown>;
  const [extra] = Object.keys(rest);
  if (extra !== undefined)
    return refuse(`A study holds "preset" and "tasks" alone; "${extra.slice(0, 40)}" is neither.`);
  const document = readModel(preset);
  if (!document.ok) return document;
  const parsed = studySchema.shape.tasks.safeParse(tasks);
  if (!parsed.success) return { ok: false, problems: problemsOf(parsed.error, ['tasks']) };
  return { ok: true, study: { document: document.document, tasks: parsed.data } };
}

function readModel(
  preset: unknown,
):
  | { readonly ok: true; readonly document: PresetDocument }
  | { readonly ok: false; readonly problems: readonly string[] } {
  if (typeof preset !== 'object' || preset === null)
    return refuse(
      'The study has no model: "preset" should hold a preset document, or { "equations": [...] }.',
    );
  if (!('equations' in preset)) {
    const read = readPreset(preset);
    if (read.ok) return { ok: true, document: read.document };
    return { ok: false, problems: read.problems.map((one) => `${placeInWords(one.path)}: ${one.message}`) };
  }
  const parsed = equationsSchema.safeParse(preset);
  if (!parsed.success) return { ok: false, problems: problemsOf(parsed.error, ['preset']) };
  const { title, parameters, init, box, sign, equations } = parsed.data;
  const made = documentFromEquations({
    equations,
    ...(title === undefined ? {} : { title }),
    ...(parameters === undefined ? {} : { parameters }),
    ...(init === undefined ? {} : { init }),
    ...(box === undefined ? {} : { box }),
    ...(sign === undefined ? {} : { sign }),
  });
  return made.ok ? made : refuse(`Equation ${made.line + 1}: ${made.message}`);
}

function refuse(problem: string): { readonly ok: false; readonly problems: readonly string[] } {
  return { ok: false, problems: [problem] };
}

/** Problems told at once; more would bury the first. */
const PROBLEM_LIMIT = 12;

function problemsOf(error: ZodError, base: readonly string[]): string[] {
  return error.issues.slice(0, PROBLEM_LIMIT).map((issue) => {
    const path = [...base, ...issue.path].map((step) => (typeof step === 'number' ? step : String(step)));
    return `${placeInWords(path)}: ${issue.message}`;
  });
}
