import type { z } from 'zod';
import { type AirState, carriedHumidityRatio, moistAir } from '@/shared/flow/air/moistAir';
import type { Direction } from '@/shared/schema/primitives';
import type { ElementPlace } from '@/shared/schema/records';
import { OutOfRangeError, zeroOrMore } from '@/shared/units/outOfRange';

type Place = z.infer<typeof ElementPlace>;

/** The plenum's own air when blowing: its temperature must be asked for; its humidity follows from the room's when it was
 * not measured. */
export type PlenumAir = { temperatureK: number; humidityRatio: number | null };

export type BenchAir = {
  room: AirState;
  plenum: PlenumAir | null;
  direction: Direction;
  /** test pressure of the reading, Pa */
  pressureDropPa: number;
};

export type PlaceState = AirState & {
  densityKgPerM3: number;
  /** sentences for the working: what was assumed, what lies outside a range */
  notes: string[];
};

const noTemperature = 'The plenum’s temperature was not noted: the room’s is taken.';

function stateOf(air: BenchAir, pressureAbsPa: number, isPlenumAir: boolean): PlaceState {
  const notes: string[] = [];
  const isRoom = pressureAbsPa === air.room.pressureAbsPa && !isPlenumAir;
  let { temperatureK, humidityRatio } = air.room;
  if (!isRoom) {
    if (isPlenumAir && air.plenum === null) notes.push(noTemperature);
    const plenum = isPlenumAir ? air.plenum : null;
    temperatureK = plenum?.temperatureK ?? air.room.temperatureK;
    humidityRatio = plenum?.humidityRatio ?? carriedHumidityRatio(air.room, { pressureAbsPa, temperatureK });
  }
  const { densityKgPerM3, rangeNote } = moistAir({ pressureAbsPa, temperatureK, humidityRatio });
  if (rangeNote) notes.push(rangeNote);
  return { pressureAbsPa, temperatureK, humidityRatio, densityKgPerM3, notes };
}

function shiftedPa(air: BenchAir, sign: 1 | -1): number {
  const drop = zeroOrMore(air.pressureDropPa, 'test pressure');
  if (drop >= air.room.pressureAbsPa)
    throw new OutOfRangeError('test pressure', 'The test pressure is above the air pressure of the room.');
  return air.room.pressureAbsPa + sign * drop;
}

/** State of the air at the inlet of the test piece: the room when drawing; the plenum when blowing, p0 = room + Δp at the
 * plenum's own temperature. Density by CIPM-2007, water carried along from the room unless it was measured.
 * @param air.room room air: pressure Pa, temperature K, humidity 0..1 @param air.plenum temperature K, humidity 0..1 or null
 * @param air.direction drawing or blowing, independent of intake and exhaust @param air.pressureDropPa test pressure, Pa
 * @returns pressure Pa, temperature K, humidity 0..1, density kg/m³, and sentences (flagged) on what was assumed
 * @throws OutOfRangeError (a RangeError) where `moistAir` does, or for a test pressure above the room's
 * Range: as `moistAir`. Source: flow-maths, section 1; Picard et al., Metrologia 45 (2008) 149.
 * @example inletState({ room: { pressureAbsPa: 99400, temperatureK: 297.15, humidityRatio: 0.45 }, plenum: null, direction: 'drawing', pressureDropPa: 6974 }) // { densityKgPerM3: 1.159772 }
 */
export function inletState(air: BenchAir): PlaceState {
  return air.direction === 'drawing'
    ? stateOf(air, air.room.pressureAbsPa, false)
    : stateOf(air, shiftedPa(air, 1), true);
}

/** State of the air at the flow element: in the room as the room; after the port at room − Δp when drawing, at the room's
 * pressure with the plenum's temperature when blowing; in the plenum at room − Δp when drawing, at room + Δp when blowing.
 * @param air.room room air: pressure Pa, temperature K, humidity 0..1 @param air.plenum temperature K, humidity 0..1 or null
 * @param air.direction drawing or blowing @param air.pressureDropPa test pressure, Pa
 * @param place where the element sits: room, afterPort or plenum
 * @returns pressure Pa, temperature K, humidity 0..1, density kg/m³, and sentences (flagged) on what was assumed
 * @throws OutOfRangeError (a RangeError) where `moistAir` does, or for a test pressure above the room's
 * Range: as `moistAir`. Source: flow-maths, section 1, step 4.
 * @example elementState({ room: { pressureAbsPa: 101325, temperatureK: 293.15, humidityRatio: 0 }, plenum: null, direction: 'drawing', pressureDropPa: 6974.48948 }, 'afterPort') // { pressureAbsPa: 94350.51 }
 */
export function elementState(air: BenchAir, place: Place): PlaceState {
  if (place === 'room') return stateOf(air, air.room.pressureAbsPa, false);
  if (air.direction === 'drawing')
    // below a drawn port the air keeps the room's temperature unless the plenum's own was noted
    return stateOf(air, shiftedPa(air, -1), place === 'plenum' && air.plenum !== null);
  return place === 'plenum'
    ? stateOf(air, shiftedPa(air, 1), true)
    : stateOf(air, air.room.pressureAbsPa, true);
}

/** Whether the element sits in the very air that enters the test piece: the room when drawing, the plenum when blowing.
 * Formula: none.
 * @param direction drawing or blowing @param place where the element sits: room, afterPort or plenum
 * @returns true or false @throws nothing: both are closed lists
 * Range: every direction and place. Source: flow-maths, section 1.
 * @example isAtInlet('blowing', 'plenum') // true
 */
export function isAtInlet(direction: Direction, place: Place): boolean {
  return place === (direction === 'drawing' ? 'room' : 'plenum');
}
