import { formatNumber } from '../ui/format';
import { SideWords } from './tide-arm';
import type { TideData, TideSymptom, TideVisit } from './tide-data';
import { field, type TideScale } from './tide-scale';

/** Reports between arm and load: a stroke as high as it was severe. Words that would collide wait in the table. */
export function TideSymptoms({ symptoms, scale }: { symptoms: readonly TideSymptom[]; scale: TideScale }) {
  return (
    <g>
      <SideWords y={322} title="Symptoms" words={['as reported']} />
      <path d={`M${field.left} ${field.symptomY}H${Math.max(field.left, scale.today)}`} stroke="var(--rule-2)" />
      {withRoom(symptoms, scale).map(({ symptom, x, spoken }) => (
        <Symptom key={`${symptom.on}${symptom.words.join()}`} symptom={symptom} x={x} spoken={spoken} />
      ))}
    </g>
  );
}

/** In time, each told whether its words still find room after the one before. */
function withRoom(symptoms: readonly TideSymptom[], scale: TideScale): { symptom: TideSymptom; x: number; spoken: boolean }[] {
  let free = -Infinity;
  return [...symptoms]
    .sort((a, b) => a.on.localeCompare(b.on))
    .map((symptom) => {
      const x = scale.x(symptom.on);
      const spoken = x > free;
      if (spoken) free = x + 14 + 7 * Math.max(...symptom.words.map((one) => one.length));
      return { symptom, x, spoken };
    });
}

function Symptom({ symptom, x, spoken }: { symptom: TideSymptom; x: number; spoken: boolean }) {
  const { words, signCount } = symptom;
  return (
    <g>
      <path d={`M${x} ${field.symptomY}v${-4 - 3.4 * Math.min(10, signCount)}`} stroke="var(--ink)" strokeWidth="2" />
      {spoken
        ? words.slice(0, 2).map((one, index) => (
            <text key={one} x={x + 7} y={330 - 16 * (Math.min(2, words.length) - 1 - index)} className="chart-label halo">
              {one}
            </text>
          ))
        : null}
    </g>
  );
}

export interface FootVisit extends TideVisit {
  px: number;
  /** 0 stands at the line, 1 one step lower because its neighbour is near. */
  step: number;
}

/** Where each visit's words stand; near neighbours take turns on two steps. */
export function footVisits(visits: readonly TideVisit[], scale: TideScale): FootVisit[] {
  const free = [-Infinity, -Infinity];
  return visits
    .map((visit) => ({ visit, px: scale.x(visit.window?.target ?? visit.on ?? '') }))
    .sort((a, b) => a.px - b.px)
    .map(({ visit, px }) => {
      const step = px - (free[0] ?? 0) >= 92 ? 0 : 1;
      free[step] = px;
      return { ...visit, px, step };
    });
}

/** Windows with target and what truly happened, then the impedance ratio under each. */
export function TideFoot({ data, scale, visits }: { data: TideData; scale: TideScale; visits: readonly FootVisit[] }) {
  const deep = visits.some(({ step }) => step === 1) ? 36 : 0;
  const line = 634 + deep;
  return (
    <g>
      <SideWords y={562} title="Visits" words={['window, target,', 'actual']} />
      {visits.map((visit) => (
        <FootMark key={visit.key} visit={visit} scale={scale} />
      ))}
      <path d={`M${field.left} ${line}H${field.right}`} stroke="var(--rule)" />
      <text x="0" y={line + 16} className="axis-word">
        Impedance ratio
      </text>
      {visits.map((visit) =>
        visit.impedanceRatio == null ? null : (
          <text key={visit.key} x={anchorX(visit)} y={line + 17} textAnchor={anchor(visit)} className="chart-figure">
            {formatNumber(visit.impedanceRatio, 2)}
          </text>
        ),
      )}
      <Today data={data} scale={scale} />
    </g>
  );
}

const edgeRoom = 34;
function anchor({ px }: FootVisit): 'start' | 'middle' | 'end' {
  if (px < field.left + edgeRoom) return 'start';
  return px > field.right - edgeRoom ? 'end' : 'middle';
}
function anchorX(visit: FootVisit): number {
  const side = anchor(visit);
  if (side === 'start') return Math.max(field.left, visit.px - 6);
  return side === 'end' ? Math.min(field.right, visit.px + 6) : visit.px;
}

function FootMark({ visit, scale }: { visit: FootVisit; scale: TideScale }) {
  const { window, on, provisional, step, name, dateWords } = visit;
  const y = 607 + step * 36;
  const actual = on === null ? null : scale.x(on);
  return (
    <g>
      {window ? (
        <path
          d={`M${scale.x(window.opens)} 577V584H${scale.x(window.closes)}V577M${scale.x(window.target)} 584V${590 + step * 4}`}
          fill="none"
          stroke="var(--ink)"
          strokeWidth="1.25"
        />
      ) : null}
      {actual === null ? null : (
        <path
          d={`M${actual - 5.5} 572h11l-5.5 11z`}
          fill={provisional ? 'var(--ground)' : 'var(--act)'}
          stroke="var(--act)"
          strokeWidth="1.4"
        />
      )}
      <text x={anchorX(visit)} y={y} textAnchor={anchor(visit)} className="chart-name halo">
        {name}
      </text>
      <text x={anchorX(visit)} y={y + 17} textAnchor={anchor(visit)} className="axis-word halo">
        {dateWords}
      </text>
    </g>
  );
}

function Today({ data, scale }: { data: TideData; scale: TideScale }) {
  if (scale.today < field.left || scale.today > field.right) return null;
  const [, month, day] = data.today.split('-');
  const names = ['Jan', 'Feb', 'Mar', 'Apr', 'May', 'Jun', 'Jul', 'Aug', 'Sep', 'Oct', 'Nov', 'Dec'];
  const late = scale.today > field.right - 120;
  return (
    <g>
      <path d={`M${scale.today} 22V584`} stroke="var(--needs)" strokeWidth="1.25" />
      <path d={`M${scale.today - 5.5} 19h11l-5.5 11z`} fill="var(--needs)" stroke="var(--ground)" strokeWidth="1.4" />
      <text x={scale.today + (late ? -9 : 9)} y="47" textAnchor={late ? 'end' : 'start'} className="chart-needs halo">
        today, {Number(day)} {names[Number(month) - 1]}
      </text>
    </g>
  );
}
