/** Something the reader of a result must know: `code` for machines, `message` a sentence that says what to do. */
export interface Warning {
  readonly code: string;
  readonly message: string;
}
