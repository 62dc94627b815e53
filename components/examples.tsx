import type { ComponentType } from 'react';
import { PhoneChartExamples, SmallChartExamples } from './chart/small.examples';
import { FlowExamples, LoadBandsExamples, SurvivalExamples } from './chart/results.examples';
import { TideChartExamples } from './chart/tide-chart.examples';
import { ButtonExamples } from './ui/button.examples';
import { DataTableExamples, DataTableStatesExamples } from './ui/data-table.examples';
import { ErrorSummaryExamples, FieldExamples, PhoneControlExamples, SentenceExamples } from './ui/fields.examples';
import { LedgerExamples, MarginSheetExamples } from './ui/margin-sheet.examples';
import { SaidBackExamples, TabsExamples } from './ui/said-back.examples';
import { CautionExamples, GaugeExamples, NeatlineExamples, SignExamples, WaitingExamples } from './ui/state.examples';
import { WorkListExamples } from './ui/work-list.examples';

export interface Example {
  /** Anchor on the page. */
  key: string;
  title: string;
  Show: ComponentType;
}

/** Every example, by key. A component without a line here is not shown and not tested. */
export const examples: readonly Example[] = [
  { key: 'buttons', title: 'Buttons', Show: ButtonExamples },
  { key: 'cautions', title: 'Cautions', Show: CautionExamples },
  { key: 'curves', title: 'Curves', Show: SurvivalExamples },
  { key: 'error-summary', title: 'Error summary', Show: ErrorSummaryExamples },
  { key: 'fields', title: 'Fields', Show: FieldExamples },
  { key: 'flow', title: 'Participant flow', Show: FlowExamples },
  { key: 'ledgers', title: 'Ledger and versions', Show: LedgerExamples },
  { key: 'load-bands', title: 'Load by week', Show: LoadBandsExamples },
  { key: 'margin', title: 'Form with margin', Show: MarginSheetExamples },
  { key: 'neatline', title: 'Neatline', Show: NeatlineExamples },
  { key: 'phone-charts', title: 'Phone drawings', Show: PhoneChartExamples },
  { key: 'phone-controls', title: 'Phone controls', Show: PhoneControlExamples },
  { key: 'said-back', title: 'Toasts and dialogs', Show: SaidBackExamples },
  { key: 'sentences', title: 'Choice in a sentence', Show: SentenceExamples },
  { key: 'signs', title: 'Signs', Show: SignExamples },
  { key: 'small-charts', title: 'Small drawings', Show: SmallChartExamples },
  { key: 'states', title: 'State', Show: GaugeExamples },
  { key: 'table-states', title: 'Table, empty and waiting', Show: DataTableStatesExamples },
  { key: 'tables', title: 'Table', Show: DataTableExamples },
  { key: 'tabs', title: 'Tabs', Show: TabsExamples },
  { key: 'tide', title: 'Tide chart', Show: TideChartExamples },
  { key: 'waiting', title: 'Empty, waiting, broken', Show: WaitingExamples },
  { key: 'work', title: 'Work list', Show: WorkListExamples },
];
