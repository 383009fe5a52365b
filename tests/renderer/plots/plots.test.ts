import { readdirSync, readFileSync, statSync } from 'node:fs';
import path from 'node:path';
import { describe, expect, it } from 'vitest';
import { quantify } from '../../../analysis/index.ts';
import { fitFigure } from '../../../renderer/plots/fit-figure.ts';
import { plotConfig } from '../../../renderer/plots/plotly.ts';
import { syntheticSheet } from '../../analysis/synthetic.ts';

const renderer = path.resolve(import.meta.dirname, '../../../renderer');

function filesBelow(folder: string): string[] {
  return readdirSync(folder).flatMap((name) => {
    const file = path.join(folder, name);
    return statSync(file).isDirectory() ? filesBelow(file) : [file];
  });
}

describe('plots', () => {
  it('are made in one place, where nothing is offered to any server', () => {
    expect(plotConfig).toMatchObject({
      showSendToCloud: false,
      plotlyServerURL: '',
      displaylogo: false,
      displayModeBar: false,
    });
    const makers = filesBelow(renderer).filter((file) =>
      /import\((['"])plotly|from (['"])plotly(?!.*type)/.test(
        readFileSync(file, 'utf8').replace(/import type .*\n/g, ''),
      ),
    );
    expect(makers.map((file) => path.relative(renderer, file))).toEqual(['plots/plotly.ts']);
  });

  it('never draw with what the policy forbids', () => {
    for (const file of filesBelow(renderer).filter((each) => /\.tsx?$/.test(each))) {
      expect(readFileSync(file, 'utf8'), file).not.toMatch(/scattergl|<b>|<sub>|<sup>/);
    }
  });

  const theme = {
    isDark: false,
    ink: '#111111',
    soft: '#444444',
    faint: '#777777',
    rule: '#dddddd',
    paper: '#ffffff',
    well: '#eeeeee',
    doubt: '#7a4a00',
    font: 'sans-serif',
  };
  const sheet = {
    ...syntheticSheet(),
    fit: { windowNm: [260, 440] as const, excludeNm: [[300, 304]] as const },
  };
  const { curves, results } = quantify(sheet, new Map());
  const figure = fitFigure({
    sheet,
    curves: curves[0]!,
    doubts: results.aliquots[0]!.doubts,
    theme,
    rangeNm: [226, 474],
  });

  it('stack the contributions up to the fitted curve', () => {
    const named = (name: string) => figure.data.find((trace) => trace.name === name);
    const [top, fitted] = [named('bis'), named('fitted')];
    const y = (trace: typeof top, at: number): number => {
      if (!trace || !('y' in trace) || !(trace.y instanceof Float64Array))
        throw new Error('no such trace');
      return trace.y[at] ?? Number.NaN;
    };
    const at = curves[0]!.wavelengthNm.indexOf(350);
    // sums of the same numbers in another order
    expect(y(top, at)).toBeCloseTo(y(fitted, at), 12);
    expect(y(fitted, curves[0]!.wavelengthNm.indexOf(302))).toBeNaN();
  });

  it('name each species on its own layer', () => {
    const labels = figure.layout.annotations?.map(({ text }) => text);
    expect(labels).toEqual(expect.arrayContaining(['arm', 'mono', 'bis']));
  });
});
