import { readdirSync, readFileSync, statSync } from 'node:fs';
import path from 'node:path';
import { describe, expect, it } from 'vitest';
import { plotConfig } from '../../../renderer/plots/plotly.ts';

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
});
