// Numbers as CSV (RFC 4180) and drawings as SVG files, made in the page itself.

/** Rows as CSV: CRLF ends, quotes where needed, numbers in full. A text that a spreadsheet would run as a formula is quoted with an apostrophe. */
export function csvText(rows: readonly (readonly (string | number)[])[]): string {
  const field = (value: string | number): string => {
    if (typeof value === "number") return String(value);
    const safe = /^[=+@\t\r]|^-(?![\d.])/.test(value) ? `'${value}` : value;
    return /[",\r\n]/.test(safe) ? `"${safe.replaceAll('"', '""')}"` : safe;
  };
  return rows.map((row) => `${row.map(field).join(",")}\r\n`).join("");
}

/** The drawing as a file of its own, with the page's type. */
export function svgText(drawing: Element): string | undefined {
  const found = drawing.localName === "svg" ? drawing : drawing.querySelector("svg");
  if (!found) return undefined;
  const copy = found.cloneNode(true) as Element;
  copy.setAttribute("xmlns", "http://www.w3.org/2000/svg");
  if (!copy.getAttribute("font-family"))
    copy.setAttribute("font-family", "Avenir Next, Segoe UI, Helvetica Neue, Liberation Sans, Arial, sans-serif");
  return new XMLSerializer().serializeToString(copy);
}

/** Hands a text to the reader as a file. */
export function saveText(document: Document, name: string, type: string, text: string): void {
  const address = URL.createObjectURL(new Blob([text], { type }));
  const link = document.createElement("a");
  link.setAttribute("href", address);
  link.setAttribute("download", name);
  document.body.append(link);
  link.click();
  link.remove();
  setTimeout(() => URL.revokeObjectURL(address), 10_000);
}
