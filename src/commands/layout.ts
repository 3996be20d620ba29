/** Text laid out in columns of characters. Nothing here knows what the text says; colours are added by the caller to whole lines. */

export const NO_BREAK = '\u00a0';

/** Breaks a text into lines of at most `width` characters, at spaces; a longer word is cut. A no-break space keeps its neighbours together
 *  (a number and its unit) and comes out as a space.
 *  @param first  what the first line starts with
 *  @param rest   what the other lines start with; default as many spaces as `first` is long */
export function wrap(text: string, width: number, first = '', rest: string = ' '.repeat(lengthOf(first))): string[] {
  const lines: string[] = [];
  let line = first;
  let empty = true;
  for (const word of text.split(/ +/).filter((w) => w !== '')) {
    let left = word;
    while (left !== '') {
      const room = width - lengthOf(line) - (empty ? 0 : 1);
      if (lengthOf(left) <= room) {
        line += empty ? left : ` ${left}`;
        left = '';
        empty = false;
      } else if (empty) {
        // longer than a whole line
        const characters = [...left];
        const cut = Math.max(1, room);
        lines.push(line + characters.slice(0, cut).join(''));
        left = characters.slice(cut).join('');
        line = rest;
      } else {
        lines.push(line);
        line = rest;
        empty = true;
      }
    }
  }
  if (!empty || lines.length === 0) lines.push(line);
  return lines.map((l) => l.trimEnd().replaceAll(NO_BREAK, ' '));
}

/** Rows of cells below each other; the last column takes what is left of the width, and every cell wraps inside its column.
 *  Leading spaces of a row's first cell indent that cell.
 *  @param widths  of all columns but the last, with the space that follows them */
export function columns(rows: readonly (readonly string[])[], widths: readonly number[], width: number): string[] {
  const starts = [0];
  for (const [i, w] of widths.entries()) starts.push(starts[i] + w);
  const lines: string[] = [];
  for (const row of rows) {
    const cells = row.map((cell, i) => {
      const room = i < widths.length ? widths[i] - 2 : width - starts[i];
      const indent = /^ */.exec(cell)?.[0] ?? '';
      return cell.length === indent.length ? [] : wrap(cell, room, indent);
    });
    const height = Math.max(1, ...cells.map((c) => c.length));
    for (let k = 0; k < height; k++) {
      let line = '';
      for (const [i, cell] of cells.entries()) line = `${padTo(line, starts[i])}${cell[k] ?? ''}`;
      lines.push(line.trimEnd());
    }
  }
  return lines;
}

/** Characters as a terminal shows them, wide ones not considered. */
export function lengthOf(text: string): number {
  return [...text].length;
}

function padTo(text: string, length: number): string {
  return text + ' '.repeat(Math.max(0, length - lengthOf(text)));
}
