import fc from 'fast-check';

/** The same examples at every run, so that a failure is a change's own; PROPERTY_SEED tries others. */
fc.configureGlobal({ seed: Number(process.env.PROPERTY_SEED ?? 20_261_201) });
