interface Named {
  id: string;
  name?: string;
  short?: string;
}

/** Things to pick from, by the name they go by. */
export const picks = (list: readonly Named[]): { value: string; label: string }[] =>
  list.map(({ id, name, short }) => ({ value: id, label: short ?? name ?? id }));

/** The same, with a way to choose nothing. */
export const picksOrNothing = (list: readonly Named[], nothing: string): { value: string; label: string }[] => [
  { value: '', label: nothing },
  ...picks(list),
];

/** One field of a group (limits, fee, price); a group without fields is cleared. */
export function withGroup<Group extends object>(
  before: Group | undefined,
  fields: { [Field in keyof Group]?: Group[Field] | null },
): Group | null {
  const kept = Object.entries({ ...before, ...fields }).filter(([, value]) => value !== null && value !== undefined);
  return kept.length > 0 ? (Object.fromEntries(kept) as Group) : null;
}
