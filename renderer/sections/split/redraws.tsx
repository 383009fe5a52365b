import { useEffect, useId, useRef, useState } from 'preact/hooks';
import {
  type RedrawCheck,
  refusalSentence,
  type Sheet,
  usualDraws,
} from '../../../analysis/index.ts';
import { Choice } from '../../fields/field.tsx';
import { redrawAliquot, stopRedraws } from '../../worker/analysis-client.ts';
import { RedrawsTable } from './redraws-table.tsx';
import { drawsText, timeLeftText } from './redraws-text.ts';
import './redraws.css';

interface RedrawsProps {
  readonly sheet: Sheet;
  readonly aliquot: string;
}

interface Asked extends RedrawsProps {
  readonly draws: number;
}

type Check =
  | { readonly is: 'running'; readonly asked: Asked; readonly done: number; readonly began: number }
  | { readonly is: 'done'; readonly asked: Asked; readonly check: RedrawCheck }
  | { readonly is: 'stopped'; readonly why: string }
  | { readonly is: 'failed'; readonly why: string };

const wasStopped = 'The check was stopped.';
const choices = [500, usualDraws, 10_000];

/** The Monte Carlo check of the aliquot that is shown, on request. */
export function Redraws({ sheet, aliquot }: RedrawsProps) {
  const [draws, setDraws] = useState(usualDraws);
  const [check, setCheck] = useState<Check | null>(null);
  const present = useRef({ sheet, aliquot });
  present.current = { sheet, aliquot };
  const begun = useRef(0);
  const startButton = useRef<HTMLButtonElement>(null);
  const cancelButton = useRef<HTMLButtonElement>(null);
  const headId = useId();
  const isRunning = check?.is === 'running';

  useEffect(() => {
    // what runs answers for a sheet that is no longer there
    if (isRunning && (check.asked.sheet !== sheet || check.asked.aliquot !== aliquot)) {
      stop('The check was stopped, as it was of what is no longer shown.');
    }
  });
  useEffect(() => stopRedraws, []);

  /** The button goes with the check; who stands on it is not dropped to the top of the page. */
  const leaveCancel = (): void => {
    if (cancelButton.current === document.activeElement) startButton.current?.focus();
  };
  const stop = (why: string): void => {
    begun.current += 1;
    leaveCancel();
    setCheck({ is: 'stopped', why });
    stopRedraws();
  };
  const start = async (): Promise<void> => {
    begun.current += 1;
    const mine = begun.current;
    const asked: Asked = { ...present.current, draws };
    const began = performance.now();
    const say = (next: Check): void => {
      if (begun.current !== mine) return;
      setCheck(next);
      if (next.is === 'running') return;
      leaveCancel();
      // word of progress may be overtaken by the answer
      begun.current += 1;
    };
    say({ is: 'running', asked, done: 0, began });
    try {
      const outcome = await redrawAliquot(asked.sheet, asked.aliquot, draws, (done) =>
        say({ is: 'running', asked, done, began }),
      );
      if (!outcome.ok) say({ is: 'failed', why: refusalSentence(outcome.refusal) });
      else if (outcome.value === null) say({ is: 'stopped', why: wasStopped });
      else say({ is: 'done', asked, check: outcome.value });
    } catch {
      say({ is: 'failed', why: 'The check broke off by a fault of the program. Start it again.' });
    }
  };

  const isStale =
    check?.is === 'done' && (check.asked.sheet !== sheet || check.asked.aliquot !== aliquot);
  return (
    <section class="redraws" aria-labelledby={headId}>
      <h3 id={headId}>Check by redraws</h3>
      <p class="soft">
        Draws every error anew, noise, stocks and dilutions, and fits each time: an independent
        check of the intervals above (Monte Carlo, JCGM 101).
      </p>
      <div class="redraws-row">
        <button
          type="button"
          ref={startButton}
          aria-disabled={isRunning}
          onClick={() => {
            if (!isRunning) void start();
          }}
        >
          Check by redraws
        </button>
        <Choice
          label="Number of redraws"
          value={String(draws)}
          options={choices.map((each) => ({ value: String(each), text: drawsText(each) }))}
          choose={(value) => setDraws(Number(value))}
        />
        {isRunning && (
          <>
            <progress aria-label="Redraws done" max={check.asked.draws} value={check.done} />
            <span class="soft">
              {timeLeftText({
                done: check.done,
                of: check.asked.draws,
                elapsedMs: performance.now() - check.began,
              })}
            </span>
            <button type="button" class="quiet" ref={cancelButton} onClick={() => stop(wasStopped)}>
              Cancel
            </button>
          </>
        )}
      </div>
      <p class="soft" role="status">
        {spoken(check, isStale)}
      </p>
      {check?.is === 'done' && <RedrawsTable sheet={sheet} check={check.check} isStale={isStale} />}
    </section>
  );
}

/** Said once for each state, not for every draw. */
function spoken(check: Check | null, isStale: boolean): string {
  if (check === null) return '';
  if (check.is === 'running') return 'Redrawing…';
  if (check.is === 'stopped' || check.is === 'failed') return check.why;
  if (isStale) {
    return `This check is of aliquot ${check.check.aliquot} before the sheet or the choice changed. Run it again.`;
  }
  return check.check.verdict;
}
