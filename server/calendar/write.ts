import ical, { escape, ICalEventStatus } from 'ical-generator';
import { Temporal } from 'temporal-polyfill';
import { tzlib_get_ical_block as timezoneBlock } from 'timezones-ical-library';
import type { WallTime } from '../../shared/domain/flavours';

/** One call in a calendar. Times are wall clock of the production. */
export interface CalendarEvent {
  uid: string;
  /** Rises whenever time or status changes. */
  sequence: number;
  /** When this call last changed; not when it was read. */
  changedAt: Date;
  status: 'confirmed' | 'tentative' | 'cancelled';
  from: WallTime;
  to: WallTime;
  summary: string;
  location: string;
  description: string;
}

export interface CalendarFeed {
  name: string;
  timezone: string;
  /** Where the feed itself is, for a subscription. */
  source?: string;
  events: readonly CalendarEvent[];
}

/** How often a calendar may ask again; a floor, not a request to hurry (RFC 7986, 5.7). */
const REFRESH_SECONDS = 6 * 3600;

const STATUS = {
  confirmed: ICalEventStatus.CONFIRMED,
  tentative: ICalEventStatus.TENTATIVE,
  cancelled: ICalEventStatus.CANCELLED,
} as const satisfies Record<CalendarEvent['status'], ICalEventStatus>;

/** The VTIMEZONE of a zone, or null where the list does not know it: then times are written in UTC. */
function vtimezone(zone: string): string | null {
  const [block] = [timezoneBlock(zone)].flat();
  // Of a zone that is another's twin the list gives the twin's name.
  return block?.startsWith('BEGIN:VTIMEZONE') ? block.trim().replace(/^TZID:.*$/m, `TZID:${zone}`) : null;
}

/** Whether the clock of the zone shows that time twice. Readers differ in which one they take, whatever RFC 5545 (3.3.5) says. */
function isRepeated(wall: WallTime, zone: string): boolean {
  const time = Temporal.PlainDateTime.from(wall);
  return !time.toZonedDateTime(zone, { disambiguation: 'earlier' }).equals(time.toZonedDateTime(zone, { disambiguation: 'later' }));
}

/**
 * Writes a calendar by RFC 5545 and 7986: a plain snapshot without METHOD, local times with the zone's rules, cancelled calls kept.
 * A time that the clock shows twice is the first one (RFC 5545, 3.3.5), as everywhere in the plan, and written in UTC.
 */
export function writeCalendar(feed: CalendarFeed): string {
  const block = vtimezone(feed.timezone);
  const calendar = ical({
    prodId: '//Redpoll//Calls//EN',
    // The library writes the name as it is.
    name: escape(feed.name, false),
    ttl: REFRESH_SECONDS,
    ...(feed.source === undefined ? {} : { source: feed.source }),
  });
  for (const event of feed.events) {
    const instant = (wall: WallTime) => Temporal.PlainDateTime.from(wall).toZonedDateTime(feed.timezone);
    calendar.createEvent({
      id: event.uid,
      sequence: event.sequence,
      stamp: event.changedAt,
      lastModified: event.changedAt,
      start: instant(event.from),
      end: instant(event.to),
      timezone: block === null || [event.from, event.to].some((wall) => isRepeated(wall, feed.timezone)) ? null : feed.timezone,
      summary: event.summary,
      location: event.location,
      description: event.description,
      status: STATUS[event.status],
    });
  }
  return withZone(`${calendar.toString()}\r\n`, feed.timezone, block);
}

/**
 * Puts the zone in front of the first event: properties of a calendar come before its components, and a zone alone keeps an empty
 * calendar valid. X-WR-TIMEZONE is what many readers still look for (common practice, no source).
 */
function withZone(text: string, zone: string, block: string | null): string {
  const at = text.search(/^(?:BEGIN:VEVENT|END:VCALENDAR)\r$/m);
  return `${text.slice(0, at)}X-WR-TIMEZONE:${zone}\r\n${block === null ? '' : `${block}\r\n`}${text.slice(at)}`;
}
