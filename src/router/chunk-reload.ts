const MARK = 'limestead.reloaded-for';

/**
 * After an update of the server, a page that was open before asks for files that are gone. Loading the page anew
 * fetches the current ones; the mark keeps that from repeating when the server is really away.
 */
export function reloadOnceForMissingChunk(error: unknown, path: string): void {
  if (!(error instanceof Error) || !/dynamically imported module|preload CSS|importing a module/i.test(error.message))
    return;
  if (sessionStorage.getItem(MARK) === path) return;
  sessionStorage.setItem(MARK, path);
  window.location.assign(path);
}
