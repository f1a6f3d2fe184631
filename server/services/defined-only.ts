type Defined<T> = { [K in keyof T]?: Exclude<T[K], undefined> };

/** The fields of an edit that were sent; those left out stay as they are. */
export function definedOnly<T extends object>(fields: T): Defined<T> {
  // Entries lose their keys' types; only undefined ones are taken away.
  return Object.fromEntries(Object.entries(fields).filter(([, value]) => value !== undefined)) as Defined<T>;
}
