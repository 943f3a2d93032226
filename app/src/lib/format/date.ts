const DAY = new Intl.DateTimeFormat('en-GB', { day: 'numeric', month: 'short', year: 'numeric' });
const TIME = new Intl.DateTimeFormat('en-GB', { hour: '2-digit', minute: '2-digit', hourCycle: 'h23' });
const LONG_DAY = new Intl.DateTimeFormat('en-GB', { weekday: 'long', day: 'numeric', month: 'long' });
const MONTH = new Intl.DateTimeFormat('en-GB', { month: 'short' });

type Moment = Date | string;

function toDate(moment: Moment): Date {
  return typeof moment === 'string' ? new Date(moment) : moment;
}

// "Sept" is what newer locale data gives; the look has three letters for every month.
function threeLetterMonth(text: string): string {
  return text.replace('Sept', 'Sep');
}

/** 12 Nov 2026, in the reader's own time zone. */
export function formatDate(moment: Moment): string {
  return threeLetterMonth(DAY.format(toDate(moment)));
}

/** 12 Nov 2026 of a calendar day, YYYY-MM-DD: the same day everywhere. */
export function formatDay(day: string): string {
  return formatDate(`${day}T00:00`);
}

/** 14:11 */
export function formatTime(moment: Moment): string {
  return TIME.format(toDate(moment));
}

/** 12 Nov 2026, 14:11 */
export function formatDateTime(moment: Moment): string {
  return `${formatDate(moment)}, ${formatTime(moment)}`;
}

/** Thursday, 19 November: the head of Today. */
export function formatLongDay(moment: Moment): string {
  const parts = new Map(LONG_DAY.formatToParts(toDate(moment)).map(({ type, value }) => [type, value]));
  return `${parts.get('weekday')}, ${parts.get('day')} ${parts.get('month')}`;
}

/** The two lines of a day in the archive's margin, and a key that is equal within one day. */
export function dayParts(moment: Moment): { key: string; day: string; month: string; year: string } {
  const date = toDate(moment);
  const year = String(date.getFullYear());
  const month = threeLetterMonth(MONTH.format(date));
  const day = String(date.getDate());
  return { key: `${year}-${date.getMonth() + 1}-${day}`, day, month, year };
}

/** today, yesterday, 3 days, 5 weeks: how long something has waited. */
export function formatWait(since: Moment, now: Date): string {
  const midnight = (date: Date) => new Date(date.getFullYear(), date.getMonth(), date.getDate()).getTime();
  const days = Math.round((midnight(now) - midnight(toDate(since))) / 86_400_000);
  if (days <= 0) return 'today';
  if (days === 1) return 'yesterday';
  return days < 21 ? `${days} days` : `${Math.floor(days / 7)} weeks`;
}
