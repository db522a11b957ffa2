import type { Minute, Minutes, RoomId, SetupId } from '../../domain/flavours';
import type { Span } from '../model';
import { mostOfRoomDay, type PauseRules } from '../pauses';
import type { OpenWindow } from './statement';
import { eventsThatHold, roundUp, ruleOf, type View } from './view';

/** The least minutes of rigs and changeovers that bring a bare room to a set-up, over other set-ups where that is shorter. */
export function buildFromBare(view: View, setup: SetupId): Minutes {
  const { setups } = view.statement;
  const least = new Map<SetupId, Minutes>([...setups.values()].map(({ id, rig }) => [id, roundUp(view, rig ?? 0)]));
  // Each round allows one more changeover; no shortest way has more of them than there are set-ups.
  for (let round = 0; round < setups.size; round++) {
    let shorter = false;
    for (const from of setups.keys())
      for (const to of setups.keys()) {
        const through = least.get(from)! + changeoverBetween(view, from, to);
        if (from === to || through >= least.get(to)!) continue;
        least.set(to, through);
        shorter = true;
      }
    if (!shorter) break;
  }
  return least.get(setup) ?? 0;
}

export function changeoverBetween(view: View, from: SetupId, to: SetupId): Minutes {
  const entry = view.statement.file.changeovers.findLast((change) => change.from === from && change.to === to);
  return roundUp(view, entry?.minutes ?? ruleOf(view, 'changeover'));
}

/** The least minutes of changing to a set-up, or of rigging it, whatever stands before. */
export function leastEntry(view: View, setup: SetupId): Minutes {
  const others = [...view.statement.setups.keys()].filter((other) => other !== setup);
  const rig = roundUp(view, view.statement.setups.get(setup)?.rig ?? 0);
  return others.reduce((least, other) => Math.min(least, changeoverBetween(view, other, setup)), rig);
}

/** The rules of meals and breaks that hold. */
export function pauseRules(view: View): PauseRules {
  return {
    meal: ruleOf(view, 'meal'),
    mealAfter: ruleOf(view, 'mealAfter'),
    break: ruleOf(view, 'break'),
    breakAfter: ruleOf(view, 'breakAfter'),
  };
}

/** Minutes of events that block the room within a stretch. */
export function eventMinutes(view: View, room: RoomId, within: Span): Minutes {
  const facts = view.statement.rooms.get(room);
  let sum = 0;
  let at: Minute = within.from;
  const events = [...(facts?.events ?? [])].filter((event) => event.to > within.from && event.from < within.to);
  for (const event of eventsThatHold(view, events).sort((one, other) => one.from - other.from)) {
    const from = Math.max(at, event.from);
    const to = Math.min(within.to, event.to);
    if (to > from) sum += to - from;
    at = Math.max(at, to);
  }
  return sum;
}

/** The most minutes of work, wrap included, that a window holds beside its events and the pauses that so much work asks for. */
export function mostWork(view: View, room: RoomId, window: OpenWindow, longest: Minutes): Minutes {
  return mostOfRoomDay(pauseRules(view), window.to - window.from, eventMinutes(view, room, window), longest);
}

/** Reserve that so many pass minutes in one room-day ask for. */
export function reserveFor(view: View, passMinutes: Minutes): Minutes {
  const step = ruleOf(view, 'step');
  return Math.floor((ruleOf(view, 'reserve') * passMinutes) / step) * step;
}
