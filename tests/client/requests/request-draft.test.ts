import { describe, expect, test } from 'vitest';
import { requestFields, type RequestDto } from '#shared/contracts/requests.contract.ts';
import {
  draftOf,
  emptyDraft,
  emptyLot,
  readDraft,
  readFreeEntries,
  type LotDraft,
  type RequestDraft,
} from '#src/features/request/request-draft.view.ts';
import { looseFields } from '#src/features/request/loose-fields.view.ts';

const zone = 'Europe/Dublin';
const lot = (typed: Partial<LotDraft> = {}): LotDraft => ({
  ...emptyLot(),
  cellTypeId: '7',
  cellCount: '6',
  ...typed,
});
const draft = (typed: Partial<RequestDraft> = {}): RequestDraft => ({
  ...emptyDraft(),
  lots: [lot()],
  ...typed,
});

/** What the form sends; a test that expects errors fails here instead of comparing null. */
function sent(typed: RequestDraft) {
  const { fields, errors } = readDraft(typed, zone);
  expect([...errors]).toEqual([]);
  if (fields === null) {
    throw new Error('The draft was refused without an error.');
  }
  return requestFields.parse(fields);
}

describe('what is typed into the form', () => {
  test('goes out in the units of the contract', () => {
    const fields = sent(
      draft({
        projectId: '3',
        setTemperatureC: '45,5',
        setToleranceK: '0.25',
        tolerancePct: '5',
        lots: [lot({ stateOfChargePct: '50', storageTemperatureC: '−5' })],
        note: '  compare with the first batch ',
      }),
    );
    expect(fields.projectId).toBe(3);
    expect(fields.setTemperatureC).toBe(45.5);
    expect(fields.setToleranceK).toBe(0.25);
    expect(fields.tolerance).toEqual({ kind: 'relative', fraction: 0.05 });
    expect(fields.lots[0]).toMatchObject({
      cellTypeId: 7,
      cellCount: 6,
      stateOfChargePct: 50,
      storageTemperatureC: -5,
    });
    expect(fields.note).toBe('compare with the first batch');
  });

  test('says a tolerance in amperes where one is asked', () => {
    const { tolerance } = sent(draft({ toleranceKind: 'absolute', toleranceUa: '2.5' }));
    expect(tolerance.kind).toBe('absolute');
    expect(tolerance.kind === 'absolute' ? tolerance.currentA : 0).toBeCloseTo(2.5e-6, 15);
  });

  test('may stay open in a draft: nothing typed is null, never zero', () => {
    const fields = sent(draft({ setTemperatureC: '', lots: [emptyLot()] }));
    expect(fields.setTemperatureC).toBeNull();
    expect(fields.lots[0]).toMatchObject({
      cellTypeId: null,
      cellCount: null,
      stateOfChargePct: null,
      restedSinceAt: null,
    });
  });

  test('counts ticked serials and forgets them when cells are asked by number', () => {
    const cells = [11, 12, 13].map((id) => ({ id, serial: `NP35-00${id}` }));
    const bySerial = lot({ by: 'serial', cells, cellCount: '9' });
    expect(sent(draft({ lots: [bySerial] })).lots[0]).toMatchObject({
      cellIds: [11, 12, 13],
      cellCount: 3,
    });
    const byNumber = { ...bySerial, by: 'number' as const };
    expect(sent(draft({ lots: [byNumber] })).lots[0]).toMatchObject({ cellIds: [], cellCount: 9 });
  });

  test('reads times as the wall clock of the site', () => {
    const summer = sent(draft({ neededBy: '2026-06-22T17:00', earliestStart: '2026-12-01T08:00' }));
    expect(summer.neededByAt).toBe('2026-06-22T16:00:00.000Z');
    expect(summer.earliestStartAt).toBe('2026-12-01T08:00:00.000Z');
  });
});

describe('a form that cannot be sent', () => {
  const pointersOf = (typed: RequestDraft) => {
    const { fields, errors } = readDraft(typed, zone);
    expect(fields).toBeNull();
    return [...errors.keys()].sort();
  };

  test('names each fault at its field, as the server would', () => {
    const faults = draft({
      setTemperatureC: 'warm',
      tolerancePct: '80',
      lots: [lot({ cellCount: '2.5' }), lot({ stateOfChargePct: '120', cellCount: '70' })],
    });
    expect(pointersOf(faults)).toEqual([
      '#/lots/0/cellCount',
      '#/lots/1/cellCount',
      '#/lots/1/stateOfChargePct',
      '#/setTemperatureC',
      '#/tolerance',
    ]);
  });

  test('does not take a number with two readings', () => {
    expect(pointersOf(draft({ setTemperatureC: '1,234.5' }))).toEqual(['#/setTemperatureC']);
  });

  test('refuses a time that the clock jumps over at the site', () => {
    const { errors } = readDraft(draft({ neededBy: '2026-03-29T01:30' }), zone);
    expect(errors.get('#/neededByAt')).toContain('Europe/Dublin');
  });

  test('asks for a tolerance in amperes that is larger than zero', () => {
    expect(pointersOf(draft({ toleranceKind: 'absolute', toleranceUa: '' }))).toEqual([
      '#/tolerance',
    ]);
  });
});

