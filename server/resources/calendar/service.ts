import { createHash } from 'node:crypto';
import { Op } from 'sequelize';
import { calendarName } from '../../../shared/domain/calendar/call-text';
import { eventsOf } from '../../calendar/feed';
import { writeCalendar } from '../../calendar/write';
import type { Context } from '../../context';
import { Refusal } from '../../http/errors';
import { hashOf } from '../../http/tokens';
import type { LinkModel } from '../../models/productions';
import { publishedCallsOf } from '../plans/published';

export interface Feed {
  text: string;
  /** Of the content: it changes only when the calendar does. */
  tag: string;
  changedAt: Date;
}

/** How often the use of an address is written down, so that a busy calendar does not write at every reading. */
const USE_NOTED_EVERY = 60 * 60 * 1000;

/**
 * The calendar at a private address, always from the newest published version.
 * @param source the address itself, for the calendar to name.
 */
export async function readFeed(context: Context, token: string | undefined, source: string): Promise<Feed> {
  const link = await context.db.links.findOne({ where: { tokenHash: hashOf(token ?? ''), kind: 'calendar', revokedAt: null } });
  // An address that was withdrawn and one that never was answer alike.
  if (!link || link.personId === null)
    throw new Refusal('not-found', 'There is no calendar at this address. Ask the producer for a new one.');
  await noteUse(context, link);
  const published = await publishedCallsOf(context, link.productionId, link.personId);
  if (!published || published.outcome.cost === null) return emptyFeed(context, link, source);
  const { file, outcome, person, calls, publishedAt } = published;
  const { timezone } = file.production;
  const name = calendarName(file, person);
  return feedOf(writeCalendar({ name, timezone, source, events: eventsOf(file, outcome, person, calls) }), publishedAt);
}

/** Before anything is published the calendar is there, and empty. */
async function emptyFeed({ db }: Context, link: LinkModel, source: string): Promise<Feed> {
  const production = await db.productions.findOne({ where: { id: link.productionId }, rejectOnEmpty: true });
  return feedOf(writeCalendar({ name: production.title, timezone: production.timezone, source, events: [] }), link.createdAt);
}

function feedOf(text: string, changedAt: Date): Feed {
  return { text, tag: `"${createHash('sha256').update(text).digest('base64url').slice(0, 27)}"`, changedAt };
}

async function noteUse({ db, now }: Context, link: LinkModel): Promise<void> {
  const at = now();
  const before = new Date(at.getTime() - USE_NOTED_EVERY);
  if (link.lastUsedAt !== null && link.lastUsedAt > before) return;
  await db.links.update(
    { lastUsedAt: at },
    { where: { id: link.id, [Op.or]: [{ lastUsedAt: null }, { lastUsedAt: { [Op.lte]: before } }] } },
  );
}
