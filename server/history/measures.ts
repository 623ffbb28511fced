import { measuresOf } from '../../core/record/measures.ts';
import { measuresBasis, type ReportBasis } from '../report-basis.ts';
import { usableReport } from '../reports.ts';
import type { StoredMeasures } from '../store/history-store.ts';
import type { SweepView } from '../sweep-view.ts';

/** What a view on this basis measured, as it is stored. */
export function storedMeasures(view: SweepView, basis: ReportBasis): StoredMeasures {
  const { maxSwr, designBands } = basis;
  const measures = measuresOf({
    summary: view.summary,
    usable: usableReport(view, basis),
    spans: view.curve.spans(maxSwr),
    designBands,
  });
  return { basis: measuresBasis(basis), measures };
}
