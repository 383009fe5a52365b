import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { matchAwaited } from '../../../renderer/page/awaited-files.ts';

const named = (...names: string[]) => names.map((name) => ({ name }));

describe('files that a sheet waits for', () => {
  it('are met by the last part of their path, which is all that a dropped file has', () => {
    const { found, rest } = matchAwaited(
      ['crude/run1.csv', 'standards\\mono.csv'],
      named('mono.csv', 'run1.csv', 'other.csv'),
    );
    expect([...found].map(([path, { name }]) => [path, name])).toEqual([
      ['standards\\mono.csv', 'mono.csv'],
      ['crude/run1.csv', 'run1.csv'],
    ]);
    expect(rest).toEqual(named('other.csv'));
  });

  it('are not guessed where two of them have the same name in different folders', () => {
    const { found, ambiguous, rest } = matchAwaited(['a/1.csv', 'b/1.csv'], named('1.csv'));
    expect(found.size).toBe(0);
    expect(ambiguous).toEqual(['1.csv']);
    expect(rest).toEqual([]);
  });

  it('are told apart by the whole path where a file has it', () => {
    const { found, ambiguous } = matchAwaited(['a/1.csv', 'b/1.csv'], named('b/1.csv', 'a/1.csv'));
    expect(found.get('b/1.csv')).toEqual({ name: 'b/1.csv' });
    expect(found.size).toBe(2);
    expect(ambiguous).toEqual([]);
  });

  it('no file vanishes: each is found, named as ambiguous or given back', () => {
    const path = fc
      .tuple(fc.constantFrom('', 'a/', 'b/'), fc.constantFrom('1.csv', '2.csv', '3.csv'))
      .map((parts) => parts.join(''));
    fc.assert(
      fc.property(fc.uniqueArray(path), fc.uniqueArray(path), (waiting, names) => {
        const { found, ambiguous, rest } = matchAwaited(waiting, named(...names));
        const accounted = new Set([
          ...[...found.values()].map(({ name }) => name),
          ...rest.map(({ name }) => name),
        ]);
        const left = names.filter((name) => !accounted.has(name));
        expect(left.every((name) => ambiguous.some((last) => name.endsWith(last)))).toBe(true);
        expect([...found.keys()].every((wanted) => waiting.includes(wanted))).toBe(true);
      }),
    );
  });
});
