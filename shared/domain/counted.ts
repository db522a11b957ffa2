/** `1 song`, `7 songs`, `1 piece of gear`: a number with its noun. `many` where an s does not do. */
export function counted(count: number, one: string, many = `${one}s`): string {
  return `${count} ${count === 1 ? one : many}`;
}