const saved: RequestDto = {
  id: 1187,
  site: 'larkfen',
  state: 'submitted',
  requester: { id: 4, name: 'B. Hallowe' },
  project: { id: 3, name: 'Anvil traction modules' },
  kind: 'settled',
  grade: 'reported',
  lots: [
    {
      id: 21,
      cellTypeId: 7,
      cellTypeName: 'NP35',
      cellIds: [11, 12],
      cellCount: 2,
      stateOfChargePct: 50,
      restedSinceAt: '2026-05-01T09:00:00.000Z',
      storageTemperatureC: 20,
      isDamaged: false,
      cells: [
        { id: 11, serial: 'NP35-0011' },
        { id: 12, serial: 'NP35-0012' },
      ],
      bookingId: null,
    },
  ],
  setTemperatureC: 45,
  setToleranceK: 0.5,
  tolerance: { kind: 'absolute', currentA: 2.4e-6 },
  badToGoodRatio: 3,
  earliestStartAt: '2026-06-17T07:00:00.000Z',
  neededByAt: '2026-06-22T16:00:00.000Z',
  maySplit: true,
  note: 'as agreed',
  priority: 'normal',
  declineReason: null,
  withdrawReason: null,
  proposal: null,
  createdAt: '2026-06-01T09:00:00.000Z',
  submittedAt: '2026-06-02T09:00:00.000Z',
  version: 3,
};

describe('the aim that is not shown', () => {
  test('never stops the form with a fault that nobody can see', () => {
    const screening = sent(draft({ kind: 'screening', tolerancePct: '80', badToGoodRatio: '2' }));
    expect(screening.badToGoodRatio).toBe(2);
    expect(screening.tolerance).toEqual({ kind: 'relative', fraction: 0.1 });
    expect(sent(draft({ kind: 'settled', badToGoodRatio: '' })).badToGoodRatio).toBe(3);
  });
});

describe('a figure that even a draft must have', () => {
  test.each([
    ['#/setToleranceK', { setToleranceK: '' }],
    ['#/tolerance', { tolerancePct: ' ' }],
    ['#/badToGoodRatio', { kind: 'screening', badToGoodRatio: '' }],
  ] as const)('is asked for at %s instead of being made up', (pointer, typed) => {
    expect([...readDraft(draft(typed), zone).errors.keys()]).toEqual([pointer]);
  });
});

describe('a saved request opened in the form', () => {
  test('comes back unchanged when nothing is typed', () => {
    const fields = sent(draftOf(saved, zone));
    const { lots } = fields;
    expect(fields).toMatchObject({
      projectId: 3,
      kind: saved.kind,
      grade: saved.grade,
      setTemperatureC: saved.setTemperatureC,
      setToleranceK: saved.setToleranceK,
      badToGoodRatio: saved.badToGoodRatio,
      earliestStartAt: saved.earliestStartAt,
      neededByAt: saved.neededByAt,
      maySplit: true,
      note: saved.note,
    });
    expect(fields.tolerance.kind === 'absolute' ? fields.tolerance.currentA : 0).toBeCloseTo(
      2.4e-6,
      15,
    );
    expect(lots).toEqual([
      {
        cellTypeId: 7,
        cellIds: [11, 12],
        cellCount: 2,
        stateOfChargePct: 50,
        restedSinceAt: '2026-05-01T09:00:00.000Z',
        storageTemperatureC: 20,
        isDamaged: false,
      },
    ]);
  });

  test.each([0.07, 0.28, 0.055, 0.29])(
    'shows the tolerance %d as typed and sends it back without the dust of binary fractions',
    (fraction) => {
      const opened = draftOf({ ...saved, tolerance: { kind: 'relative', fraction } }, zone);
      expect(opened.tolerancePct.length).toBeLessThan(4);
      expect(sent(opened).tolerance).toEqual({ kind: 'relative', fraction });
    },
  );
});

describe('a booked request', () => {
  test('goes back to the last digit except for its note and the day it is needed by', () => {
    const booked: RequestDto = {
      ...saved,
      state: 'booked',
      tolerance: { kind: 'relative', fraction: 0.123456789012345 },
      earliestStartAt: '2026-06-17T07:00:31.250Z',
    };
    const typed = { ...draftOf(booked, zone), note: 'call first', neededBy: '2026-06-23T09:00' };
    const { fields } = readFreeEntries(typed, booked, zone);
    expect(fields).toMatchObject({
      tolerance: booked.tolerance,
      earliestStartAt: booked.earliestStartAt,
      note: 'call first',
      neededByAt: '2026-06-23T08:00:00.000Z',
    });
  });
});

describe('what the estimate takes from a half-typed form', () => {
  test('leaves out what is no number yet and what lies outside its limits', () => {
    const loose = looseFields(
      draft({
        setTemperatureC: '4x',
        lots: [lot({ cellCount: '0', stateOfChargePct: '101' }), lot({ cellCount: '65' })],
      }),
    );
    expect(loose.setTemperatureC).toBeNull();
    expect(loose.lots.map((each) => [each.cellCount, each.stateOfChargePct])).toEqual([
      [null, null],
      [null, null],
    ]);
  });

  test('takes no tolerance or ratio that could not be sent', () => {
    expect(looseFields(draft({ tolerancePct: '' })).tolerance).toBeNull();
    expect(looseFields(draft({ tolerancePct: '80' })).tolerance).toBeNull();
    expect(looseFields(draft({ badToGoodRatio: '1' })).badToGoodRatio).toBeNull();
    expect(looseFields(draft({ toleranceKind: 'absolute', toleranceUa: '3' })).tolerance).toEqual({
      kind: 'absolute',
      currentA: 3e-6,
    });
  });

  test('agrees with what is sent once everything is typed', () => {
    const typed = draft({ setTemperatureC: '45', tolerancePct: '5' });
    const fields = sent(typed);
    const loose = looseFields(typed);
    expect(loose.setTemperatureC).toBe(fields.setTemperatureC);
    expect(loose.tolerance).toEqual(fields.tolerance);
    expect(loose.lots[0]?.cellCount).toBe(fields.lots[0]?.cellCount);
  });
});
