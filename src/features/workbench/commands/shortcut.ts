const MAC = typeof navigator !== 'undefined' && /Mac|iPhone|iPad/.test(navigator.userAgent);

/** Whether a key press is a shortcut. Single characters such as `?` count whatever Shift does. */
export function matchesShortcut(event: KeyboardEvent, shortcut: string): boolean {
  const parts = shortcut.split('+');
  const key = parts.at(-1) ?? '';
  const wants = (name: string) => parts.slice(0, -1).includes(name);
  if (wants('Mod') !== (MAC ? event.metaKey : event.ctrlKey)) return false;
  if (wants('Alt') !== event.altKey) return false;
  if (/^[A-Z0-9]$/.test(key)) {
    if (wants('Shift') !== event.shiftKey) return false;
    // By position as well: with Alt some layouts write another character.
    return event.key.toUpperCase() === key || event.code === `Key${key}` || event.code === `Digit${key}`;
  }
  return event.key === key;
}

/** Keys of a shortcut as they are written on this machine. */
export function keysOf(shortcut: string): readonly string[] {
  return shortcut.split('+').map((key) => {
    if (key === 'Mod') return MAC ? '⌘' : 'Ctrl';
    if (key === 'Alt') return MAC ? '⌥' : 'Alt';
    return key;
  });
}

/** Text that is being typed keeps its own keys: plain characters, and undo of what is not yet handed on. */
export function belongsToText(event: KeyboardEvent): boolean {
  const { target } = event;
  if (!(target instanceof HTMLElement)) return false;
  const typing = target.matches('input, textarea, select, [contenteditable="true"]');
  if (!typing) return false;
  const plain = !event.ctrlKey && !event.metaKey && !event.altKey;
  return plain || (event.key.toLowerCase() === 'z' && target.matches('[data-draft]'));
}
