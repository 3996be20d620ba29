/** A value that the case leaves to the program. */
export interface DefaultUsed {
  readonly path: string;
  /** for people, with its unit */
  readonly value: string;
}

/** Collects every default used and every remark on how an entry was read. */
export class Defaults {
  readonly used: DefaultUsed[] = [];
  readonly notes: string[] = [];

  add(path: string, value: string): void {
    if (!this.used.some((entry) => entry.path === path)) this.used.push({ path, value });
  }

  note(text: string): void {
    if (!this.notes.includes(text)) this.notes.push(text);
  }

  /** the given value, or the default, noted under its path */
  or<T>(given: T | undefined, path: string, fallback: T, text: string): T {
    if (given !== undefined) return given;
    this.add(path, text);
    return fallback;
  }
}
