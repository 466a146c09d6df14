import fc from 'fast-check';
import { readNumber } from '@/shared/units/quantity';
import { liftsBySteps, liftsFromList } from '@/shared/session/liftPlan';

const steps = (firstText: string, stepText: string, lastText: string, mark: '.' | ',' = '.') =>
  liftsBySteps({ firstText, stepText, lastText, unit: 'in' }, mark);

it('keeps the decimals that were keyed', () => {
  expect(steps('0.050', '0.050', '0.200')).toEqual({
    lifts: ['0.050', '0.100', '0.150', '0.200'].map((text) => ({ text, unit: 'in' })),
  });
});

it('writes the shop’s decimal mark', () => {
  expect(steps('0,5', '0,5', '1,5', ',')).toMatchObject({
    lifts: [{ text: '0,5' }, { text: '1,0' }, { text: '1,5' }],
  });
});

it('stops at the last whole step below the last lift', () => {
  expect(steps('1', '2', '6')).toMatchObject({ lifts: [{ text: '1' }, { text: '3' }, { text: '5' }] });
});

it.each([
  ['', '1', '5', 'needed'],
  ['1', '0', '5', 'above zero'],
  ['0', '1', '5', 'above zero'],
  ['5', '1', '2', 'below the first'],
  ['1.2.3', '1', '5', 'not one number'],
  ['1', '0.001', '5', 'is the most'],
])('says what is wrong with %j, %j, %j', (first, step, last, part) => {
  expect(steps(first, step, last)).toEqual({ sentence: expect.stringContaining(part) });
});

it('reads a typed list, and refuses doubles, zeros and what is no number', () => {
  expect(liftsFromList('2, 4; 6\n10', 'mm', '.')).toMatchObject({
    lifts: [{ text: '2' }, { text: '4' }, { text: '6' }, { text: '10' }],
  });
  expect(liftsFromList('0,5 1,0', 'mm', ',')).toMatchObject({ lifts: [{ text: '0,5' }, { text: '1,0' }] });
  expect(liftsFromList('2 2.0', 'mm', '.')).toMatchObject({ sentence: expect.stringContaining('twice') });
  expect(liftsFromList('0 2', 'mm', '.')).toHaveProperty('sentence');
  expect(liftsFromList('two', 'mm', '.')).toHaveProperty('sentence');
  expect(liftsFromList('', 'mm', '.')).toHaveProperty('sentence');
});

it('never drifts from whole steps', () => {
  fc.assert(
    fc.property(
      fc.integer({ min: 1, max: 500 }),
      fc.integer({ min: 1, max: 100 }),
      fc.integer({ min: 0, max: 40 }),
      (first, step, more) => {
        const text = (thousandths: number) => (thousandths / 1000).toFixed(3);
        const plan = steps(text(first), text(step), text(first + step * more));
        if (!('lifts' in plan)) throw new Error(plan.sentence);
        expect(plan.lifts.map((lift) => Math.round(readNumber(lift.text) * 1000))).toEqual(
          Array.from({ length: more + 1 }, (_, index) => first + index * step),
        );
      },
    ),
  );
});
