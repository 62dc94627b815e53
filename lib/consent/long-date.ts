import { localDate } from '@/lib/work/time';

const months = ['Jan', 'Feb', 'Mar', 'Apr', 'May', 'Jun', 'Jul', 'Aug', 'Sep', 'Oct', 'Nov', 'Dec'];

/** '3 Mar 2027, 19:06 (Europe/London)': a printed moment carries its zone. */
export function formatLong(at: Date, zone: string): string {
  const [year, month, day] = localDate(at, zone).split('-').map(Number);
  const time = new Intl.DateTimeFormat('en-GB', { timeZone: zone, hour: '2-digit', minute: '2-digit', hourCycle: 'h23' }).format(at);
  return `${day} ${months[(month ?? 1) - 1]} ${year}, ${time} (${zone})`;
}
