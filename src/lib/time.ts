const pad = (value: number): string => String(value).padStart(2, '0');
const months = ['Jan', 'Feb', 'Mar', 'Apr', 'May', 'Jun', 'Jul', 'Aug', 'Sep', 'Oct', 'Nov', 'Dec'];
const weekdays = ['Sun', 'Mon', 'Tue', 'Wed', 'Thu', 'Fri', 'Sat'];

const midnight = (date: Date): number =>
  new Date(date.getFullYear(), date.getMonth(), date.getDate()).getTime();
const daysBetween = (from: Date, to: Date): number =>
  Math.round((midnight(to) - midnight(from)) / 86_400_000);

/** 09:41 by the clock on the wall. */
export function clockTime(iso: string): string {
  const date = new Date(iso);
  return `${pad(date.getHours())}:${pad(date.getMinutes())}`;
}

/** 4 Dec, with the year where it is not this one. */
export function shortDate(date: Date, now: Date): string {
  const day = `${date.getDate()} ${months[date.getMonth()] ?? ''}`;
  return date.getFullYear() === now.getFullYear() ? day : `${day} ${date.getFullYear()}`;
}

/** How long ago, in the words of somebody who looks back: 12 min ago, yesterday, Thu, 3 Nov. */
export function ago(iso: string, now: Date): string {
  const date = new Date(iso);
  const minutes = Math.floor((now.getTime() - date.getTime()) / 60_000);
  if (minutes < 1) return 'just now';
  if (minutes < 60) return `${minutes} min ago`;
  const days = daysBetween(date, now);
  if (days === 0) return clockTime(iso);
  if (days === 1) return 'yesterday';
  if (days < 7) return weekdays[date.getDay()] ?? '';
  return shortDate(date, now);
}

/** A day that something is due, and how many days late it is (0 where it is not). */
export function dueDay(day: string, now: Date): { text: string; late: number } {
  const [year = 0, month = 1, date = 1] = day.split('-').map(Number);
  const due = new Date(year, month - 1, date);
  const late = Math.max(0, daysBetween(due, now));
  const text = shortDate(due, now);
  return { text: late === 0 ? text : `${text}, ${late === 1 ? '1 day' : `${late} days`} late`, late };
}

/** "saved 09:41", with the day where it is not today's. */
export function savedWhen(iso: string, now: Date): string {
  const date = new Date(iso);
  return daysBetween(date, now) === 0 ? clockTime(iso) : `${shortDate(date, now)}, ${clockTime(iso)}`;
}
