import { useEffect, useState } from 'preact/hooks';
import {
  figuresText,
  type MissingEstimate,
  refusalSentence,
  type Sheet,
  speciesLabel,
} from '../../../analysis/index.ts';
import { estimateMissingSpectrum } from '../../worker/analysis-client.ts';
import './missing-spectrum.css';

interface MissingSpectrumProps {
  readonly sheet: Sheet;
  /** How many aliquots hold a band that the standards do not explain. */
  readonly aliquots: number;
}

type Found =
  | { readonly is: 'estimate'; readonly sheet: Sheet; readonly estimate: MissingEstimate }
  | { readonly is: 'refused'; readonly sheet: Sheet; readonly why: string };

/** What absorbs without a standard, estimated from the aliquots that hold it, when unfolded. */
export function MissingSpectrumPanel({ sheet, aliquots }: MissingSpectrumProps) {
  const [isOpen, setOpen] = useState(false);
  const [found, setFound] = useState<Found | null>(null);
  useEffect(() => {
    if (!isOpen) return undefined;
    let isWanted = true;
    void estimateMissingSpectrum(sheet).then((outcome) => {
      if (!isWanted) return;
      setFound(
        outcome.ok
          ? { is: 'estimate', sheet, estimate: outcome.value }
          : { is: 'refused', sheet, why: refusalSentence(outcome.refusal) },
      );
    });
    return () => {
      isWanted = false;
    };
  }, [isOpen, sheet]);
  return (
    <details class="missing-spectrum" onToggle={(event) => setOpen(event.currentTarget.open)}>
      <summary>Estimate the missing spectrum from {aliquots} aliquots</summary>
      {found === null && <p role="status">Taking the aliquots apart together …</p>}
      {found?.is === 'refused' && <p role="status">{found.why}</p>}
      {found?.is === 'estimate' && (
        <div data-stale={found.sheet !== sheet || undefined}>
          <EstimatePlot estimate={found.estimate} />
          <EstimateTable sheet={sheet} estimate={found.estimate} />
        </div>
      )}
    </details>
  );
}

const [width, height, margin] = [480, 150, 22];

/** The shape with the band that noise leaves it. */
function EstimatePlot({ estimate }: { readonly estimate: MissingEstimate }) {
  const { wavelengthNm, shape, shapeSd } = estimate;
  const [low, high] = [wavelengthNm[0] ?? 0, wavelengthNm.at(-1) ?? 1];
  const x = (nm: number): string =>
    (margin + ((nm - low) / (high - low)) * (width - 2 * margin)).toFixed(1);
  const y = (value: number): string =>
    (height - margin - Math.max(-0.05, Math.min(value, 1.1)) * (height - 2 * margin)).toFixed(1);
  const line = (offset: number) =>
    Array.from(
      wavelengthNm,
      (nm, i) => `${x(nm)},${y((shape[i] ?? 0) + offset * (shapeSd[i] ?? 0))}`,
    );
  const peak = shape.indexOf(1);
  const peakNm = wavelengthNm[peak] ?? low;
  return (
    <svg
      viewBox={`0 0 ${width} ${height}`}
      role="img"
      aria-label={`Estimated shape of the missing spectrum, largest at ${peakNm.toFixed(0)} nm`}
    >
      <polygon class="noise-band" points={[...line(2), ...line(-2).reverse()].join(' ')} />
      <polyline class="shape" points={line(0).join(' ')} />
      <line x1={margin} x2={width - margin} y1={y(0)} y2={y(0)} />
      <text x={margin} y={height - 6}>
        {low.toFixed(0)} nm
      </text>
      <text x={width - margin} y={height - 6} text-anchor="end">
        {high.toFixed(0)} nm
      </text>
      <text x={x(peakNm)} y={12} text-anchor="middle">
        {peakNm.toFixed(0)} nm
      </text>
    </svg>
  );
}

function EstimateTable({
  sheet,
  estimate,
}: {
  readonly sheet: Sheet;
  readonly estimate: MissingEstimate;
}) {
  const { species, aliquots, leftOut } = estimate;
  const name = species === null ? null : speciesLabel(sheet, species);
  return (
    <>
      <p class="caution">
        An estimate, not a standard: its scale is not known, so it has an absorbance and no amount.
        It shares as little as it can with the standards; what it shares in truth would be taken
        from them, so the amounts beside it are the largest that the spectra allow. Isolate the
        species and record it before a decision rests on this.
      </p>
      <table class="ledger">
        <thead>
          <tr>
            <th scope="col">Aliquot</th>
            <th scope="col" class="number">
              its absorbance at the largest, mAU
            </th>
            {name !== null && (
              <>
                <th scope="col" class="number">
                  {name} without it, % of products
                </th>
                <th scope="col" class="number">
                  with it
                </th>
              </>
            )}
          </tr>
        </thead>
        <tbody>
          {aliquots.map(({ aliquot, absorbance, without, fraction }) => (
            <tr key={aliquot}>
              <th scope="row">{aliquot}</th>
              <td class="number">{figuresText(1000 * absorbance)}</td>
              {name !== null && (
                <>
                  <td class="number">{shareText(without)}</td>
                  <td class="number">{shareText(fraction)}</td>
                </>
              )}
            </tr>
          ))}
        </tbody>
      </table>
      {leftOut.map(({ aliquot, why }) => (
        <p key={aliquot} class="soft">
          {aliquot} is left out. {why}
        </p>
      ))}
    </>
  );
}

function shareText(share: number | null): string {
  return share === null ? '—' : (100 * share).toFixed(2);
}
