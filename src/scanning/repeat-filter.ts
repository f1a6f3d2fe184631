/**
 * A camera sees the same label many times a second. Lets a text through once, and again only after it was out of sight
 * for a while.
 *
 * @param quietMs how long a text must be away before it counts anew
 */
export function makeRepeatFilter(quietMs: number): (text: string, now: number) => boolean {
  const lastSeen = new Map<string, number>();
  return (text, now) => {
    for (const [seen, at] of lastSeen) if (now - at > quietMs) lastSeen.delete(seen);
    const isNew = !lastSeen.has(text);
    lastSeen.set(text, now);
    return isNew;
  };
}
