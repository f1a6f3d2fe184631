/** How a system is called everywhere, "D Saltings": its code as on labels, then its name. */
export function systemTitle({ code, name }: { code: string; name: string }): string {
  return name === '' || name.toLowerCase() === code.toLowerCase() ? code : `${code} ${name}`;
}
