/** One step of the schema: fixed SQL, frozen once it has landed; a later step corrects an earlier one. */
export interface Migration {
  readonly name: string;
  readonly up: string;
}
