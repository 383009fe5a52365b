import { useEffect, useState } from 'preact/hooks';
import {
  refusalSentence,
  type Sheet,
  speciesLabel,
  type WindowMap,
  type WindowMapCell,
} from '../../../analysis/index.ts';
import { mapWindows } from '../../worker/analysis-client.ts';
import './window-map.css';

interface WindowMapProps {
  readonly sheet: Sheet;
  readonly aliquot: string;
  readonly onWindow: (windowNm: readonly [number, number]) => void;
}

type Found =
  | { readonly is: 'map'; readonly sheet: Sheet; readonly map: WindowMap }
  | { readonly is: 'refused'; readonly sheet: Sheet; readonly why: string };

/** Where the answer holds: refits on narrowed windows, computed when it is unfolded. */
export function WindowMapPanel({ sheet, aliquot, onWindow }: WindowMapProps) {
  const [isOpen, setOpen] = useState(false);
  const [found, setFound] = useState<Found | null>(null);
  useEffect(() => {
    if (!isOpen) return undefined;
    let isWanted = true;
    void mapWindows(sheet, aliquot).then((outcome) => {
      if (!isWanted) return;
      setFound(
        outcome.ok
          ? { is: 'map', sheet, map: outcome.value }
          : { is: 'refused', sheet, why: refusalSentence(outcome.refusal) },
      );
    });
    return () => {
      isWanted = false;
    };
  }, [isOpen, sheet, aliquot]);
  return (
    <details class="window-map" onToggle={(event) => setOpen(event.currentTarget.open)}>
      <summary>Where the answer holds</summary>
      {found === null && <p role="status">Refitting on narrowed windows …</p>}
      {found?.is === 'refused' && <p role="status">{found.why}</p>}
      {found?.is === 'map' && (
        <MapTable
          sheet={sheet}
          map={found.map}
          isStale={found.sheet !== sheet || found.map.aliquot !== aliquot}
          onWindow={onWindow}
        />
      )}
    </details>
  );
}

interface MapTableProps {
  readonly sheet: Sheet;
  readonly map: WindowMap;
  readonly isStale: boolean;
  readonly onWindow: WindowMapProps['onWindow'];
}

function MapTable({ sheet, map, isStale, onWindow }: MapTableProps) {
  const name = speciesLabel(sheet, map.species);
  const [top = []] = map.rows;
  const decimals = decimalsOf(map);
  return (
    <table class="ledger" data-stale={isStale || undefined}>
      <caption>
        {name}, % of products, fitted on part of the window. ≠ departs from the whole window by more
        than noise explains. Choose one to take that window.
      </caption>
      <thead>
        <tr>
          <th scope="col">to, nm ↓ from, nm →</th>
          {top.map((cell, column) => (
            <th key={column} scope="col" class="number">
              {cell ? nmText(cell.windowNm[0]) : '–'}
            </th>
          ))}
        </tr>
      </thead>
      <tbody>
        {map.rows.map((row, index) => (
          <tr key={index}>
            <th scope="row" class="number">
              {row[0] ? nmText(row[0].windowNm[1]) : '–'}
            </th>
            {row.map((cell, column) => (
              <td key={column} class="number">
                {cell ? (
                  <Cell cell={cell} name={name} decimals={decimals} onWindow={onWindow} />
                ) : (
                  '–'
                )}
              </td>
            ))}
          </tr>
        ))}
      </tbody>
    </table>
  );
}

interface CellProps {
  readonly cell: WindowMapCell;
  readonly name: string;
  readonly decimals: number;
  readonly onWindow: WindowMapProps['onWindow'];
}

function Cell({ cell, name, decimals, onWindow }: CellProps) {
  const [low, high] = cell.windowNm;
  const share = (100 * cell.fraction).toFixed(decimals);
  const verdict = cell.agrees ? 'agrees with the whole window' : 'departs from the whole window';
  return (
    <button
      type="button"
      class="map-cell"
      data-departs={!cell.agrees || undefined}
      aria-label={`${name} ${share} % from ${nmText(low)} to ${nmText(high)} nm, ${verdict}; take this window`}
      onClick={() => onWindow(cell.windowNm)}
    >
      {cell.agrees ? '' : '≠ '}
      {share}
    </button>
  );
}

/** As many as tell the least certain cell's departure from noise, the same in all. */
function decimalsOf({ rows }: WindowMap): number {
  const largest = Math.max(...rows.flat().map((cell) => cell?.departureSd ?? 0));
  const decimals = largest > 0 ? Math.ceil(-Math.log10(100 * largest)) + 1 : 2;
  return Math.min(Math.max(decimals, 1), 4);
}

function nmText(nm: number): string {
  return String(Number(nm.toFixed(1)));
}
