/** Ids in the order met, with their place. */
export class IdTable {
  readonly ids: string[] = [];
  private readonly placeOf = new Map<string, number>();
  /** Ids that were written with outer spaces somewhere. */
  spaced = 0;
  /** Ids with a line end in them. */
  multiline = 0;

  find(id: string): number | undefined {
    return this.placeOf.get(id);
  }
  /** Place of an id, adding it when it is new. */
  place(id: string): number {
    const known = this.placeOf.get(id);
    if (known !== undefined) return known;
    const place = this.ids.length;
    if (id.includes('\n')) this.multiline++;
    this.ids.push(id);
    this.placeOf.set(id, place);
    return place;
  }
}
