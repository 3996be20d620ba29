const LONGEST = 40;

/** Text from outside for a message: at most 40 characters; control and direction-changing characters, quotes and backslashes escaped. */
export function clip(text: string): string {
  const pieces: string[] = [];
  let length = 0;
  for (const character of text) {
    const piece = escaped(character);
    pieces.push(piece);
    length += piece.length;
    if (length > LONGEST) {
      // drop whole characters until the ellipsis fits
      while (length > LONGEST - 1) length -= pieces.pop()?.length ?? 0;
      return `${pieces.join('')}…`;
    }
  }
  return pieces.join('');
}

function escaped(character: string): string {
  return JSON.stringify(character)
    .slice(1, -1)
    .replace(/[\u007f-\u009f\u2028-\u202e\u2066-\u2069]/g, (c) => `\\u${c.charCodeAt(0).toString(16).padStart(4, '0')}`);
}
