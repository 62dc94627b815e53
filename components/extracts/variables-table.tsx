import { Fragment } from 'react';
import type { ExtractPreview } from '@/lib/extracts/preview-extract';
import { Verb } from '../ui/verbs';
import { classWords, treatmentWords } from './words';

type Variable = ExtractPreview['groups'][number]['rows'][number];

function VariableRow({ row }: { row: Variable }) {
  const { words, class: dataClass, treatment, before, after } = row;
  const isOut = treatment === 'left out';
  return (
    <tr role="row" className={isOut ? 'text-ink-2' : undefined}>
      <td role="cell" data-label="Variable" className="font-semibold">
        {words}
      </td>
      <td role="cell" data-label="Identifies">{classWords[dataClass]}</td>
      <td role="cell" data-label="Before and after">
        {before === null || isOut ? null : (
          <>
            <span className="text-ink-2">{before}</span> → <b>{after}</b>
          </>
        )}
      </td>
      <td role="cell" data-label="What is done">
        {isOut ? (
          <span className="inline-flex items-center gap-1.5">
            <Verb name="closed" size={15} /> {treatmentWords[treatment]}
          </span>
        ) : (
          treatmentWords[treatment]
        )}
      </td>
    </tr>
  );
}

/** Every variable of the record with its class and what the profile does to it, straight from the dictionary. */
export function VariablesTable({ groups }: Pick<ExtractPreview, 'groups'>) {
  return (
    <table role="table" className="data-table data-table-tight">
      <caption className="sr-only">Variables, and what is done to each</caption>
      <thead role="rowgroup">
        <tr role="row">
          {['Variable', 'Identifies a person', 'An invented value, before and after', 'What is done'].map((head) => (
            <th role="columnheader" scope="col" key={head}>
              {head}
            </th>
          ))}
        </tr>
      </thead>
      <tbody role="rowgroup">
        {groups.map(({ title, rows }) => (
          <Fragment key={title}>
            <tr role="row">
              <th role="rowheader" scope="rowgroup" colSpan={4} className="!pt-5 text-left font-serif text-[17px] !text-ink">
                {title}
              </th>
            </tr>
            {rows.map((row) => (
              <VariableRow key={row.key} row={row} />
            ))}
          </Fragment>
        ))}
      </tbody>
    </table>
  );
}
