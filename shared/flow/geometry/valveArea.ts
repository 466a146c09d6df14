import { OutOfRangeError, between, positive, zeroOrMore } from '@/shared/units/outOfRange';
import { throatAreaM2 } from './areas';

/** A valve on its seat: head, inner seat, stem and throat diameters and the seat angle against the valve's plane. */
export type ValveOnSeat = {
  headDiameterM: number;
  seatInnerDiameterM: number;
  stemDiameterM: number;
  throatDiameterM: number;
  seatAngleRad: number;
};

export type ValveAreaStage = 1 | 2 | 3;

export type ValveArea = {
  areaM2: number;
  /** 1: the gap is square to the seat · 2: the gap is a slanted ring · 3: the throat is the narrowest */
  stage: ValveAreaStage;
};

/** Lifts at which one stage gives way to the next: the gap starts to slant, the throat takes over. */
export type ValveAreaJoins = { slantLiftM: number; throatLiftM: number };

type Parts = { v: number; w: number; dm: number; tan: number; throatM2: number; seatAngleRad: number };

function partsOf(valve: ValveOnSeat): Parts {
  const v = positive(valve.headDiameterM, 'head diameter');
  const inner = positive(valve.seatInnerDiameterM, 'inner seat diameter');
  if (inner >= v)
    throw new OutOfRangeError('inner seat diameter', 'The inner seat must be smaller than the valve head.');
  const throatM2 = throatAreaM2(valve.throatDiameterM, valve.stemDiameterM);
  if (valve.throatDiameterM > v)
    throw new OutOfRangeError('throat diameter', 'The throat must not be wider than the valve head.');
  const seatAngleRad = between(valve.seatAngleRad, Math.PI / 18, (4 * Math.PI) / 9, 'seat angle in radians');
  const w = (v - inner) / 2;
  return { v, w, dm: v - w, tan: Math.tan(seatAngleRad), throatM2, seatAngleRad };
}

function joinsOf({ w, dm, tan, throatM2, seatAngleRad }: Parts): ValveAreaJoins {
  const slantLiftM = w / (Math.sin(seatAngleRad) * Math.cos(seatAngleRad));
  const slant = throatM2 / (Math.PI * dm);
  // a seat so wide that the throat is already the narrowest when the gap begins to slant has no middle stage
  const throatLiftM = slant > w ? Math.sqrt(slant ** 2 - w ** 2) + w * tan : slantLiftM;
  return { slantLiftM, throatLiftM: Math.max(slantLiftM, throatLiftM) };
}

/** Lifts at which the three-stage area changes its form: w/(sinβ cosβ), and √(((Dp²−Ds²)/(4Dm))² − w²) + w tanβ with
 * w = (Dv−Di)/2, Dm = Dv − w.
 * @param valve.headDiameterM head, m @param valve.seatInnerDiameterM inner seat, m @param valve.stemDiameterM stem, m
 * @param valve.throatDiameterM throat, m @param valve.seatAngleRad seat angle, rad
 * @returns both lifts, m @throws OutOfRangeError (a RangeError) where `threeStageArea` does
 * Range: as `threeStageArea`. Source: Heywood, Internal Combustion Engine Fundamentals, eq. 6.7 to 6.9.
 * @example threeStageJoins({ headDiameterM: 0.04, seatInnerDiameterM: 0.036, stemDiameterM: 0.007, throatDiameterM: 0.034, seatAngleRad: Math.PI / 4 }) // { slantLiftM: 0.004000, throatLiftM: 0.009002896 }
 */
export function threeStageJoins(valve: ValveOnSeat): ValveAreaJoins {
  return joinsOf(partsOf(valve));
}

/** Smallest geometric area a valve leaves at a lift, in three stages. With w = (Dv−Di)/2, Dm = Dv − w, β the seat angle:
 * up to L = w/(sinβ cosβ): πL cosβ (Dv − 2w + (L/2) sin2β); then πDm √((L − w tanβ)² + w²); at last the throat,
 * π(Dp²−Ds²)/4. Never above the throat.
 * @param valve.headDiameterM head, m @param valve.seatInnerDiameterM inner seat, m @param valve.stemDiameterM stem, m
 * @param valve.throatDiameterM throat, m @param valve.seatAngleRad seat angle, rad @param liftM lift, m
 * @returns area m², and the stage 1 to 3 it lies in
 * @throws OutOfRangeError (a RangeError) unless stem < throat ≤ head, inner seat < head, angle 10° to 80°, lift ≥ 0
 * Range: one seat angle; for multi-angle work it is an approximation and is said to be.
 * Source: Heywood, Internal Combustion Engine Fundamentals, eq. 6.7 to 6.9 (a version with a wrong sign circulates).
 * @example threeStageArea({ headDiameterM: 0.04, seatInnerDiameterM: 0.036, stemDiameterM: 0.007, throatDiameterM: 0.034, seatAngleRad: Math.PI / 4 }, 0.001) // { areaM2: 0.00008108261, stage: 1 }
 */
export function threeStageArea(valve: ValveOnSeat, liftM: number): ValveArea {
  const parts = partsOf(valve);
  const lift = zeroOrMore(liftM, 'lift');
  const { slantLiftM, throatLiftM } = joinsOf(parts);
  const { v, w, dm, tan, throatM2, seatAngleRad } = parts;
  if (lift > throatLiftM) return { areaM2: throatM2, stage: 3 };
  const isSlanted = lift > slantLiftM;
  const areaM2 = isSlanted
    ? Math.PI * dm * Math.hypot(lift - w * tan, w)
    : Math.PI * lift * Math.cos(seatAngleRad) * (v - 2 * w + (lift / 2) * Math.sin(2 * seatAngleRad));
  return areaM2 >= throatM2 ? { areaM2: throatM2, stage: 3 } : { areaM2, stage: isSlanted ? 2 : 1 };
}
