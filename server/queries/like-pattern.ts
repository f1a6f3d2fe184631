/** A LIKE pattern that finds the text anywhere, with its wildcards taken literally; use with ESCAPE '\'. */
export function likePattern(text: string): string {
  return `%${text.replace(/[\\%_]/g, '\\$&')}%`;
}
