/**
 * Flavoured primitives: a plain string or number may be used where a flavour is wanted, but one flavour never where another is.
 * They cost nothing at run time.
 */
export type Flavour<Base, Name extends string> = Base & { readonly __flavour?: Name };

/** Ids of a production file, unique within their list: `[a-z0-9][a-z0-9-]*`, at most 64 characters. */
export type RoomId = Flavour<string, 'room'>;
export type PersonId = Flavour<string, 'person'>;
export type GearId = Flavour<string, 'gear'>;
export type SetupId = Flavour<string, 'setup'>;
export type SongId = Flavour<string, 'song'>;
export type PartId = Flavour<string, 'part'>;
export type PassId = Flavour<string, 'pass'>;
export type EventId = Flavour<string, 'event'>;

/** Elapsed minutes since 1970-01-01T00:00Z; differences are true lengths, also across a clock change. */
export type Minute = Flavour<number, 'minute'>;
/** A length in whole minutes. */
export type Minutes = Flavour<number, 'minutes'>;
/** Metres. */
export type Metre = Flavour<number, 'metre'>;

/** Wall-clock time in the production's zone, `2027-03-08T10:00`. */
export type WallTime = Flavour<string, 'wall-time'>;
/** Calendar date, `2027-03-08`. */
export type WallDate = Flavour<string, 'wall-date'>;
