import type { FieldChange } from '@/lib/audit/changes-of';
import { formatChange, formatDate, formatGirthCm, formatMoment, formatNumber, formatVolumeMl } from '../ui/format';

const isNumber = (value: unknown): value is number | string => (typeof value === 'number' || typeof value === 'string') && value !== '' && Number.isFinite(Number(value));

const printers: Partial<Record<FieldChange['kind'], (value: number) => string>> = {
  length: (value) => formatGirthCm(value),
  weight: (value) => `${formatNumber(value / 1000, 1)} kg`,
  load: (value) => `${formatNumber(value / 1000, 1)} kg`,
  volume: (value) => formatVolumeMl(value),
  change: (value) => formatChange(value),
};

/** A value of the trail as a person reads it; nothing there reads 'nothing'. */
export function valueWords(value: unknown, kind: FieldChange['kind']): string {
  if (value === null || value === undefined || value === '') return 'nothing';
  const print = printers[kind];
  if (print && isNumber(value)) return print(Number(value));
  if (kind === 'day' && typeof value === 'string') return formatDate(value.slice(0, 10));
  if (kind === 'moment' && typeof value === 'string') return `${formatMoment(new Date(value), 'UTC')} UTC`;
  if (kind === 'girths' && Array.isArray(value)) return `${value.length} girths`;
  if (typeof value === 'boolean') return value ? 'yes' : 'no';
  if (Array.isArray(value)) return value.length === 0 ? 'none' : value.map(String).join(', ').slice(0, 160);
  if (typeof value === 'object')
    return (
      Object.entries(value)
        .map(([name, one]) => `${name.replaceAll('-', ' ')} ${typeof one === 'object' ? JSON.stringify(one) : String(one)}`)
        .join(', ')
        .slice(0, 160) || 'none'
    );
  return String(value).slice(0, 300);
}
