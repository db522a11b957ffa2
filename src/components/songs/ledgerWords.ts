import type { ProductionFile, Song } from '../../../shared/contracts/resources';
import type { PassId } from '../../../shared/domain/flavours';
import type { LedgerCell } from '../../../shared/domain/ledgerTable';
import { passInWords } from '../../../shared/domain/passes';
import { effectivePasses } from '../../../shared/planner/derive';

/** `G capo 2 · 118`, `Am · 6/8 72`, `free → 84`: what is known of a song in one small line. */
export function songFacts(song: Song): string {
  const key = [song.key, song.capo ? `capo ${song.capo}` : undefined].filter(Boolean).join(' ');
  const meter = song.meter && song.meter !== '4/4' ? `${song.meter} ` : '';
  const tempo = song.free ? (song.tempo ? `free → ${song.tempo}` : 'free') : (song.tempo ?? '');
  return [key, `${meter}${tempo}`.trim()].filter(Boolean).join(' · ');
}

const MODE_SPOKEN = { live: 'live', guide: 'guide', overdub: 'overdub', double: 'double', stack: 'stack', repair: 'repair' } as const;

/** What a screen reader says of a cell: `Weir Song, Drums: live, Tobin, 45 minutes`. */
export function cellInWords(song: string, part: string, cell: LedgerCell | undefined, shortName: (person: string) => string): string {
  if (!cell) return `${song}, ${part}: not there`;
  const said = [
    cell.part.mode ? MODE_SPOKEN[cell.part.mode] : 'mode open',
    ...(cell.part.players ?? []).map(shortName),
    cell.minutes ? `${cell.minutes[1]} minutes` : undefined,
    cell.alarm ? `look: ${cell.alarm}` : undefined,
  ];
  return `${song}, ${part}: ${said.filter((word) => word !== undefined).join(', ')}`;
}

/** What to do about what wants to be looked at. */
export function alarmInWords(alarm: string): string {
  if (alarm === 'no map') return 'The tempo is free and there is no click: make a tempo map from the take before anything is added to it.';
  if (alarm === 'nobody') return 'Nobody plays it yet. Choose the players, so that they are called.';
  return 'Songs at level 0 or 1 are rehearsed first; in the studio they cost the most.';
}

/** The passes that come before a pass, in words. */
export function followsInWords(file: ProductionFile, id: PassId | null): string[] {
  const passes = effectivePasses(file);
  const pass = passes.find((candidate) => candidate.id === id);
  return (pass?.after ?? []).map((need) => {
    if ('event' in need) return file.events.find((event) => event.id === need.event)?.name ?? need.event;
    const before = passes.find((candidate) => candidate.id === need.pass);
    return `${before ? passInWords(file, before) : need.pass}${need.kind === 'approved' ? ', approved' : ''}`;
  });
}
