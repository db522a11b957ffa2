import { sheetsPlan, type SheetsPlan } from '../../shared/contracts/sheets';
import type { Paper } from '../../shared/domain/sheets/sheet';
import { request, requestFile } from './http';

const at = (production: string, what: string, query: Record<string, string>): string =>
  `/api/productions/${encodeURIComponent(production)}/sheets/${what}?${new URLSearchParams(query)}`;

/** The plan that the sheets show: the one named, else the newest version, else the newest draft. */
export const readSheetsPlan = (production: string, named?: string): Promise<SheetsPlan> =>
  request(at(production, 'plan', named === undefined ? {} : { version: named }), sheetsPlan);

/** What is printed: the run sheet of a date or the call sheet of a person. */
export type SheetSubject = { kind: 'run'; date: string } | { kind: 'call'; person: string };

export const fetchPdf = (
  production: string,
  version: string,
  subject: SheetSubject,
  paper: Paper,
): Promise<{ name: string; content: Blob }> =>
  requestFile(
    subject.kind === 'run'
      ? at(production, 'run-sheet.pdf', { version, paper, date: subject.date })
      : at(production, 'call-sheet.pdf', { version, paper, person: subject.person }),
  );
