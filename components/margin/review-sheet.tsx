'use client';

import { useRouter } from 'next/navigation';
import { useCallback, useMemo, useState, type ReactNode } from 'react';
import { flushSync } from 'react-dom';
import type { ReviewView } from '@/lib/review/view-review';
import { send } from '../api/send';
import { useSend } from '../api/use-send';
import { formatChange, formatMoment } from '../ui/format';
import { MarginNote, MarginRow, MarginSection, MarginSheet, Seen } from '../ui/margin-sheet';
import { Note } from '../ui/note';
import { useToast } from '../ui/toast';
import type { HeldValue } from '@/lib/review/field-history';
import { CorrectDialog } from './correct-dialog';
import { focusValue, keyAtFragment, useFragment } from './find-value';
import { ChangedNote, HistoryNote, KeptNote, StruckBefore } from './field-notes';
import { QueryNote, queryNumber, type MarginRights } from './query-note';
import { QuestionnaireParts } from './questionnaire-parts';
import { anchorOf, isSeen, itemLike, keyOfPlace, keyOfTarget, partsOfReview, printBare, unitOfKind, type ReviewItem, type ReviewRow } from './review-items';
import { useReviewKeys, type ReviewKey } from './review-keys';
import { ChosenBar, Legend } from './review-words';
import { TapeTable } from './tape-table';
import { WriteNote } from './write-note';

export interface ReviewSheetProps {
  view: ReviewView;
  rights: MarginRights;
}

const grouped = <T,>(all: readonly T[], keyOf: (one: T) => string): ReadonlyMap<string, readonly T[]> => {
  const groups = new Map<string, T[]>();
  for (const one of all) groups.set(keyOf(one), [...(groups.get(keyOf(one)) ?? []), one]);
  return groups;
};

/** What the page knows about each value, by the value's key. */
function useMargin(view: ReviewView) {
  return useMemo(() => {
    const parts = partsOfReview(view);
    const items = parts.flatMap(({ rows }) => rows.flatMap((row) => row.items));
    const { assessment } = view;
    return {
      parts,
      items,
      rows: parts.flatMap(({ rows }) => rows),
      queries: grouped(view.queries, ({ target }) => keyOfTarget(target)),
      struck: grouped(view.struck, keyOfTarget),
      kept: grouped(assessment?.findings.filter(({ reason }) => reason !== null) ?? [], ({ place }) => (assessment ? keyOfPlace(place, assessment) : place)),
      marked: new Set(view.marks.map(keyOfTarget)),
    };
  }, [view]);
}

