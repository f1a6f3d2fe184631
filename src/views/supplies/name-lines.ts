/** A name in at most two lines of about this many letters, broken between words; what does not fit ends in "…". */
export function nameLines(name: string, most: number): string[] {
  if (name.length <= most) return [name];
  const breakAt = name.lastIndexOf(' ', most);
  if (breakAt <= 0) return [shortened(name, most)];
  return [name.slice(0, breakAt), shortened(name.slice(breakAt + 1), most)];
}

function shortened(text: string, most: number): string {
  return text.length <= most ? text : `${text.slice(0, most - 1).trimEnd()}…`;
}
