/** An opening sentence in three parts; `number`, where there is one, is underlined. */
export interface Sentence {
  before: string;
  number: string;
  after: string;
}
