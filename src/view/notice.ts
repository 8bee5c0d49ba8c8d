/** Something a person should read before they use a result. `code` stays the same for scripts; `text` says what to do. */
export interface Notice {
  readonly code: string;
  readonly text: string;
}
