// Where things came to stand on paper, read from a PDF: links put into the page before printing keep their address, their page
// and their place. Chromium writes pages and links as plain objects; only their contents are packed.

export interface PlacedLink {
  /** 0-based */
  page: number;
  /** from the top of the page, pt */
  top: number;
  left: number;
}

/** All links with an outside address, by address. */
export function pdfLinks(pdf: Buffer): Map<string, PlacedLink> {
  const text = pdf.toString("latin1");
  const objects = new Map<string, string>();
  for (const match of text.matchAll(/(\d+) 0 obj\s*([\s\S]*?)endobj/g)) objects.set(match[1]!, match[2]!);
  const body = (reference: string | undefined) => objects.get(reference ?? "") ?? "";
  const list = (source: string, key: string) =>
    [...(new RegExp(`/${key}\\s*\\[([^\\]]*)\\]`).exec(source)?.[1] ?? "").matchAll(/(\d+) 0 R/g)].map(
      (match) => match[1]!,
    );

  const pages: string[] = [];
  const visit = (reference: string) => {
    const node = body(reference);
    if (/\/Type\s*\/Pages\b/.test(node)) for (const kid of list(node, "Kids")) visit(kid);
    else pages.push(node);
  };
  const catalog = [...objects.values()].find((object) => /\/Type\s*\/Catalog\b/.test(object)) ?? "";
  visit(/\/Pages\s+(\d+) 0 R/.exec(catalog)?.[1] ?? "");

  const links = new Map<string, PlacedLink>();
  pages.forEach((page, index) => {
    const height = Number(/\/MediaBox\s*\[\s*\S+\s+\S+\s+\S+\s+([\d.]+)/.exec(page)?.[1]);
    for (const reference of list(page, "Annots")) {
      const annotation = body(reference);
      const address = /\/URI\s*\(([^)]*)\)/.exec(annotation)?.[1];
      const rectangle = /\/Rect\s*\[([^\]]*)\]/.exec(annotation)?.[1]?.trim().split(/\s+/).map(Number);
      if (address && rectangle) links.set(address, { page: index, top: height - rectangle[3]!, left: rectangle[0]! });
    }
  });
  return links;
}
