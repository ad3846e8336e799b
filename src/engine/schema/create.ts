import { FORMAT_NAME, FORMAT_VERSION, presetSchema, type PresetDocument, type PresetInput } from './preset';

/** A document with nothing in it yet: what "New" opens. */
export function createEmptyPreset(title = 'Untitled model'): PresetDocument {
  return createPreset({ title, populations: [] });
}

/**
 * A document from its parts, with every default filled in.
 * Throws on parts that do not fit the shape: for documents written in code, not for ones read in.
 */
export function createPreset(parts: Omit<PresetInput, 'format' | 'formatVersion'>): PresetDocument {
  return presetSchema.parse({ format: FORMAT_NAME, formatVersion: FORMAT_VERSION, ...parts });
}