/** The form of a visit with its margin: signs at the left, values, and every note beside its line. */
export function ReviewSheet({ view, rights }: ReviewSheetProps) {
  const router = useRouter();
  const { say } = useToast();
  const { parts, items, rows, queries, struck, kept, marked } = useMargin(view);
  const [currentKey, setCurrentKey] = useState<string | null>(null);
  const [writing, setWriting] = useState<string | null>(null);
  const [histories, setHistories] = useState<Readonly<Record<string, readonly HeldValue[] | null>>>({});
  const [correcting, setCorrecting] = useState<{ item: ReviewItem; queryId: string | null } | null>(null);
  const [keysOn, setKeysOn] = useState(true);
  const mark = useSend<{ marked: number }>('POST', '/api/verifications');
  const { timeZone, code } = view.participant;
  const current = items.find(({ key }) => key === currentKey) ?? null;
  const fragment = useFragment();

  const done = useCallback(
    (said: string) => {
      say({ kind: 'fine', word: said });
      router.refresh();
    },
    [router, say],
  );
  const refused = useCallback((text: string) => say({ kind: 'needs', word: 'Not saved.', text }), [say]);

  const markRow = useCallback(
    (row: ReviewRow) => {
      const targets = row.items.filter(({ key }) => !marked.has(key)).map(({ target, value }) => ({ ...target, value }));
      if (targets.length > 0 && !mark.isPending) mark.mutate({ targets }, { onSuccess: () => router.refresh(), onError: ({ problem }) => refused(problem.detail) });
    },
    [mark, marked, refused, router],
  );
  const showHistory = useCallback(
    (item: ReviewItem) => {
      if (item.key in histories) return;
      setHistories((before) => ({ ...before, [item.key]: null }));
      send<HeldValue[]>('GET', `/api/history?${new URLSearchParams({ ...item.target }).toString()}`).then(
        (held) => setHistories((before) => ({ ...before, [item.key]: held })),
        (error: unknown) => {
          setHistories(({ [item.key]: _gone, ...others }) => others);
          refused(error instanceof Error ? error.message : 'The history could not be read.');
        },
      );
    },
    [histories, refused],
  );
  const choose = (key: string | null) => {
    // The arm it stands on comes into sight first.
    flushSync(() => setCurrentKey(key));
    if (key) document.getElementById(anchorOf(key))?.scrollIntoView({ block: 'nearest' });
  };
  const act = (key: ReviewKey) => {
    if (key === 'next form') return view.nextVisitId ? router.push(`/participants/${code}/visits/${view.nextVisitId}`) : undefined;
    const at = rows.findIndex((row) => row.items.some((item) => item.key === currentKey));
    if (key === 'next' || key === 'before') {
      const row = rows[Math.max(0, Math.min(rows.length - 1, at + (key === 'next' ? 1 : -1)))];
      return choose((row && itemLike(row, current?.side)?.key) ?? null);
    }
    const row = rows[at];
    if (!current || !row) return choose(items[0]?.key ?? null);
    if (key === 'seen' && rights.mark) markRow(row);
    if (key === 'write' && rights.raise) setWriting(current.key);
    if (key === 'history') showHistory(current);
    if (key === 'correct' && rights.correct) setCorrecting({ item: current, queryId: null });
  };
  /** The dialog gives the focus back to what opened it, which an answered query no longer shows: then it goes to the value. */
  const endCorrection = (key: string, saved: boolean) => {
    flushSync(() => {
      setCorrecting(null);
      if (saved) setCurrentKey(key);
    });
    if (saved || document.activeElement === document.body) focusValue(key);
    if (saved) done('Corrected.');
  };
  useReviewKeys(keysOn && correcting === null, act);

  const gutter = (row: ReviewRow): ReactNode => {
    const seen = isSeen(row, marked);
    if (seen || !rights.mark) return <Seen seen={seen} />;
    return (
      <button type="button" className="mark-seen" aria-label={`Mark ${row.items.length > 1 ? `${row.label} cm` : row.label} as seen at source`} onClick={() => markRow(row)}>
        <Seen seen={false} />
      </button>
    );
  };
  const notesOf = (item: ReviewItem): { key: string; node: ReactNode }[] => {
    const { key } = item;
    const changes = struck.get(key) ?? [];
    const close = () => setHistories(({ [key]: _gone, ...others }) => others);
    return [
      ...(queries.get(key) ?? []).map((query) => ({
        key: query.id,
        node: <QueryNote query={query} rights={rights} timeZone={timeZone} today={view.today} onDone={done} onCorrect={rights.correct ? () => setCorrecting({ item, queryId: query.id }) : null} />,
      })),
      ...(kept.get(key) ?? []).map((finding) => ({
        key: `${key} ${finding.check}`,
        node: <KeptNote finding={finding} item={item} assessorLabel={view.assessorLabel} savedAt={view.assessment ? 'when the form was saved' : ''} />,
      })),
      ...(key in histories
        ? [{ key: `${key} history`, node: <HistoryNote item={item} held={histories[key] ?? null} timeZone={timeZone} onClose={close} /> }]
        : changes.length > 0
          ? [{ key: `${key} changed`, node: <ChangedNote item={item} struck={changes} timeZone={timeZone} /> }]
          : []),
      ...(writing === key
        ? [
            {
              key: `${key} draft`,
              node: (
                <Note kind="draft" state="Your note" number={` on ${item.label}`} aside="not sent">
                  <WriteNote path="/api/queries" field="question" also={{ target: item.target }} label={`Ask about ${item.label}`} verb={`Ask ${view.participant.siteName}`} hand onDiscard={() => setWriting(null)} onDone={() => { setWriting(null); done('Asked.'); }} />
                </Note>
              ),
            },
          ]
        : []),
    ];
  };

  return (
    <>
      <ChosenBar
        item={current}
        rights={rights}
        onSeen={() => act('seen')}
        onWrite={() => act('write')}
        onHistory={() => act('history')}
        onCorrect={() => act('correct')}
      />
      <MarginSheet label="The form and its margin">
        {parts.map((part) => (
          <MarginSection key={part.no} no={part.no} title={part.title} aside={part.tape && view.assessment?.rvc != null ? <>Change from baseline <b className="t-num">{formatChange(view.assessment.rvc)}</b></> : null}>
            {part.tape && view.assessment ? (
              <>
                <TapeTable rows={part.rows} assessment={view.assessment} currentKey={currentKey} anchoredKey={keyAtFragment(fragment, items, view.queries)} struckOf={(key) => struck.get(key) ?? []} onChoose={(item) => setCurrentKey(item.key)} gutter={gutter} />
                {part.rows.flatMap((row) => row.items).flatMap((item) => notesOf(item).map(({ key, node }) => (
                  <MarginNote key={key} anchorId={anchorOf(item.key)} label={`Note on ${item.label}`}>
                    {node}
                  </MarginNote>
                )))}
              </>
            ) : (
              part.rows.flatMap((row) => row.items.map((item) => (
                <MarginRow
                  key={row.key}
                  id={anchorOf(item.key)}
                  no={row.no}
                  label={<button type="button" className="choose-row" aria-pressed={item.key === currentKey} onClick={() => setCurrentKey(item.key)}>{row.label}</button>}
                  gutter={gutter(row)}
                  current={item.key === currentKey}
                  long={item.kind === 'words'}
                  notes={notesOf(item)}
                >
                  <StruckBefore item={item} struck={struck.get(item.key) ?? []} />
                  <Value item={item} />
                </MarginRow>
              )))
            )}
          </MarginSection>
        ))}
        <QuestionnaireParts from={parts.length + 1} questionnaires={view.questionnaires} submitted={(at) => formatMoment(new Date(at), timeZone)} />
      </MarginSheet>
      <Legend keysOn={keysOn} onKeys={() => setKeysOn((before) => !before)} rights={rights} hasNext={view.nextVisitId !== null} />
      {correcting ? (
        <CorrectDialog
          item={correcting.item}
          query={numbered(view, correcting.queryId)}
          onClose={() => endCorrection(correcting.item.key, false)}
          onDone={() => endCorrection(correcting.item.key, true)}
        />
      ) : null}
    </>
  );
}

function numbered({ queries }: ReviewView, id: string | null): { id: string; number: string; version: number } | null {
  const query = queries.find((one) => one.id === id);
  return query ? { id: query.id, number: queryNumber(query.number), version: query.version } : null;
}

function Value({ item }: { item: ReviewItem }) {
  const unit = unitOfKind(item.kind);
  const bare = printBare(item.kind, item.value);
  if (item.value === null) return <span className="text-ink-2">{bare}</span>;
  return unit || item.kind === 'ratio' ? (
    <>
      <span className="t-num">{bare}</span> {unit}
    </>
  ) : (
    bare
  );
}
