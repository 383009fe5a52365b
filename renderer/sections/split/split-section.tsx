import {
  type AliquotResult,
  answerText,
  doubtTitles,
  type Quantified,
  quantifiedText,
  type RunResult,
  type Sheet,
  speciesName,
} from '../../../analysis/index.ts';
import { SpeciesGlyph } from '../../species/species-glyph.tsx';
import { whyNotFitted } from '../fit/why-not-fitted.ts';
import type { SectionProps } from '../section.ts';
import { Budget } from './budget.tsx';
import { Redraws } from './redraws.tsx';
import { SplitBar } from './split-bar.tsx';
import { resultOf } from './split-summary.ts';
import { wavelengthsText } from './wavelengths-text.ts';

export { splitSummary } from './split-summary.ts';

/** The answer of the aliquot that is shown, and what may be thought of it. */
export function SplitSection(props: SectionProps) {
  const { sheet, quantification, aliquot } = props;
  const result = resultOf(props);
  const inRun = sheet.aliquots?.find(({ id }) => id === aliquot)?.run;
  const run = quantification?.results.runs.find((each) => each.run === inRun);
  if (!result) {
    return (
      <>
        <NoAnswer {...props} />
        {run && run.aliquots > 0 && <RunAnswer sheet={sheet} run={run} />}
      </>
    );
  }
  return (
    <>
      <Answer sheet={sheet} title={`Aliquot ${result.aliquot}`} answer={result} />
      <SplitBar sheet={sheet} split={result.split} />
      {run && run.aliquots > 1 && <RunAnswer sheet={sheet} run={run} />}
      <Ledger sheet={sheet} result={result} />
      <Doubts sheet={sheet} result={result} />
      <Budget sheet={sheet} result={result} />
      <Redraws sheet={sheet} aliquot={result.aliquot} />
    </>
  );
}

/** Why there is nothing to read off, and what would mend it. */
function NoAnswer(props: SectionProps) {
  const trouble = whyNotFitted(props);
  if (trouble === null) {
    return <p class="empty">The answer appears here once standards and a crude spectrum are in.</p>;
  }
  return (
    <p class="obstacle" role="status">
      {props.aliquot !== null && `No answer from aliquot ${props.aliquot}. `}
      {trouble}
    </p>
  );
}

type AnswerProps = {
  readonly sheet: Sheet;
  readonly title: string;
  readonly answer: Pick<AliquotResult, 'split' | 'ratios'>;
};

function Answer({ sheet, title, answer }: AnswerProps) {
  const text = answerText(sheet, answer);
  if (!text) return null;
  return (
    <div class="answer" aria-live="polite">
      <p class="answer-of">{title}</p>
      <p class="answer-head">{text.head}</p>
      <p class="answer-interval">{text.interval}</p>
    </div>
  );
}

function RunAnswer({ sheet, run }: { readonly sheet: Sheet; readonly run: RunResult }) {
  const text = answerText(sheet, run);
  const name = sheet.runs?.find(({ id }) => id === run.run)?.name || run.run;
  const { coresFound, armsFound } = run.balance;
  const share = (found: Quantified): string => {
    const { value, interval } = quantifiedText(found, { unit: 'percent' });
    return `${value} % (${interval})`;
  };
  return (
    <div class="run-answer">
      {text && (
        <p>
          <strong>Run {name}</strong>,{' '}
          {run.aliquots === 1 ? 'one aliquot' : `${run.aliquots} aliquots together`}: {text.head}{' '}
          <span class="soft">({text.interval})</span>
        </p>
      )}
      {(coresFound || armsFound) && (
        <p class="soft">
          Of what was charged the spectrum finds
          {coresFound && ` ${share(coresFound)} of the cores`}
          {coresFound && armsFound && ' and'}
          {armsFound && ` ${share(armsFound)} of the arms`}. What does not absorb is not seen.
        </p>
      )}
    </div>
  );
}

function Ledger({ sheet, result }: { readonly sheet: Sheet; readonly result: AliquotResult }) {
  return (
    <table class="ledger">
      <thead>
        <tr>
          <th scope="col">Species</th>
          <th scope="col" class="number">
            cuvette, µmol/L
          </th>
          <th scope="col" class="interval">
            95 %
          </th>
          <th scope="col" class="number">
            flask, mmol/L
          </th>
          <th scope="col" class="interval">
            95 %
          </th>
          <th scope="col" class="number">
            of products, %
          </th>
          <th scope="col" class="interval">
            95 %
          </th>
        </tr>
      </thead>
      <tbody>
        {result.concentrations.map(({ species, cuvetteMolPerL, flaskMolPerL, detected }) => {
          const fraction = result.split.find((each) => each.species === species)?.fraction;
          const cuvette = quantifiedText(cuvetteMolPerL, { unit: 'micromolar' });
          const flask = quantifiedText(flaskMolPerL, { unit: 'millimolar' });
          const share = fraction && quantifiedText(fraction, { unit: 'percent' });
          return (
            <tr key={species}>
              <th scope="row">
                <span class="with-glyph">
                  <SpeciesGlyph sheet={sheet} id={species} />
                  <span>
                    {speciesName(sheet, species)}
                    {!detected && <span class="undetected"> below detection</span>}
                  </span>
                </span>
              </th>
              <td class="number">{detected ? cuvette.value : '—'}</td>
              <td class="interval">{cuvette.interval}</td>
              <td class="number">{detected ? flask.value : '—'}</td>
              <td class="interval">{flask.interval}</td>
              <td class="number">{share ? (detected ? share.value : '—') : ''}</td>
              <td class="interval">{share ? share.interval : ''}</td>
            </tr>
          );
        })}
      </tbody>
    </table>
  );
}

function Doubts({ sheet, result }: { readonly sheet: Sheet; readonly result: AliquotResult }) {
  const { doubts, notes } = result;
  return (
    <div class="doubts">
      <h3>Doubts</h3>
      {doubts.length === 0 ? (
        <p class="soft">
          None was raised. The interval holds as far as the sheet's own uncertainties do.
        </p>
      ) : (
        <ol>
          {doubts.map(({ code, message, species = [], atNm = [] }) => (
            <li key={`${code}-${species.join()}`} class="doubt">
              <strong>{doubtTitles[code]}</strong>
              {species.length > 0 && (
                <span class="soft">
                  {' '}
                  · {species.map((id) => speciesName(sheet, id)).join(', ')}
                </span>
              )}
              {atNm.length > 0 && <span class="soft"> · {wavelengthsText(atNm)}</span>}
              <p>{message}</p>
            </li>
          ))}
        </ol>
      )}
      {notes.map((note) => (
        <p class="soft" key={note}>
          {note}
        </p>
      ))}
    </div>
  );
}
