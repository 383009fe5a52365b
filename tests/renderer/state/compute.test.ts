import { beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { newSheet, type Quantification, type Sheet, setTitle } from '../../../analysis/index.ts';
import { startComputing } from '../../../renderer/state/compute.ts';
import {
  change,
  obstacle,
  quantification,
  replaceSheet,
  sheet,
} from '../../../renderer/state/store.ts';
import type { Outcome } from '../../../renderer/worker/analysis.worker.ts';

interface Question {
  readonly of: Sheet;
  readonly answer: (outcome: Outcome<Quantification>) => void;
  readonly fail: (error: unknown) => void;
}

const questions: Question[] = [];
const faults: unknown[] = [];
const ask = (of: Sheet): Promise<Outcome<Quantification>> =>
  new Promise((answer, fail) => questions.push({ of, answer, fail }));

/** An answer that can be told from others by the title of its sheet. */
function answerFor(of: Sheet): Outcome<Quantification> {
  const results = {
    format: 'monobis-results' as const,
    version: 1 as const,
    program: 'a stand-in',
    title: of.title ?? '',
    aliquots: [],
    runs: [],
    comparisons: [],
    refused: [],
    warnings: [],
  };
  return { ok: true, value: { results, curves: [], standards: [] } };
}

const settled = (): Promise<void> => new Promise((resolve) => setTimeout(resolve, 0));
const shownTitle = (): string | undefined => quantification.peek()?.results.title;
const titled = (title: string): void => change('title', (before) => setTitle(before, title));
const open = (title: string): void =>
  replaceSheet(setTitle(newSheet(), title), { name: null, handle: null, isSaved: true });

async function answerAll(): Promise<void> {
  for (let next = questions.shift(); next; next = questions.shift()) {
    next.answer(answerFor(next.of));
    await settled();
  }
}

beforeAll(() => startComputing(ask, (error) => faults.push(error)));
beforeEach(async () => {
  await answerAll();
  faults.length = 0;
});

describe('computing', () => {
  it('asks for the newest sheet only, and ends with its answer', async () => {
    open('first');
    await answerAll();
    titled('second');
    titled('third');
    titled('fourth');
    // one is under way; of those that waited only the newest is asked for
    expect(questions.map(({ of }) => of.title)).toEqual(['second']);
    questions.shift()?.answer(answerFor(setTitle(sheet.peek(), 'second')));
    await settled();
    expect(questions.map(({ of }) => of.title)).toEqual(['fourth']);
    await answerAll();
    expect(shownTitle()).toBe('fourth');
  });

  it('takes the answer away with the sheet it belongs to', async () => {
    open('one');
    await answerAll();
    expect(shownTitle()).toBe('one');
    open('another');
    expect(quantification.peek()).toBeNull();
    await answerAll();
    expect(shownTitle()).toBe('another');
  });

  it('does not put a late answer under a sheet that was opened meanwhile', async () => {
    open('slow');
    const slow = questions.shift();
    open('opened meanwhile');
    if (!slow) throw new Error('nothing was asked');
    slow.answer(answerFor(slow.of));
    await settled();
    expect(quantification.peek()).toBeNull();
    await answerAll();
    expect(shownTitle()).toBe('opened meanwhile');
  });

  it('shows why a sheet cannot be computed instead of the last answer', async () => {
    open('fine');
    await answerAll();
    titled('no longer');
    questions
      .shift()
      ?.answer({ ok: false, refusal: { code: 'x', message: 'No standard.', mend: 'Load one.' } });
    await settled();
    expect(quantification.peek()).toBeNull();
    expect(obstacle.peek()?.message).toBe('No standard.');
    titled('again');
    await answerAll();
    expect(obstacle.peek()).toBeNull();
    expect(shownTitle()).toBe('again');
  });

  it('tells a fault, shows no answer, and goes on with the next sheet', async () => {
    open('breaks');
    questions.shift()?.fail(new Error('the worker is gone'));
    await settled();
    expect(faults).toHaveLength(1);
    expect(quantification.peek()).toBeNull();
    titled('after');
    await answerAll();
    expect(shownTitle()).toBe('after');
  });
});
