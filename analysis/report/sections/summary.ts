import type { Sheet } from '../../sheet/schema.ts';
import type { AliquotResult, Results } from '../../split/results.ts';
import { breakable, htmlTable, oneLine } from '../html.ts';
import { answerText } from './answer.ts';
import { runName } from './runs.ts';

/** The answers before the work: one row a run, and one an aliquot that is of no run. */
export function summaryHtml(sheet: Sheet, { aliquots, runs, refused }: Results): string {
  const ofRuns = runs
    .filter((run) => run.aliquots > 0)
    .map((run) =>
      row(
        `Run ${runName(sheet, run.run)}, ${run.aliquots} ${run.aliquots === 1 ? 'aliquot' : 'aliquots'}`,
        answerText(sheet, run),
        aliquots.filter((aliquot) => aliquot.run === run.run),
      ),
    );
  const alone = aliquots
    .filter(({ run }) => !runs.some((each) => each.run === run && each.aliquots > 0))
    .map((result) => row(`Aliquot ${result.aliquot}`, answerText(sheet, result), [result]));
  const rows = [...ofRuns, ...alone];
  const refusals =
    refused.length === 0
      ? ''
      : `<p class="refused">${refused.length === 1 ? '1 aliquot was' : `${refused.length} aliquots were`} refused; see under Fit and split.</p>`;
  if (rows.length === 0) return refusals;
  return `<div class="summary">${htmlTable(['', 'answer', 'doubts'], ['left', 'left', 'left'], rows)}${refusals}</div>`;
}

function row(
  of: string,
  answer: ReturnType<typeof answerText>,
  results: readonly AliquotResult[],
): string[] {
  const doubted = results.filter(({ doubts }) => doubts.length > 0).map(({ aliquot }) => aliquot);
  const doubts = doubted.length === 0 ? 'none' : `at ${doubted.join(', ')}`;
  return [
    breakable(of),
    answer
      ? `<strong>${oneLine(answer.head)}</strong><br><span class="soft">${breakable(answer.interval)}</span>`
      : '—',
    breakable(doubts),
  ];
}
