// Elements as HTML text. Written here because a headless document's own way leaves the text of a textarea unescaped,
// and a given's text must not be able to end its field.

const empty = new Set([
  "area",
  "base",
  "br",
  "col",
  "embed",
  "hr",
  "img",
  "input",
  "link",
  "meta",
  "source",
  "track",
  "wbr",
]);

function escapeText(text: string): string {
  return text.replaceAll("&", "&amp;").replaceAll("<", "&lt;").replaceAll(">", "&gt;").replaceAll("\u00a0", "&nbsp;");
}

/** An element and all in it, every text and attribute escaped. A script is left out, a style keeps its text as it is. */
export function serialize(node: Node): string {
  if (node.nodeType === 3) return escapeText(node.textContent ?? "");
  if (node.nodeType !== 1) return "";
  const element = node as Element;
  const name = element.localName;
  if (name === "script") return "";
  const attributes = [...element.attributes]
    .filter((attribute) => !/^on/i.test(attribute.name))
    .map((attribute) => ` ${attribute.name}="${escapeText(attribute.value).replaceAll('"', "&quot;")}"`)
    .join("");
  if (empty.has(name)) return `<${name}${attributes}>`;
  if (name === "style")
    return `<style${attributes}>${(element.textContent ?? "").replace(/<(?=[/!])/g, "\\3c ")}</style>`;
  // The first line break in a field or in preformatted text is the parser's, not the text's.
  const lead = (name === "textarea" || name === "pre") && element.textContent?.startsWith("\n") ? "\n" : "";
  return `<${name}${attributes}>${lead}${[...element.childNodes].map(serialize).join("")}</${name}>`;
}
