import { ApiError } from '@/lib/api-client';

/** A refusal in words that can be shown, with the places in the document that it names. */
export function errorWords(error: unknown): string {
  if (!(error instanceof ApiError))
    return 'That did not work, and no reason was given. Try again in a moment.';
  const fields = Object.entries(error.fields);
  if (fields.length === 0) return error.message;
  return `${error.message} ${fields.map(([path, reason]) => `${path}: ${reason}`).join(' ')}`;
}
