'use client';

import { useCallback, useMemo, useState } from 'react';
import type { CompleteAssessmentView } from '@/lib/measurement/view-complete';
import type { LimbPageView } from '@/lib/measurement/view-limb-page';
import type { OpenAssessmentView } from '@/lib/measurement/view-open';
import { askedDoubts } from '../api/asked-doubts';
import { ProblemError, send } from '../api/send';
import { useToast } from '../ui/toast';
import { ArmDrawing } from './arm-drawing';
import { BeforeYouSave, doubtId, isPressing, type ListedDoubt } from './before-you-save';
import { BesideTape, doubtsBeside, readCircumstances, typedCircumstances, type TypedCircumstances } from './beside-tape';
import { cellId, EntryGrid } from './entry-grid';
import { ArmChoice, DrawingHead, EntryFoot, GridWords, SaveWords } from './entry-parts';
import { cellName, cellOf, cellsInOrder, columnsOf } from './grid-keys';
import { partsOfForm, partsOfView } from './sitting-parts';
import { doubtsOf, drawnMm, isHalfTyped, readCell, sittingOf, thirdLevels, typedFrom, type Doubt, type Typed } from './typed-sitting';
import { useKeptSitting } from './use-kept-sitting';

export interface LimbEntryProps {
  view: OpenAssessmentView;
  page: Pick<LimbPageView, 'affectedSide' | 'protocolPosition'>;
  onComplete: (view: CompleteAssessmentView) => void;
  onLeave: () => void;
}

type Kept = Readonly<Record<string, { message: string; reason: string }>>;

const keyOf = ({ check, place }: Pick<Doubt, 'check' | 'place'>): string => `${check}|${place}`;

function goTo(id: string): void {
  const element = document.getElementById(id);
  element?.scrollIntoView({ block: 'center' });
  (element?.matches('input, select, textarea, li') ? element : element?.querySelector<HTMLElement>('input'))?.focus();
}

/** The figure at a place, as typed; '' where the place is no single figure. */
function figureAt(place: string, typed: Typed, { bodyWeight, impedanceRatio }: TypedCircumstances): string {
  if (place === 'weight') return bodyWeight.trim() && `${bodyWeight.trim()} kg`;
  return place === 'ratio' ? impedanceRatio.trim() : (typed[place] ?? '');
}

/** Everything that can be worked out from what is typed. */
function useForm(view: OpenAssessmentView, typed: Typed, circumstances: TypedCircumstances, kept: Kept, typing: string | null, firstCovered: boolean, asked: readonly Doubt[]) {
  return useMemo(() => {
    const sitting = sittingOf(typed, view);
    const columns = columnsOf(view.map.levelCount, { left: thirdLevels(sitting, 'left'), right: thirdLevels(sitting, 'right') });
    const cells = cellsInOrder(columns);
    const missing = cells.filter((cell) => readCell(typed[cellName(cell)]).mm === null);
    const unread: Doubt[] = cells.flatMap((cell) => {
      const { problem } = readCell(typed[cellName(cell)]);
      return problem ? [{ check: 'entry.read', severity: 'hint' as const, message: problem, place: cellName(cell) }] : [];
    });
    const { values, problems } = readCircumstances(circumstances);
    const own = [...unread, ...doubtsOf(sitting, missing.length === 0), ...doubtsBeside(values)];
    const found = [...own, ...asked.filter((one) => !own.some((known) => keyOf(known) === keyOf(one)))]
      // While trial 1 is covered nothing compares with it.
      .filter(({ check, place }) => !(firstCovered && (check.startsWith('trials.') || cellOf(place)?.trial === 1)))
      .filter(({ place }) => !isHalfTyped(place, typing, typed));
    const doubts: ListedDoubt[] = found.map((doubt) => {
      const reason = kept[keyOf(doubt)];
      return { ...doubt, figure: figureAt(doubt.place, typed, circumstances), reason: reason?.message === doubt.message ? reason.reason : null };
    });
    return { sitting, columns, missing, doubts, values, problems };
  }, [view, typed, circumstances, kept, typing, firstCovered, asked]);
}

