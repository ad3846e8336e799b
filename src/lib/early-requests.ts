/** Requests that begin before the application that reads them has been loaded; each answer is taken once. */
const begun = new Map<string, Promise<Response>>();

export function beginEarly(path: string): void {
  const answer = fetch(`/api${path}`, {
    headers: { accept: 'application/json' },
    credentials: 'same-origin',
  });
  // Whoever takes it learns of the failure; untaken, it is nobody's.
  answer.catch(() => undefined);
  begun.set(path, answer);
}

export function takeEarly(path: string): Promise<Response> | undefined {
  const answer = begun.get(path);
  begun.delete(path);
  return answer;
}
