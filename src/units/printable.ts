/** Text from outside (titles, file names, file text) made safe for a terminal: control and direction-changing characters are escaped.
 *
 *  A title could otherwise move the cursor, change colours or rewrite what stands above it.
 *  @example printable('a\u001b[2Jb') // 'a\\u001b[2Jb' */
export function printable(text: string): string {
  return text.replace(UNSAFE, escapeCharacter);
}

/** JSON of a value, two spaces deep, with a line end. The same characters are escaped as in {@link printable}: it is the same object,
 *  and a terminal that shows it obeys nothing in it. Non-finite numbers are null. */
export function printableJson(value: unknown): string {
  return `${printableJsonText(JSON.stringify(value, null, 2))}\n`;
}

/** JSON that is there already, escaped as {@link printableJson} does. */
export function printableJsonText(json: string): string {
  return json.replace(UNSAFE_IN_JSON, escapeCharacter);
}

/** Cc: control characters; the rest: line separators and characters that change the writing direction */
const UNSAFE = /[\p{Cc}\u061c\u200e\u200f\u2028-\u202e\u2066-\u2069]/gu;
/** JSON itself escapes those below a space inside of texts; between them it needs its own line ends */
const UNSAFE_IN_JSON = /[\u007f-\u009f\u061c\u200e\u200f\u2028-\u202e\u2066-\u2069]/g;

function escapeCharacter(character: string): string {
  return `\\u${character.charCodeAt(0).toString(16).padStart(4, '0')}`;
}
