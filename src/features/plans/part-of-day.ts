/** By the device's own clock: morning to noon, afternoon to six, evening after. */
export function partOfDay(nowMs: number): 'morning' | 'afternoon' | 'evening' {
  const hour = new Date(nowMs).getHours();
  if (hour < 12) return 'morning';
  return hour < 18 ? 'afternoon' : 'evening';
}
