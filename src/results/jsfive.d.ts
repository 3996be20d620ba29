/** The part of jsfive this program uses; the package has no types. Everything may throw, also plain strings. */
declare module 'jsfive' {
  export class Group {
    readonly keys: string[];
    readonly attrs: Readonly<Record<string, unknown>>;
    /** throws a string when the name is absent; null for a broken soft link */
    get(name: string): Group | Dataset | null;
  }
  export class File extends Group {
    constructor(bytes: ArrayBuffer, name?: string);
  }
  export class Dataset {
    readonly shape: number[];
    /** '<f8', '<f4', …; an array for strings of variable length, references, … */
    readonly dtype: string | readonly unknown[];
    /** a plain array, flattened; chunks that were never written leave holes */
    readonly value: unknown[];
    readonly attrs: Readonly<Record<string, unknown>>;
    /** not part of the documented interface: the chunk shape, or null when the data are contiguous */
    readonly _dataobjects: { readonly chunks: number[] | null };
  }
}
