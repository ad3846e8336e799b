import type { Request } from 'express';
import type { z } from 'zod';

import { refuseInvalid } from '../errors';

function parse<S extends z.ZodType>(schema: S, value: unknown): z.infer<S> {
  const parsed = schema.safeParse(value);
  if (parsed.success) return parsed.data;
  const fields: Record<string, string> = {};
  for (const issue of parsed.error.issues) {
    const path = issue.path.map(String).join('.') || 'body';
    if (!Object.hasOwn(fields, path)) fields[path] = issue.message;
  }
  throw refuseInvalid(fields);
}

/** The body as its schema has it, or a refusal that names every field in trouble. */
export function parseBody<S extends z.ZodType>(request: Request, schema: S): z.infer<S> {
  return parse(schema, request.body ?? {});
}

export function parseQuery<S extends z.ZodType>(request: Request, schema: S): z.infer<S> {
  return parse(schema, request.query);
}
