import type { z } from 'zod';
import type { recordCalibration } from '#shared/contracts/calibrations.contract.ts';

type Wish = z.input<typeof recordCalibration.body>;

/** What a metrologist enters for a calibration of all that an instrument measures; change what matters. */
export function calibrationWish(tag: string, change: Partial<Wish> = {}): Wish {
  return {
    tag,
    scopes: [{ channelId: null, function: 'measure', meterRangeId: null, limitation: null }],
    performedOn: '2026-03-02',
    dueOn: '2027-03-01',
    provider: 'Calibration bench',
    certificateNumber: 'CB-2204',
    conformityAsFound: 'conforms',
    conformityAsLeft: 'conforms',
    note: '',
    fileId: null,
    ...change,
  };
}
