import type { ChainContext } from '@/shared/flow/chain/chainTypes';
import { working } from '@/shared/flow/chain/working';
import { curtainAreaM2 } from '@/shared/flow/geometry/areas';
import { airDensityKgPerM3 } from '@/shared/flow/air/moistAir';
import { dischargeCoefficient } from '@/shared/flow/ideal/coefficients';
import { flowFromSi } from '@/shared/units/quantity';
import { toSi } from '@/shared/units/unitTables';
import days from '@/tests/vectors/benchDays.json';
import { chainContext, chainReading } from './context';

type Day = (typeof days.days)[number];
/** `printedPressure` is what the table shows where it dropped a digit of the pressure. */
type Row = {
  lift: string;
  read: string;
  pressure: string;
  plenumCelsius?: string;
  printedPressure?: string;
  c28: string;
  cd: number;
};

const roomOf = ({ air }: Day) => ({
  pressureAbsPa: air.pa,
  temperatureK: air.celsius + 273.15,
  humidityRatio: air.humidity,
});

function contextOf(day: Day, row: Row): ChainContext {
  const isBlown = day.direction === 'blowing';
  const plenum =
    row.plenumCelsius === undefined
      ? null
      : { temperatureK: Number(row.plenumCelsius) + 273.15, humidityRatio: day.plenumHumidity };
  const plain = chainContext();
  return chainContext({
    bench: { ...plain.bench, place: isBlown ? 'plenum' : 'room' },
    direction: isBlown ? 'blowing' : 'drawing',
    room: roomOf(day),
    plenum,
    leak: { reading: chainReading(day.leak, day.leakPressure), settingRatio: 1 },
    // the tables were made with the ideal gas's reference density
    reference: { ...plain.reference, densityKgPerM3: days.referenceDensity },
  });
}

const shown = (flowM3PerS: number | null) => flowFromSi(flowM3PerS ?? Number.NaN, 'cfm').toFixed(1);

it.each(days.days)('air of $name weighs what the table says', (day) => {
  expect(Math.abs(airDensityKgPerM3(roomOf(day)) - day.air.density)).toBeLessThanOrEqual(5e-7);
});

describe.each(days.days)('$name', (day) => {
  it.each(day.rows as Row[])('at $lift: $read at $pressure comes out as $c28', (row) => {
    const got = working(chainReading(row.read, row.pressure), contextOf(day, row));
    expect(shown(got.flowM3PerS)).toBe(row.c28);
    if (row.printedPressure) expect(Number(row.printedPressure) - Number(row.pressure)).toBeCloseTo(0.05, 9);
    const head = toSi('length', day.valve.head, day.valve.unit);
    const curtain = day.valve.count * curtainAreaM2(head, toSi('length', Number(row.lift), day.liftUnit));
    expect(got.unscaled && dischargeCoefficient(got.unscaled, curtain).toFixed(3)).toBe(row.cd.toFixed(3));
  });
});

it.each(Object.entries(days.withRoomAir))(
  'with room air in place of the plenum’s %s would be %s',
  (lift, wanted) => {
    const day = days.days.find(({ name }) => name === 'A exhaust')!;
    const row = (day.rows as Row[]).find((r) => r.lift === lift)!;
    const context = contextOf(day, row);
    const asRoom = {
      ...context,
      direction: 'drawing' as const,
      bench: { ...context.bench, place: 'room' as const },
    };
    expect(shown(working(chainReading(row.read, row.pressure), asRoom).flowM3PerS)).toBe(wanted);
  },
);
