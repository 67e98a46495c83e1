/**
 * Version of the fatigue engine, stored with every count and every ledger entry. It is raised whenever the same
 * log, curve and detail could give another number than before; counts of different versions stand side by side.
 */
export const ENGINE_VERSION = '1.0.0';
