/** A download, whole. */
export interface FileAnswer {
  fileName: string;
  contentType: string;
  content: Buffer | string;
  /** Shown in the browser where it can, instead of saved. */
  inline?: boolean;
}
