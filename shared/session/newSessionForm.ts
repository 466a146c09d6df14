import { z } from 'zod';
import { LengthUnit, LiftUnit, PressureUnit } from '@/shared/schema/primitives';

const text = z.string().max(4000).catch('');
const choice = z.string().max(60).nullable().catch(null);

/** Everything on the screen where a session is started, exactly as typed. `new` in a choice asks for the fields below it. */
export const NewSessionForm = z.object({
  customerId: choice,
  customerName: text,
  headId: choice,
  headName: text,
  casting: text,
  cylindersText: text,
  intakeValvesText: text,
  exhaustValvesText: text,
  /** names of the ports of a side, separated by spaces; null: numbered by the cylinders */
  intakePortsText: z.string().max(2000).nullable().catch(null),
  exhaustPortsText: z.string().max(2000).nullable().catch(null),
  stageId: choice,
  stageName: text,
  workDone: text,
  intakeDiameterText: text,
  exhaustDiameterText: text,
  diameterUnit: LengthUnit.catch('in'),
  benchId: choice,
  /** null: the shop's own */
  pressureText: z.string().max(40).nullable().catch(null),
  pressureUnit: PressureUnit.nullable().catch(null),
  planKind: z.enum(['steps', 'list', 'same']).catch('steps'),
  firstText: text,
  stepText: text,
  lastText: text,
  listText: text,
  /** null: the shop's own */
  liftUnit: LiftUnit.nullable().catch(null),
});
export type NewSessionForm = z.infer<typeof NewSessionForm>;

/** A form nobody has typed in yet. */
export const emptyForm: NewSessionForm = {
  customerId: null,
  customerName: '',
  headId: null,
  headName: '',
  casting: '',
  cylindersText: '4',
  intakeValvesText: '1',
  exhaustValvesText: '1',
  intakePortsText: null,
  exhaustPortsText: null,
  stageId: null,
  stageName: '',
  workDone: '',
  intakeDiameterText: '',
  exhaustDiameterText: '',
  diameterUnit: 'in',
  benchId: null,
  pressureText: null,
  pressureUnit: null,
  planKind: 'steps',
  firstText: '',
  stepText: '',
  lastText: '',
  listText: '',
  liftUnit: null,
};

/** The numbers of the ports as the number of cylinders gives them: "1 2 3 4". */
export function numberedPorts(cylindersText: string): string {
  const count = /^\d{1,2}$/.test(cylindersText.trim()) ? Math.min(24, Number(cylindersText)) : 0;
  return Array.from({ length: count }, (_, index) => index + 1).join(' ');
}
