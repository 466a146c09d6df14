import { KeyedText, Label, type DecimalMark, type PlannedLift } from '@/shared/schema/primitives';
import type { PortName, ShopSettings } from '@/shared/schema/records';
import { liftsBySteps, liftsFromList, type PlanResult } from '@/shared/session/liftPlan';
import { readNumber } from '@/shared/units/quantity';
import type { NewDimensions, NewHead, StartSessionInput } from '@/stores/bench/startSession';
import { numberedPorts, type NewSessionForm } from '@/shared/session/newSessionForm';

/** A sentence for every field that is not right yet. */
export type FormProblems = Partial<Record<keyof NewSessionForm | 'plan', string>>;

/** Reads the form in which a session is started.
 * @param lastPlan the lift plan of the last session, for "the same as last time"
 * @returns what the verb takes, or what is wrong and where
 */
export function readNewSession(
  form: NewSessionForm,
  shop: ShopSettings,
  lastPlan: readonly PlannedLift[] | null,
): { input: StartSessionInput } | { problems: FormProblems } {
  const problems: FormProblems = {};
  const name = (field: 'customerName' | 'headName' | 'stageName', what: string): string => {
    const read = Label.safeParse(form[field]);
    if (!read.success)
      problems[field] =
        form[field].trim() === '' ? `Type ${what}.` : 'That is too long: 120 letters at most.';
    return form[field].trim();
  };
  if (form.customerId === null) problems.customerId = 'Pick whose head it is.';
  const isNewCustomer = form.customerId === 'new';
  const customer = isNewCustomer
    ? { name: name('customerName', 'the customer’s name') }
    : (form.customerId ?? '');
  const isNewHead = isNewCustomer || form.headId === 'new';
  if (!isNewHead && form.customerId !== null && form.headId === null) problems.headId = 'Pick the head.';
  const head = isNewHead
    ? readHead(form, name('headName', 'what the head is called'), problems)
    : (form.headId ?? '');
  const isNewStage = isNewHead || form.stageId === 'new';
  if (!isNewStage && form.headId !== null && form.stageId === null) problems.stageId = 'Pick the stage.';
  const stage = isNewStage
    ? { name: name('stageName', 'the stage, such as “As received”'), workDone: form.workDone.trim() }
    : (form.stageId ?? '');
  const dimensions = isNewStage ? readDiameters(form, problems) : [];
  if (form.benchId === null) problems.benchId = 'Pick the bench.';
  const standardPressure = {
    text: (form.pressureText ?? shop.standardPressureText).trim(),
    unit: form.pressureUnit ?? shop.standardPressureUnit,
  };
  problemOfNumber(standardPressure.text, problems, 'pressureText');
  const plan = readPlan(form, shop, lastPlan);
  if ('sentence' in plan) problems.plan = plan.sentence;
  if (Object.keys(problems).length > 0 || 'sentence' in plan) return { problems };
  const benchId = form.benchId ?? '';
  return { input: { customer, head, stage, dimensions, benchId, standardPressure, liftPlan: plan.lifts } };
}

/** The lifts that the form asks for, to be shown while it is filled in. */
export function readPlan(
  form: NewSessionForm,
  shop: { liftUnit: ShopSettings['liftUnit']; decimalMark: DecimalMark },
  lastPlan: readonly PlannedLift[] | null,
): PlanResult {
  const unit = form.liftUnit ?? shop.liftUnit;
  if (form.planKind === 'same')
    return lastPlan && lastPlan.length > 0
      ? { lifts: [...lastPlan] }
      : { sentence: 'There is no session before this one to take the lifts from.' };
  if (form.planKind === 'list') return liftsFromList(form.listText, unit, shop.decimalMark);
  const { firstText, stepText, lastText } = form;
  return liftsBySteps({ firstText, stepText, lastText, unit }, shop.decimalMark);
}

function readHead(form: NewSessionForm, name: string, problems: FormProblems): NewHead {
  const count = (field: 'cylindersText' | 'intakeValvesText' | 'exhaustValvesText', most: number): number => {
    const typed = form[field].trim();
    const value = /^\d{1,2}$/.test(typed) ? Number(typed) : 0;
    if (value < 1 || value > most) problems[field] = `A whole number from 1 to ${most}.`;
    return value;
  };
  const cylinderCount = count('cylindersText', 24);
  if (form.casting.trim().length > 120) problems.casting = 'That is too long: 120 letters at most.';
  const ports = (side: PortName['side'], field: 'intakePortsText' | 'exhaustPortsText'): PortName[] => {
    const names = (form[field] ?? numberedPorts(form.cylindersText))
      .trim()
      .split(/[\s,;]+/)
      .filter(Boolean);
    const double = names.find((each, at) => names.indexOf(each) !== at);
    if (names.length > 48) problems[field] = 'That is too many: 48 ports of a side at most.';
    else if (names.some((each) => each.length > 20))
      problems[field] = 'A port’s name has 20 letters at most.';
    else if (double !== undefined) problems[field] = `${double} stands there twice.`;
    return names.map((port) => ({ side, port }));
  };
  const all = [...ports('intake', 'intakePortsText'), ...ports('exhaust', 'exhaustPortsText')];
  if (all.length === 0 && !problems.cylindersText)
    problems.intakePortsText = 'Name at least one port, intake or exhaust.';
  return {
    name,
    casting: form.casting.trim(),
    cylinderCount,
    intakeValveCount: count('intakeValvesText', 6),
    exhaustValveCount: count('exhaustValvesText', 6),
    ports: all,
  };
}

function readDiameters(form: NewSessionForm, problems: FormProblems): NewDimensions[] {
  const read = (side: PortName['side'], field: 'intakeDiameterText' | 'exhaustDiameterText') => {
    const valveText = form[field].trim();
    if (valveText === '') return [];
    problemOfNumber(valveText, problems, field);
    return [{ side, valveText, valveUnit: form.diameterUnit }];
  };
  return [...read('intake', 'intakeDiameterText'), ...read('exhaust', 'exhaustDiameterText')];
}

function problemOfNumber(
  typed: string,
  problems: FormProblems,
  field: 'pressureText' | 'intakeDiameterText' | 'exhaustDiameterText',
): void {
  if (typed === '') problems[field] = 'A number is missing.';
  else if (!KeyedText.safeParse(typed).success)
    problems[field] = `“${typed}” is not one number: digits with at most one decimal mark.`;
  else if (readNumber(typed) === 0) problems[field] = 'It must be above zero.';
}
