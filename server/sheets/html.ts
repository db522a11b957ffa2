import { createSSRApp, type Component } from 'vue';
import { renderToString } from 'vue/server-renderer';
import type { CallSheet, RunSheet } from '../../shared/domain/sheets/sheet';
import CallSheetDocument from '../../templates/CallSheet.vue';
import RunSheetDocument from '../../templates/RunSheet.vue';
import { pageCss } from '../../templates/page-css';

/** Nothing on a printed page may load or run: what is drawn comes with the document. */
const POLICY = "default-src 'none'; style-src 'unsafe-inline'; font-src data:";

function escapeHtml(text: string): string {
  return text.replace(/[&<>"']/g, (sign) => `&#${sign.codePointAt(0)};`);
}

async function documentOf(component: Component, sheet: RunSheet | CallSheet, styles: string): Promise<string> {
  const { head } = sheet;
  const body = await renderToString(createSSRApp(component, { sheet }));
  return `<!doctype html>
<html lang="en"><head><meta charset="utf-8"><meta http-equiv="Content-Security-Policy" content="${POLICY}">
<title>${escapeHtml(`${head.title}: ${head.what.toLowerCase()} ${head.of}, ${head.edition}`)}</title>
<style>${styles}${pageCss(head)}</style></head>
<body>${body}</body></html>`;
}

/** The run sheet of one day as a document of its own, fonts and styles included. */
export function runSheetHtml(sheet: RunSheet, styles: string): Promise<string> {
  return documentOf(RunSheetDocument, sheet, styles);
}

/** The call sheet of one person as a document of its own. */
export function callSheetHtml(sheet: CallSheet, styles: string): Promise<string> {
  return documentOf(CallSheetDocument, sheet, styles);
}
