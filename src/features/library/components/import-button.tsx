import { useRef, useState } from 'react';
import { useNavigate } from 'react-router-dom';

import { Button } from '@/components/ui/button';
import { Dialog } from '@/components/ui/dialog';
import { LIMITS } from '@/engine/schema/limits';
import { readPreset } from '@/engine/schema/migrate';
import { ApiError } from '@/lib/api-client';

import { createPreset } from '../api/create-preset';

/** Reads a file into problems in words, or saves it as a preset of one's own and opens it. */
export function ImportButton() {
  const input = useRef<HTMLInputElement>(null);
  const navigate = useNavigate();
  const [problems, setProblems] = useState<readonly string[]>([]);

  const handleFile = async (file: File) => {
    if (file.size > LIMITS.documentBytes) {
      setProblems([
        `The file is larger than ${LIMITS.documentBytes / 1024} kB, the most a preset document may have.`,
      ]);
      return;
    }
    let json: unknown;
    try {
      json = JSON.parse(await file.text());
    } catch {
      setProblems(['The file is not JSON. Choose a document that was exported as .moiety.json.']);
      return;
    }
    const read = readPreset(json);
    if (!read.ok) {
      setProblems(
        read.problems.map((problem) =>
          problem.path.length > 0 ? `${problem.path.join('.')}: ${problem.message}` : problem.message,
        ),
      );
      return;
    }
    try {
      const created = await createPreset(
        read.document,
        `Imported from ${file.name}`.slice(0, LIMITS.noteLength),
      );
      await navigate(`/presets/${created.preset.id}`);
    } catch (error) {
      setProblems([
        error instanceof ApiError ? error.message : 'Saving the document did not work. Try again.',
      ]);
    }
  };

  return (
    <>
      <Button onClick={() => input.current?.click()}>Import</Button>
      <input
        ref={input}
        type="file"
        accept=".json,application/json"
        aria-label="Preset document to import"
        className="sr-only"
        tabIndex={-1}
        onChange={(event) => {
          const file = event.target.files?.[0];
          event.target.value = '';
          if (file) void handleFile(file);
        }}
      />
      <Dialog
        open={problems.length > 0}
        onOpenChange={() => setProblems([])}
        title="This document could not be imported"
        description="Nothing was changed. What stands in the way:"
      >
        <ul className="list-disc space-y-1 pl-5">
          {problems.slice(0, 20).map((problem) => (
            <li key={problem}>{problem}</li>
          ))}
        </ul>
      </Dialog>
    </>
  );
}
