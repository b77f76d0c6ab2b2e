import { formatCurrent } from '#shared/domain/checks/words/format-current.ts';
import { formatFigure } from '#shared/domain/checks/words/format-figure.ts';
import { formatTemperature } from '#shared/domain/checks/words/format-temperature.ts';
import type { InstrumentDto } from '#shared/contracts/equipment.contract.ts';
import type { Specs } from './equipment.repository.ts';

type Fact = InstrumentDto['facts'][number];

/** What an instrument can do, each figure with its unit and where it comes from. */
export function presentFacts(specs: Specs): Fact[] {
  return [
    ...chamberFacts(specs),
    ...specs.sources.flatMap((row) => sourceFacts(row)),
    ...specs.ranges.flatMap((row) => rangeFacts(row)),
  ];
}

function chamberFacts({ chamber, positions }: Specs): Fact[] {
  if (chamber === null) {
    return [];
  }
  const fact = (name: string, value: string): Fact => ({ name, value, source: 'chamber record' });
  const degrees = (mdegc: number) => formatTemperature(mdegc / 1000);
  return [
    fact('Span', `${degrees(chamber.minSetTempMdegc)} to ${degrees(chamber.maxSetTempMdegc)}`),
    fact('Idle temperature', degrees(chamber.idleTempMdegc)),
    fact('Ramp', `${formatFigure(chamber.rampKPerMin)} K/min`),
    {
      ...fact(
        'Door rule',
        chamber.strict ? 'strict: no opening in a still phase' : 'tolerant at idle temperature',
      ),
      source: chamber.strict ? 'default' : 'judged log',
    },
    fact('Protects up to', `hazard level ${chamber.protectionLevel}`),
    fact('Energy limit', `${formatFigure(chamber.maxEnergyWh)} Wh`),
    fact('Cell limit', `${chamber.maxCells} cells`),
    fact('Positions', String(positions.length)),
    ...positionFacts(positions),
  ];
}

/** Positions that take the same are said once. */
function positionFacts(positions: Specs['positions']): Fact[] {
  const groups = new Map<string, Specs['positions'][number][]>();
  for (const position of positions) {
    const key = JSON.stringify([position.formats, position.maxAh, position.maxHazard]);
    groups.set(key, [...(groups.get(key) ?? []), position]);
  }
  return [...groups.values()].flatMap((group): Fact[] => {
    const [first] = group;
    const last = group.at(-1);
    if (first === undefined || last === undefined) {
      return [];
    }
    const name = group.length === 1 ? first.label : `${first.label} to ${last.label}`;
    return [
      {
        name,
        value: `${first.formats.join(', ')}; up to ${formatFigure(first.maxAh)} Ah, hazard level ${first.maxHazard}`,
        source: first.holder ?? 'position record',
      },
    ];
  });
}

function sourceFacts({ spec, channelLabel }: Specs['sources'][number]): Fact[] {
  const source = channelLabel === null ? 'source record' : `source record of ${channelLabel}`;
  const fact = (name: string, value: string): Fact => ({ name, value, source });
  const micro = (value: number) => formatFigure(value * 1e6);
  return [
    fact('Voltage span', `${formatFigure(spec.minV)} V to ${formatFigure(spec.maxV)} V`),
    fact(
      'Stability',
      spec.stabilityVPerH === null ? 'not stated' : `${micro(spec.stabilityVPerH)} µV/h`,
    ),
    fact('Noise', `${micro(spec.noiseV)} µV`),
    fact('Output resistance', `${formatFigure(spec.outputOhm)} Ω`),
    fact(
      'Temperature coefficient',
      spec.tempcoVPerK === null ? 'not stated' : `${micro(spec.tempcoVPerK)} µV/K`,
    ),
  ];
}

function rangeFacts({ range, channelLabel }: Specs['ranges'][number]): Fact[] {
  const where = channelLabel === null ? '' : `${channelLabel} `;
  const burden =
    range.burdenOhm === null
      ? 'burden unknown: it cannot be booked'
      : `burden ${formatFigure(range.burdenOhm)} Ω ${range.burdenInsideLoop === true ? 'inside' : 'outside'} the sense loop`;
  const accuracy = `±(${formatFigure(range.accuracyPpmReading)} ppm of reading + ${formatFigure(range.accuracyPpmRange)} ppm of range + ${formatCurrent(range.accuracyA)})`;
  return [
    {
      name: `${where}Range ${range.label}`,
      value: `resolution ${formatCurrent(range.resolutionA)}, noise ${formatCurrent(range.noiseA)}, ${accuracy}; ${burden}`,
      source: 'range record',
    },
  ];
}
