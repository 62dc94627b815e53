import { formatCount } from '../ui/format';
import { PlainTable } from '../ui/plain-table';
import { ChartFigure } from './chart-figure';
import { fillOf, Patterns, usePatterns } from './patterns';

export interface FlowStage {
  /** 'Assessed', 'Eligible', 'Consented'. */
  name: string;
  people: number;
  /** Who left before the next stage: '55 not eligible', and under it the reasons. */
  out?: { words: string; detail?: string };
}

export interface FlowDiagramProps {
  stages: readonly FlowStage[];
  finding: string;
}

const top = 26;

/** Participant flow as a river: width is people; what leaves runs out below and is named. */
export function FlowDiagram({ stages, finding }: FlowDiagramProps) {
  const ids = usePatterns();
  const most = Math.max(1, ...stages.map(({ people }) => people));
  const step = (990 - 2 - 96) / Math.max(1, stages.length - 1);
  const drawn = stages.map((stage, index) => ({ ...stage, x: 2 + index * step, foot: top + (120 * stage.people) / most }));
  return (
    <ChartFigure label="Participant flow" finding={finding} least={760} table={<FlowTable stages={stages} />}>
      <svg width="100%" className="max-w-[1000px]" viewBox="0 0 1000 206" role="img" aria-label={finding}>
        <Patterns ids={ids} water={5} />
        <path d={river(drawn)} fill={fillOf(ids.water)} />
        {drawn.map((stage) => (
          <Stage key={stage.name} stage={stage} />
        ))}
      </svg>
    </ChartFigure>
  );
}

type Drawn = FlowStage & { x: number; foot: number };

/** Each reach keeps what goes on, and lets the rest run out under its first part. */
function river(stages: readonly Drawn[]): string {
  return stages
    .map((stage, index) => {
      const next = stages[index + 1];
      if (!next) return `M${stage.x} ${top}H${stage.x + 96}V${stage.foot}H${stage.x}Z`;
      const bend = next.x - stage.x;
      return `M${stage.x} ${top}H${next.x}V${next.foot}C${next.x - bend * 0.39} ${next.foot} ${stage.x + bend * 0.52} ${stage.foot} ${stage.x + bend * 0.146} ${stage.foot}H${stage.x}Z`;
    })
    .join('');
}

function Stage({ stage }: { stage: Drawn }) {
  const { x, foot, name, people, out } = stage;
  return (
    <g>
      <path d={`M${x} 20V${foot + 4}`} stroke="var(--ink)" strokeWidth="2" />
      <text x={x + 8} y="46" className="flow-count halo">
        {formatCount(people)}
      </text>
      <text x={x} y="14" className="chart-name">
        {name}
      </text>
      {out ? (
        <>
          <text x={x + 34} y={foot + 20} className="chart-label">
            {out.words}
          </text>
          {out.detail ? (
            <text x={x + 34} y={foot + 38} className="axis-word">
              {out.detail}
            </text>
          ) : null}
        </>
      ) : null}
    </g>
  );
}

function FlowTable({ stages }: { stages: readonly FlowStage[] }) {
  return (
    <PlainTable
      caption="Participant flow"
      tight
      rows={stages}
      getRowId={(stage) => stage.name}
      columns={[
        { id: 'stage', header: 'Stage', cell: (stage) => stage.name },
        { id: 'people', header: 'People', numeric: true, cell: (stage) => formatCount(stage.people) },
        {
          id: 'out',
          header: 'Left before the next',
          cell: (stage) => [stage.out?.words, stage.out?.detail].filter(Boolean).join(': ') || 'nobody',
        },
      ]}
    />
  );
}