/** The sitting while it is taken: grid, drawing, what stands beside the tape, doubts, and one way to save. */
export function LimbEntry({ view, page, onComplete, onLeave }: LimbEntryProps) {
  const { say } = useToast();
  const [typed, setTyped] = useState<Typed>(() => typedFrom(view.trials));
  const [circumstances, setCircumstances] = useState<TypedCircumstances>(() => typedCircumstances(view.circumstances));
  const [kept, setKept] = useState<Kept>({});
  // What earlier visits make doubtful is known to the server alone, and said only when both trials are saved.
  const [asked, setAsked] = useState<readonly Doubt[]>([]);
  const [typing, setTyping] = useState<string | null>(null);
  const [firstCovered, setFirstCovered] = useState(false);
  const [arm, setArm] = useState<'left' | 'right'>('left');
  const [refusal, setRefusal] = useState<{ place: string; sentence: string } | null>(null);
  const [atWork, setAtWork] = useState(false);
  const form = useForm(view, typed, circumstances, kept, typing, firstCovered, asked);
  const { sitting, columns, missing, doubts, values } = form;
  const parts = useMemo(() => partsOfForm(view, typed, values), [view, typed, values]);
  const { state, flush, settle, complete } = useKeptSitting({ view, parts, partsOf: partsOfView, onComplete });
  const answersMissing = [...(values.position ? [] : ['position']), ...(values.sleeveWorn === null ? ['sleeveWorn'] : [])];

  const lead = useCallback((place: string, sentence: string) => {
    setRefusal({ place, sentence });
    const cell = cellOf(place);
    if (cell) setArm(cell.side);
    requestAnimationFrame(() => goTo(cell ? cellId(place) : place));
  }, []);

  const save = async () => {
    setFirstCovered(false);
    const [answer] = answersMissing;
    if (answer) return lead(answer, answer === 'position' ? 'Choose the position in which the arms are measured.' : 'Say whether a sleeve was worn in the last 12 hours.');
    const [first] = missing;
    if (first) return lead(cellName(first), first.trial === 3 ? 'The two trials differ here: take a third reading.' : 'This girth is still to be read.');
    const [problem] = Object.entries(form.problems);
    if (problem) return lead(problem[0], problem[1]);
    const hot = doubts.find(({ severity, reason }) => severity !== 'hint' && reason === null);
    if (hot) return lead(doubtId(hot), hot.message);
    setAtWork(true);
    setRefusal(null);
    try {
      if (!(await flush())) return;
      const reasons = doubts.flatMap(({ check, place, reason }) => (reason === null ? [] : [{ check, place, reason }]));
      const saved = await complete(reasons);
      say({ kind: 'fine', word: 'Saved.', text: 'Both trials are in; the result stands beside them.' });
      onComplete(saved);
    } catch (error) {
      await answerRefusal(error);
    } finally {
      setAtWork(false);
    }
  };

  /** A refusal leads to its place; where our own saving was in and its answer lost, the saved form is shown. */
  const answerRefusal = async (error: unknown) => {
    if (!(error instanceof ProblemError)) throw error;
    if (error.problem.code === 'stale' || error.problem.code === 'locked') {
      const theirs = await send<CompleteAssessmentView | OpenAssessmentView>('GET', `/api/visits/${view.visitId}/assessment`).catch(() => null);
      if (theirs?.state === 'complete') return onComplete(theirs);
    }
    const fresh = askedDoubts(error.problem).map(({ check, place, sentence }) => ({ check, place, message: sentence, severity: 'soft' as const }));
    const [first] = fresh;
    if (first) {
      setAsked(fresh);
      return lead(doubtId(first), first.message);
    }
    const at = error.problem.fields?.[0];
    if (at && (cellOf(at.field) || at.field === 'position' || at.field === 'sleeveWorn')) lead(at.field, at.sentence);
    else say({ kind: 'needs', word: 'Not saved.', text: error.problem.detail });
  };

  const changeBeside = (change: Partial<TypedCircumstances>) => {
    setCircumstances((before) => ({ ...before, ...change }));
    setAsked([]);
    setRefusal(null);
  };
  const keep = (doubt: Doubt, reason: string | null) =>
    setKept(({ [keyOf(doubt)]: _before, ...others }) => (reason === null ? others : { ...others, [keyOf(doubt)]: { message: doubt.message, reason } }));
  const rings = new Map(doubts.filter((doubt) => doubt.reason === null && isPressing(doubt)).map(({ place, message }) => [place, message]));
  if (refusal && cellOf(refusal.place)) rings.set(refusal.place, refusal.sentence);
  const dents = doubts.flatMap(({ place, reason, severity, check }) => {
    const cell = cellOf(place);
    const { mm } = readCell(typed[place]);
    return cell && mm !== null && reason === null && (severity !== 'hint' || check === 'trials.differ') ? [{ side: cell.side, level: cell.level, girthMm: mm }] : [];
  });

  return (
    <>
      <SaveWords
        state={state}
        onMine={(theirs) => {
          settle(theirs);
          void flush();
        }}
        onTheirs={(theirs) => {
          settle(theirs);
          setTyped(typedFrom(theirs.trials));
          setCircumstances(typedCircumstances(theirs.circumstances));
        }}
      />
      <div className="limb-work">
        <div>
          <ArmChoice arm={arm} onArm={setArm} />
          <EntryGrid
            {...{ columns, typed, firstCovered, arm }}
            map={view.map}
            doubts={rings}
            onArm={setArm}
            onType={(name, text) => {
              setTyped((before) => ({ ...before, [name]: text }));
              setTyping(name);
              setAsked([]);
              setRefusal((before) => (before?.place === name ? null : before));
            }}
            onLeaveCell={() => setTyping(null)}
            onLeaveColumn={() => void flush()}
          />
          <GridWords covered={firstCovered} onCover={() => setFirstCovered((before) => !before)} />
        </div>
        <div className="limb-drawing">
          <DrawingHead affectedSide={page.affectedSide} />
          <ArmDrawing leftMm={drawnMm(sitting, 'left', firstCovered)} rightMm={drawnMm(sitting, 'right', firstCovered)} affectedSide={page.affectedSide} dents={dents} />
        </div>
        <div className="limb-beside">
          <BesideTape
            typed={circumstances}
            protocolPosition={page.protocolPosition}
            problems={{ ...form.problems, ...(refusal && !cellOf(refusal.place) ? { [refusal.place]: refusal.sentence } : {}) }}
            weightDoubt={doubts.find(({ place, reason }) => place === 'weight' && reason === null) ?? null}
            onType={changeBeside}
            onLeave={() => void flush()}
          />
        </div>
      </div>
      <BeforeYouSave
        doubts={doubts}
        map={view.map}
        onMeasureAgain={({ place }) => goTo(cellOf(place) ? cellId(place) : place === 'weight' ? 'bodyWeight' : place === 'ratio' ? 'impedanceRatio' : 'girth-left-1-0')}
        onKeep={keep}
        onChange={({ place }, text) => {
          changeBeside(place === 'weight' ? { bodyWeight: text } : {});
          goTo('bodyWeight');
        }}
      />
      <EntryFoot
        girths={missing.length}
        answers={answersMissing.length}
        atWork={atWork ? 'Saving' : false}
        onSave={() => void save()}
        onLeave={() => void flush().then((isKept) => isKept && onLeave())}
      />
    </>
  );
}
