import type { SiteQueries } from '@/lib/queries/list-queries';

const width = 232;
const mostDays = 31;
const rowPx = 48;

/** Open queries of each site by age on one axis, with the limit; those that were answered on a line of their own. */
export function SiteAges({ sites, limitDays, answeredWords }: { sites: readonly SiteQueries[]; limitDays: number; answeredWords: string }) {
  const answered = sites.reduce((sum, site) => sum + site.answered, 0);
  const lines = [
    ...sites.map(({ siteId, siteName, open, openAges }) => ({ key: siteId, name: siteName, words: `${open} open`, ages: openAges, mayBeLate: true })),
    { key: 'answered', name: 'Answered', words: `${answered} ${answeredWords}`, ages: [...new Set(sites.flatMap(({ answeredAges }) => answeredAges))], mayBeLate: false },
  ];
  const height = lines.length * rowPx + 30;
  const x = (days: number) => 1 + (Math.min(days, mostDays) / mostDays) * (width - 4);
  const label = lines.map(({ name, words }) => `${name}: ${words}`).join('; ');
  return (
    <svg className="site-ages mt-3 h-auto max-w-full" width={width} height={height} viewBox={`0 0 ${width} ${height}`} role="img" aria-label={`${label}. The limit is ${limitDays} days.`}>
      {lines.map(({ key, name, words, ages, mayBeLate }, index) => {
        const y = index * rowPx + 38;
        return (
          <g key={key}>
            <text x="0" y={y - 16} className="site-name">
              {name}
            </text>
            <text x={width} y={y - 16} textAnchor="end">
              {words}
            </text>
            <path d={`M0 ${y}H${width}`} stroke="var(--edge)" />
            {ages.map((days) => (
              <rect key={days} x={x(days) - 1.5} y={y - 8} width="4" height="8" fill={mayBeLate && days > limitDays ? 'var(--needs)' : 'var(--act)'} />
            ))}
          </g>
        );
      })}
      <path d={`M${x(limitDays)} 4V${lines.length * rowPx + 2}`} stroke="var(--note)" strokeWidth="1.5" strokeDasharray="6 4" />
      <text x="0" y={height - 8}>
        0
      </text>
      <text x={x(limitDays)} y={height - 8} textAnchor="middle" className="limit-words">
        limit {limitDays}
      </text>
      <text x={width} y={height - 8} textAnchor="end">
        31 days or more
      </text>
    </svg>
  );
}
