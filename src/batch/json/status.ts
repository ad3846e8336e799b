interface Outcome {
  readonly status: string;
  readonly message: string;
}

/**
 * Status of a task that is answered for the model and its pooled twin: the first of both that is not
 * complete, with its reason.
 */
export function overall(split: Outcome, twin: Outcome | null): Outcome {
  if (!twin || split.status !== 'complete') return { status: split.status, message: split.message };
  if (twin.status === 'complete') return { status: 'complete', message: split.message };
  return { status: twin.status, message: `Pooled twin: ${twin.message}` };
}
