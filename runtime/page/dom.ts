// Elements from data. Everything on the page is made here from tags, attributes and text: no markup is ever parsed,
// so a name, a note or a file's text can't become anything but text.

export type Attributes = Record<string, string | number | boolean | undefined>;
export type Child = Node | string | null | undefined | false;

const svgNamespace = "http://www.w3.org/2000/svg";

function dress(element: Element, attributes: Attributes, children: readonly Child[]): void {
  for (const [name, value] of Object.entries(attributes)) {
    if (value === undefined || value === false) continue;
    element.setAttribute(name, value === true ? "" : String(value));
  }
  for (const child of children) if (child !== null && child !== undefined && child !== false) element.append(child);
}

/** An HTML element with attributes (true: present, false or undefined: absent) and children (strings become text). */
export function html<K extends keyof HTMLElementTagNameMap>(
  document: Document,
  tag: K,
  attributes: Attributes = {},
  ...children: Child[]
): HTMLElementTagNameMap[K] {
  const element = document.createElement(tag);
  dress(element, attributes, children);
  return element;
}

/** An SVG element, likewise. */
export function svg(document: Document, tag: string, attributes: Attributes = {}, ...children: Child[]): SVGElement {
  const element = document.createElementNS(svgNamespace, tag) as SVGElement;
  dress(element, attributes, children);
  return element;
}

/** Makes `parent` hold exactly `children`, touching only what differs: a child that stays keeps its focus and its openness. */
export function holdChildren(parent: Element, children: readonly Element[]): void {
  const wanted = new Set<Element>(children);
  for (const child of [...parent.children]) if (!wanted.has(child)) child.remove();
  let next: Element | null = parent.firstElementChild;
  for (const child of children) {
    if (child === next) next = next.nextElementSibling;
    else parent.insertBefore(child, next);
  }
}

/** Sets or takes away an attribute, only when that changes something. */
export function setAttribute(element: Element, name: string, value: string | undefined): void {
  if (value === undefined) {
    if (element.hasAttribute(name)) element.removeAttribute(name);
  } else if (element.getAttribute(name) !== value) element.setAttribute(name, value);
}

/** Shows or hides, through the attribute. */
export function showWhen(element: Element, shown: boolean): void {
  setAttribute(element, "hidden", shown ? undefined : "");
}

/** A cell's or given's name in an id: two names never share one. */
export function nameId(name: string): string {
  return name.replace(/\W/g, (sign) => (sign === " " ? "-" : `-${sign.codePointAt(0)?.toString(16)}`));
}

/** Words in an id or a file name: letters, digits, hyphens. */
export function idPart(text: string): string {
  const part = text
    .toLowerCase()
    .normalize("NFKD")
    .replace(/\p{M}/gu, "")
    .replace(/[^a-z0-9]+/g, "-")
    .replace(/^-+|-+$/g, "");
  return part || "x";
}
