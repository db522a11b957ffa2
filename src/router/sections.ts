/** The sections of a production, in the order of the work. */
export const sections = [
  { name: 'songs', label: 'Songs' },
  { name: 'people', label: 'People' },
  { name: 'rooms', label: 'Rooms' },
  { name: 'plan', label: 'Plan' },
  { name: 'sheets', label: 'Sheets' },
] as const;
