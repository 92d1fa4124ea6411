// Markdown to elements, through the tokens of `marked`; never through markup. Raw HTML in a note shows as the text it is,
// links lead to http, https, mailto or this page only, pictures come from the note itself or not at all.

import { Lexer, lexer, type Token, type Tokens } from "marked";
import { html } from "./dom.ts";
import { typeset } from "./typography.ts";

const entities: Record<string, string> = {
  amp: "&",
  lt: "<",
  gt: ">",
  quot: '"',
  nbsp: "\u00a0",
  thinsp: "\u2009",
  minus: "−",
  times: "×",
  deg: "°",
  micro: "µ",
  ndash: "–",
  mdash: "—",
  plusmn: "±",
  le: "≤",
  ge: "≥",
  lambda: "λ",
  eta: "η",
  theta: "θ",
};

/** Decoding happens once, on text that is then set as text: an entity can't open a tag. */
function decode(text: string): string {
  return text.replace(/&(?:#(\d{1,7})|#x([\da-f]{1,6})|([a-z]+));/gi, (whole, decimal, hex, name) => {
    if (name) return entities[name] ?? whole;
    const code = Number.parseInt(decimal ?? hex, decimal ? 10 : 16);
    return code > 0 && code <= 0x10ffff ? String.fromCodePoint(code) : whole;
  });
}

/** The address if it may be followed, or undefined. */
export function safeLink(href: string): string | undefined {
  const trimmed = decode(href).trim();
  // biome-ignore lint/suspicious/noControlCharactersInRegex: browsers drop these inside a scheme, so they must not hide one
  if (/[\u0000-\u0020\u007f]/.test(trimmed)) return undefined;
  return /^(?:https?:\/\/|mailto:|#)/i.test(trimmed) ? trimmed : undefined;
}

function safePicture(href: string): string | undefined {
  return /^data:image\/(?:png|jpeg|gif|webp|avif);base64,[a-z\d+/=]+$/i.test(href) ? href : undefined;
}

interface Setting {
  document: Document;
  /** level that `##` becomes; the first heading of a section is 2 */
  firstHeading: number;
  headings: number;
}

function inline(setting: Setting, tokens: readonly Token[] | undefined): Node[] {
  return (tokens ?? []).flatMap((token) => inlineToken(setting, token as Tokens.Generic));
}

function inlineToken(setting: Setting, token: Tokens.Generic): Node[] {
  const { document } = setting;
  const within = () => inline(setting, token.tokens);
  switch (token.type) {
    case "strong":
    case "em":
    case "del":
      return [html(document, token.type, {}, ...within())];
    case "codespan":
      return [html(document, "code", {}, token.text)];
    case "br":
      return [html(document, "br")];
    case "link": {
      const href = safeLink(token.href);
      return href
        ? [html(document, "a", { href, rel: /^#/.test(href) ? undefined : "noopener noreferrer" }, ...within())]
        : within();
    }
    case "image": {
      const src = safePicture(token.href);
      return [src ? html(document, "img", { src, alt: token.text }) : document.createTextNode(token.text)];
    }
    case "html":
      return [document.createTextNode(token.raw)];
    case "escape":
      return [document.createTextNode(token.text)];
    default:
      return token.tokens ? within() : [document.createTextNode(typeset(decode(token.text ?? token.raw)))];
  }
}

function blocks(setting: Setting, tokens: readonly Token[]): Node[] {
  return tokens.flatMap((token) => blockToken(setting, token as Tokens.Generic));
}

function blockToken(setting: Setting, token: Tokens.Generic): Node[] {
  const { document } = setting;
  switch (token.type) {
    case "space":
    case "def":
      return [];
    case "heading": {
      const first = setting.headings++ === 0 && token.depth <= 2;
      const level = first ? setting.firstHeading : Math.min(Math.max(token.depth, 3), 4);
      return [html(document, `h${level}` as "h2", {}, ...inline(setting, token.tokens))];
    }
    case "paragraph":
      return [html(document, "p", {}, ...inline(setting, token.tokens))];
    case "blockquote":
      return [html(document, "blockquote", {}, ...blocks(setting, token.tokens ?? []))];
    case "code":
      return [html(document, "pre", { tabindex: 0 }, html(document, "code", {}, token.text))];
    case "hr":
      return [html(document, "hr")];
    case "list": {
      const items = (token as Tokens.List).items.map((item) =>
        html(document, "li", {}, ...blocks(setting, item.tokens)),
      );
      return [
        html(
          document,
          token.ordered ? "ol" : "ul",
          { start: token.ordered && token.start !== 1 ? token.start : undefined },
          ...items,
        ),
      ];
    }
    case "table": {
      const table = token as Tokens.Table;
      const head = table.header.map((cell) => html(document, "th", { scope: "col" }, ...inline(setting, cell.tokens)));
      const rows = table.rows.map((row) =>
        html(document, "tr", {}, ...row.map((cell) => html(document, "td", {}, ...inline(setting, cell.tokens)))),
      );
      return [
        html(
          document,
          "table",
          { class: "written" },
          html(document, "thead", {}, html(document, "tr", {}, ...head)),
          html(document, "tbody", {}, ...rows),
        ),
      ];
    }
    case "html":
      return [html(document, "p", {}, token.raw.trim())];
    default:
      return inlineToken(setting, token);
  }
}

/** Prose as block elements. `firstHeading` is the level of a heading that opens it. */
export function prose(document: Document, markdown: string, firstHeading = 2): Node[] {
  return blocks({ document, firstHeading, headings: 0 }, lexer(markdown));
}

/** One line of prose: emphasis, code and links, no blocks. */
export function phrase(document: Document, text: string): Node[] {
  return inline({ document, firstHeading: 2, headings: 0 }, Lexer.lexInline(text));
}

/** The words of a heading that opens a note, or undefined when it opens with none. */
export function openingHeading(markdown: string): string | undefined {
  return /^\s*##? +(.+?)\s*#*\s*(?:\n|$)/.exec(markdown)?.[1]?.replace(/[*_`]/g, "");
}
