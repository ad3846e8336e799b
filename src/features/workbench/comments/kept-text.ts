import { useState } from 'react';

/** Name under which text being written is kept, for one person and one place. */
export function textKey(userId: string, presetId: string, place: string): string {
  return `moiety.comment.${userId}.${presetId}.${place}`;
}

function read(key: string): string | null {
  try {
    return localStorage.getItem(key);
  } catch {
    return null;
  }
}

function keep(key: string, text: string): void {
  try {
    if (text === '') localStorage.removeItem(key);
    else localStorage.setItem(key, text);
  } catch {
    // A full or forbidden store keeps nothing; the text stays in the field.
  }
}

/** Text that outlives a reload and a lost connection, until it is emptied. */
export function useKeptText(key: string, initial = ''): [string, (text: string) => void] {
  const [text, setText] = useState(() => read(key) ?? initial);
  const change = (next: string) => {
    keep(key, next);
    setText(next);
  };
  return [text, change];
}
