import type { SafeHtml } from './html.ts';
import { REPORT_CSS } from './reportStyle.ts';

const HOLDER = 'report-print';
/** On paper the report alone, on the screen nothing of it. */
const ALONE_CSS = `
@media screen { .${HOLDER} { display: none; } }
@media print {
  body > :not(.${HOLDER}) { display: none !important; }
  :root { color-scheme: light !important; }
  html, body { height: auto; overflow: visible; background: #fff; }
}`;

/** Takes the last report out of the page again. */
let takeOut = () => {};

/**
 * Prints the markup of `reportMarkup` from the page it is called in, and leaves the page as it was. Its style comes as a
 * constructed sheet, which a policy without inline styles allows.
 * @param print opens the browser's dialogue; tests put their own in
 */
export async function printReport(
  markup: SafeHtml,
  print: () => void | Promise<void> = () => window.print(),
): Promise<void> {
  takeOut();
  const sheet = new CSSStyleSheet();
  sheet.replaceSync(`${REPORT_CSS}${ALONE_CSS}`);
  const holder = document.createElement('div');
  holder.className = HOLDER;
  // Safe by type: every text in it was escaped when it was built.
  holder.innerHTML = markup.text;
  document.adoptedStyleSheets = [...document.adoptedStyleSheets, sheet];
  document.body.append(holder);
  takeOut = () => {
    holder.remove();
    document.adoptedStyleSheets = document.adoptedStyleSheets.filter((other) => other !== sheet);
    takeOut = () => {};
  };
  // A picture that is not decoded yet prints as nothing; one that cannot be is no reason not to print.
  await Promise.allSettled(Array.from(holder.querySelectorAll('img'), (image) => image.decode()));
  // Some browsers return at once and lay the page out later: only this event says that it is on paper.
  addEventListener('afterprint', () => takeOut(), { once: true });
  await print();
}
