// The live page: follows the study, hands it what the reader enters, keeps the address.

import type { Study } from "../study.ts";
import { type AddressLink, linkAddress } from "./address.ts";
import { studyTitle } from "./head.ts";
import { shownKind } from "./kind.ts";
import { markMeasured } from "./measured.ts";
import type { PageContext, PageOptions } from "./options.ts";
import { buildPage } from "./page.ts";

export interface MountedStudy {
  /** resolves when the live page has taken the place of what was painted */
  readonly ready: Promise<void>;
  /** brings the page up to date at once; a study that changed has it done anyway */
  refresh(): void;
  dispose(): void;
}

/** At most so long does a painted page wait for the study's first values, ms. */
const patience = 400;

/** Width for drawings: the report column, or what a narrow window leaves of it. */
function columnWidth(root: Element): number {
  const room = root.ownerDocument.documentElement.clientWidth;
  return room >= 820 || room === 0 ? 760 : Math.max(Math.min(room - 36, 760), 280);
}

/** Content that a painted page shows, by cell. */
function paintedContent(root: Element): Map<string, Element> {
  const painted = new Map<string, Element>();
  for (const block of root.querySelectorAll("[data-cell]")) {
    const content = block.querySelector(".content > *");
    const name = block.getAttribute("data-cell");
    if (content && name) painted.set(name, content.cloneNode(true) as Element);
  }
  return painted;
}

/** Puts `fresh` in the place of what the root holds; focus and opened code stay where they were. */
function takeOver(root: Element, fresh: readonly Element[]): void {
  const document = root.ownerDocument;
  const open = [...root.querySelectorAll("details[open][id]")].map((details) => details.id);
  const focused = root.contains(document.activeElement) ? document.activeElement?.id : undefined;
  root.replaceChildren(...fresh);
  for (const id of open) document.getElementById(id)?.setAttribute("open", "");
  if (focused) document.getElementById(focused)?.focus({ preventScroll: true });
}

/**
 * Mounts a study in `root`. Where `root` already holds a painted page (renderStudy), that stays until the words of the
 * live one are there, so nothing flickers.
 */
export function mountStudy(root: Element, study: Study, options: PageOptions = {}): MountedStudy {
  const document = root.ownerDocument;
  const window = document.defaultView!;
  const wasPainted = root.childElementCount > 0;
  const entered = new Map<string, string>();
  let frame = 0;
  let width = columnWidth(root);
  let mounted = false;
  let address: AddressLink | undefined;

  const flush = () => {
    frame = 0;
    const texts = [...entered];
    entered.clear();
    for (const [name, text] of texts) study.set(name, text);
    refresh();
    address?.write();
  };
  const context: PageContext = {
    document,
    study,
    options,
    ...(options.write ? { writing: options.write(document, study) } : {}),
    live: true,
    still: false,
    width: () => width,
    enter(name, text) {
      entered.set(name, text);
      frame ||= window.requestAnimationFrame(flush);
    },
    painted: paintedContent(root),
  };
  const page = buildPage(context);
  let measuring: ReturnType<typeof setTimeout> | undefined;
  const measureSoon = () => {
    // Not while a control turns: measuring makes the browser lay out the page at once.
    clearTimeout(measuring);
    measuring = setTimeout(() => markMeasured(root), 120);
  };
  const refresh = () => {
    page.update();
    if (!mounted) return;
    document.title = studyTitle(study);
    measureSoon();
  };

  if (options.address !== false) address = linkAddress(window, study, page.head.say);
  const worded = () =>
    study.cells.every((cell) => cell.value !== undefined || cell.state === "failed" || shownKind(cell) !== "note");
  let ready: () => void = () => {};
  const readiness = new Promise<void>((resolve) => (ready = resolve));
  const mount = () => {
    if (mounted) return;
    mounted = true;
    clearTimeout(timer);
    refresh();
    takeOver(root, page.elements);
    ready();
  };
  const timer = wasPainted ? setTimeout(mount, patience) : undefined;
  const leave = study.subscribe(() => {
    if (!mounted && !worded()) return;
    if (mounted) refresh();
    else mount();
    address?.write();
  });
  if (!wasPainted) mount();
  else void study.settled().then(mount);

  // Places on the page are gone to by script, because the address belongs to the givens.
  const go = (event: Event) => {
    const link = (event.target as Element | null)?.closest?.('a[href^="#"]');
    const target = link && document.getElementById((link.getAttribute("href") ?? "").slice(1));
    if (!target) return;
    event.preventDefault();
    target.scrollIntoView({ block: "start" });
    if (!target.hasAttribute("tabindex")) target.setAttribute("tabindex", "-1");
    target.focus({ preventScroll: true });
  };
  root.addEventListener("click", go);
  const resized = () => {
    measureSoon();
    const now = columnWidth(root);
    if (now === width) return;
    width = now;
    if (mounted) refresh();
  };
  window.addEventListener("resize", resized);

  return {
    ready: readiness,
    refresh,
    dispose() {
      leave();
      page.dispose();
      address?.dispose();
      clearTimeout(timer);
      clearTimeout(measuring);
      window.cancelAnimationFrame(frame);
      root.removeEventListener("click", go);
      window.removeEventListener("resize", resized);
    },
  };
}
