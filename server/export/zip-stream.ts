import { strToU8, Zip, ZipDeflate } from 'fflate';

/** One file of an archive. */
export interface ArchiveEntry {
  readonly name: string;
  readonly text: string;
}

const NAME_LENGTH = 60;

/** Words as a part of a file name: nothing that a path, a shell or another system reads as more than letters. */
export function fileName(words: string): string {
  const plain = words
    .normalize('NFKD')
    .replace(/\p{M}/gu, '')
    .replace(/[^A-Za-z0-9]+/g, '-')
    .replace(/^-+|-+$/g, '')
    .slice(0, NAME_LENGTH);
  return plain || 'untitled';
}

export const jsonEntry = (name: string, value: unknown): ArchiveEntry => ({
  name,
  text: `${JSON.stringify(value, null, 2)}\n`,
});

/** A zip archive piece by piece: one entry is in memory at a time. */
export async function* zipOf(entries: AsyncIterable<ArchiveEntry>): AsyncGenerator<Uint8Array> {
  const pieces: Uint8Array[] = [];
  let failure: Error | null = null;
  const zip = new Zip((error, piece) => {
    if (error) failure = error;
    else pieces.push(piece);
  });
  const written = () => {
    if (failure !== null) throw failure;
    return pieces.splice(0);
  };
  for await (const { name, text } of entries) {
    const file = new ZipDeflate(name, { level: 6 });
    zip.add(file);
    file.push(strToU8(text), true);
    yield* written();
  }
  zip.end();
  yield* written();
}
