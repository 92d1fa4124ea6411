// What every figure hands over: a way to draw itself, the same in words, the same in numbers.

/** Where a figure is drawn: the browser's document or a headless one. */
export interface DrawingContext {
  document: Document;
  /** px available: 760 in a report column, 354 on a phone */
  width: number;
}

/**
 * A figure. What it shows is fixed when it is made (bad numbers throw there, not while drawing); `draw` gives one SVG
 * element that depends on the values and the width alone, without style attributes, style elements or ids, so that
 * drawings can share a page whose content security policy forbids inline styles.
 */
export interface Drawing {
  /** what a reader who can't see it should know, with numbers */
  alt: string;
  draw: (context: DrawingContext) => Element;
  /** the numbers drawn, for CSV: one array a row, first row the column names with units */
  data?: (string | number)[][];
  /** further files that it can be saved as, beside SVG and CSV */
  files?: DrawingFile[];
}

/** A file of its own kind that a drawing can be saved as. */
export interface DrawingFile {
  /** what a reader calls it: "DXF" */
  label: string;
  /** of its name, without the dot */
  extension: string;
  /** media type */
  type: string;
  /** made when it is asked for */
  text: () => string;
}
