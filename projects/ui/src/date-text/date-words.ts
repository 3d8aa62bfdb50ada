const DAY = new Intl.DateTimeFormat('en-GB', { day: 'numeric', month: 'long' });
const DAY_WITH_YEAR = new Intl.DateTimeFormat('en-GB', { day: 'numeric', month: 'long', year: 'numeric' });
const TIME = new Intl.DateTimeFormat('en-GB', { hour: '2-digit', minute: '2-digit' });

/** A day as people say it: "4 March", with the year when it isn't this one. In the browser's own zone. */
export function dayWords(timestamp: string, now: Date): string {
  const date = new Date(timestamp);
  return (date.getFullYear() === now.getFullYear() ? DAY : DAY_WITH_YEAR).format(date);
}

/** A moment: "4 March, 14:02"; only the time when it is today. */
export function momentWords(timestamp: string, now: Date): string {
  const date = new Date(timestamp);
  return date.toDateString() === now.toDateString()
    ? `today, ${TIME.format(date)}`
    : `${dayWords(timestamp, now)}, ${TIME.format(date)}`;
}
