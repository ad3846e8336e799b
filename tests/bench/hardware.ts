import { cpus } from 'node:os';

/** Processor, cores and Node, in one line. */
export function hardwareLine(): string {
  const processors = cpus();
  const model = processors[0]?.model.trim() || 'unknown processor';
  const cores = processors.length === 1 ? '1 core' : `${processors.length} cores`;
  return `${model}, ${cores}, Node ${process.versions.node}, ${process.platform} ${process.arch}`;
}
