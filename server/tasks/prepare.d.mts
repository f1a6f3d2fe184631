/** The checkout's own folder. */
export const root: string;
export function ensureBuilt(): void;
