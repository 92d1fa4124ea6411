// How wide a text will be, without a page to measure it in: a figure laid out in Node must look the same in a browser.

// Advance widths of Helvetica for the codes 32 to 126, thousandths of the size (Adobe's metrics of its 35 base fonts).
const advances = [
  278, 278, 355, 556, 556, 889, 667, 191, 333, 333, 389, 584, 278, 333, 278, 278, 556, 556, 556, 556, 556, 556, 556,
  556, 556, 556, 278, 278, 584, 584, 584, 556, 1015, 667, 667, 722, 722, 667, 611, 778, 722, 278, 500, 667, 556, 833,
  722, 778, 667, 778, 722, 667, 611, 722, 667, 944, 667, 667, 611, 278, 278, 278, 469, 556, 333, 556, 556, 500, 556,
  556, 278, 556, 556, 222, 222, 500, 222, 833, 556, 556, 556, 556, 333, 500, 278, 556, 500, 722, 500, 500, 500, 334,
  260, 334, 584,
];

/** A machine with none of the stack's faces falls back to DejaVu Sans, up to 16 % wider than Helvetica in words of ours. */
const allowance = 1.17;

/** Arrows and signs of mathematics, as wide as their widest face draws them. */
const isSign = (code: number): boolean => code >= 0x2190 && code <= 0x22ff && code !== 0x2212;

/** Width of a text in px, on the safe side for every face of the stack. */
export function textWidth(words: string, size: number, bold = false): number {
  let sum = 0;
  for (const letter of words) {
    const code = letter.codePointAt(0)!;
    sum += code >= 32 && code <= 126 ? advances[code - 32]! : code === 0xb0 ? 400 : isSign(code) ? 840 : 600;
  }
  return (sum / 1000) * size * allowance * (bold ? 1.06 : 1);
}

// Words that belong to the number before them: breaking there would leave a line to begin with "GHz".
const unitWord = /^(?:%|°|(?:[kMGTmµ]?(?:Hz|m|W|V|s|g|K|rad)|dB\S*|deg|λ)[²³]?)[.,;:)]*$/;

/** Breaks a text into lines no wider than `width` px, not between a number and its unit; a single word that is wider stands alone. */
export function wrapText(words: string, width: number, size: number): string[] {
  const pieces: string[] = [];
  for (const word of words.split(/ +/)) {
    const last = pieces.at(-1);
    if (last !== undefined && /\d$/.test(last) && unitWord.test(word)) pieces[pieces.length - 1] = `${last} ${word}`;
    else pieces.push(word);
  }
  const lines: string[] = [];
  let line = "";
  for (const piece of pieces) {
    const longer = line ? `${line} ${piece}` : piece;
    if (line && textWidth(longer, size) > width) {
      lines.push(line);
      line = piece;
    } else line = longer;
  }
  if (line) lines.push(line);
  return lines;
}
