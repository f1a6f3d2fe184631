import type { Endpoint } from '@shared/contracts/endpoint.ts';
import type { CallOptions } from '@/api/call-api.ts';
import { type LooseCall, addressOf, sendRequest } from '@/api/send-request.ts';

// Long enough for the browser to have read the file that the address names.
const ADDRESS_LIFE_MS = 60_000;

/** The address of a file that is fetched with GET, for a plain link. */
export function fileAddress<const E extends Endpoint>(
  endpoint: E,
  options: Pick<CallOptions<E> & LooseCall, 'params' | 'query'>,
): string {
  return addressOf(endpoint, options as LooseCall);
}

/** Fetches a file and saves it under the name that the server gave. */
export async function downloadFile<const E extends Endpoint>(
  endpoint: E,
  options: CallOptions<E>,
  fallbackName = 'limestead-file',
): Promise<string> {
  const { blob, name } = await fetchFile(endpoint, options, fallbackName);
  saveBlob(blob, name);
  return name;
}

/** A file and the name that the server gave it. */
export async function fetchFile<const E extends Endpoint>(
  endpoint: E,
  options: CallOptions<E>,
  fallbackName: string,
): Promise<{ blob: Blob; name: string }> {
  const response = await sendRequest(endpoint, options as LooseCall);
  const name = fileNameOf(response.headers.get('Content-Disposition')) ?? fallbackName;
  return { blob: await response.blob(), name };
}

export function saveBlob(blob: Blob, name: string): void {
  const link = document.createElement('a');
  link.href = URL.createObjectURL(blob);
  link.download = name;
  link.click();
  setTimeout(() => {
    URL.revokeObjectURL(link.href);
  }, ADDRESS_LIFE_MS);
}

/** The file name of a Content-Disposition header; the encoded form of RFC 6266 wins over the plain one. */
export function fileNameOf(header: string | null): string | undefined {
  const encoded = /filename\*=UTF-8''([^;]+)/i.exec(header ?? '')?.[1];
  if (encoded !== undefined) return decodeURIComponent(encoded);
  return /filename="?([^";]+)"?/i.exec(header ?? '')?.[1];
}
