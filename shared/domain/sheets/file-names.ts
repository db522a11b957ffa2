import type { WallDate } from '../flavours';

/** A piece of a file name that every system and every drive takes: capital letters, digits and hyphens (ISO 9660 thinking). */
function portable(text: string): string {
  return text
    .normalize('NFKD')
    .replace(/\p{M}/gu, '')
    .toUpperCase()
    .replace(/[^A-Z0-9]+/g, '-')
    .replace(/^-+|-+$/g, '')
    .slice(0, 64);
}

export interface NamedDocument {
  code: string;
  version: number | null;
  /** The day it is for, or the person. */
  date?: WallDate;
  room?: string;
  person?: string;
}

/**
 * `SLUICE_V3_2027-03-08_RUN-SHEET.pdf`. A code without any Latin letter or digit becomes PRODUCTION.
 * @param what the document and its ending, such as `RUN-SHEET.pdf`.
 */
export function documentName(doc: NamedDocument, what: string): string {
  const pieces = [
    portable(doc.code) || 'PRODUCTION',
    doc.version === null ? 'DRAFT' : `V${doc.version}`,
    ...(doc.date === undefined ? [] : [doc.date]),
    ...(doc.room === undefined ? [] : [portable(doc.room)]),
    ...(doc.person === undefined ? [] : [portable(doc.person)]),
    what,
  ];
  return pieces.filter((piece) => piece !== '').join('_');
}
