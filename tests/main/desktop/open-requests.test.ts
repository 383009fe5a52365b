import { describe, expect, it } from 'vitest';
import { OpenRequests, sheetsIn } from '../../../main/desktop/open-requests.ts';

describe('a sheet asked for', () => {
  it('is held until the page is there, and opened once', () => {
    const requests = new OpenRequests();
    const opened: string[] = [];
    requests.ask('a.sheet.json');
    requests.ask('b.sheet.json');
    requests.deliverTo((file) => opened.push(file));
    requests.deliverTo((file) => opened.push(file));
    expect(opened).toEqual(['b.sheet.json']);
    requests.ask('c.sheet.json');
    expect(opened).toEqual(['b.sheet.json', 'c.sheet.json']);
  });

  it('is held again while the page is gone', () => {
    const requests = new OpenRequests();
    const opened: string[] = [];
    requests.deliverTo((file) => opened.push(file));
    requests.hold();
    requests.ask('a.sheet.json');
    expect(opened).toEqual([]);
    requests.deliverTo((file) => opened.push(file));
    expect(opened).toEqual(['a.sheet.json']);
  });
});

it('of the arguments only sheets are taken, never the program or an option', () => {
  expect(
    sheetsIn(['/bin/program.json', '.', '--flag=x.json', 'notes.txt', 'a.sheet.json', 'B.JSON']),
  ).toEqual(['a.sheet.json', 'B.JSON']);
});
