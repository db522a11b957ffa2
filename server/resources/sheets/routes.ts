import type { Response } from 'express';
import { z } from 'zod';
import { wallDate } from '../../../shared/contracts/values';
import type { Context } from '../../context';
import type { Routes } from '../../http/routes';
import { sheetsPlanOf } from './shown';
import { type PrintedSheet, printCallSheet, printRunSheet } from './service';

const key = z.string().max(64, { error: 'an id' });
const asked = {
  version: z.string().max(60).optional(),
  paper: z.enum(['A4', 'Letter'], { error: 'A4 or Letter' }).optional(),
};
const planQuery = z.object({ version: asked.version });
const runSheetQuery = z.object({ ...asked, date: wallDate, room: key.optional() });
const callSheetQuery = z.object({ ...asked, person: key.optional() });

function sendPdf(response: Response, sheet: PrintedSheet): void {
  response.set({ 'Content-Type': 'application/pdf', 'Content-Disposition': `attachment; filename="${sheet.name}"` });
  response.send(Buffer.from(sheet.content));
}

export function sheetRoutes(routes: Routes, context: Context): void {
  routes.member('get', '/api/productions/:production/sheets/plan', 'printOwn', {
    query: planQuery,
    run: ({ member, query }) => sheetsPlanOf(context, member, query.version),
  });
  routes.member('get', '/api/productions/:production/sheets/run-sheet.pdf', 'print', {
    query: runSheetQuery,
    run: ({ member, query }) => printRunSheet(context, member, query),
    send: sendPdf,
  });
  routes.member('get', '/api/productions/:production/sheets/call-sheet.pdf', 'printOwn', {
    query: callSheetQuery,
    run: ({ member, query }) => printCallSheet(context, member, query),
    send: sendPdf,
  });
}
