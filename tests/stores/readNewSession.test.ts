import { emptyForm, NewSessionForm, numberedPorts } from '@/shared/session/newSessionForm';
import { readNewSession } from '@/stores/newSession/readNewSession';
import { shopSettings } from '../factories/deviceFixture';
import { newId } from '../factories/records';

const filled: NewSessionForm = {
  ...emptyForm,
  customerId: 'new',
  customerName: ' Harrow Lane Garage ',
  headName: 'Iron four',
  stageName: 'As received',
  intakeDiameterText: '1.94',
  benchId: newId(),
  firstText: '0.100',
  stepText: '0.100',
  lastText: '0.300',
};
const problemsOf = (change: Partial<NewSessionForm>) => {
  const read = readNewSession({ ...filled, ...change }, shopSettings, null);
  return 'problems' in read ? read.problems : {};
};

it('a form that is filled in starts a session with new customer, head and stage', () => {
  const read = readNewSession(filled, shopSettings, null);
  expect(read).toMatchObject({
    input: {
      customer: { name: 'Harrow Lane Garage' },
      head: { name: 'Iron four', cylinderCount: 4, intakeValveCount: 1 },
      stage: { name: 'As received' },
      dimensions: [{ side: 'intake', valveText: '1.94', valveUnit: 'in' }],
      standardPressure: { text: '28', unit: 'inH2O' },
      liftPlan: [{ text: '0.100' }, { text: '0.200' }, { text: '0.300' }],
    },
  });
});
it('ports are numbered by the cylinders, a side each, until they are named', () => {
  expect(numberedPorts('3')).toBe('1 2 3');
  const read = readNewSession({ ...filled, cylindersText: '2', exhaustPortsText: 'A' }, shopSettings, null);
  const head = 'input' in read && typeof read.input.head === 'object' ? read.input.head : null;
  expect(head?.ports).toEqual([
    { side: 'intake', port: '1' },
    { side: 'intake', port: '2' },
    { side: 'exhaust', port: 'A' },
  ]);
});
it.each([
  [{ customerName: '  ' }, 'customerName'],
  [{ customerId: null }, 'customerId'],
  [{ headName: '' }, 'headName'],
  [{ headName: 'x'.repeat(121) }, 'headName'],
  [{ cylindersText: '0' }, 'cylindersText'],
  [{ cylindersText: '2.5' }, 'cylindersText'],
  [{ intakeValvesText: '9' }, 'intakeValvesText'],
  [{ intakePortsText: '1 2 2' }, 'intakePortsText'],
  [{ intakePortsText: '', exhaustPortsText: '' }, 'intakePortsText'],
  [{ intakeDiameterText: '1.9.4' }, 'intakeDiameterText'],
  [{ exhaustDiameterText: '0' }, 'exhaustDiameterText'],
  [{ benchId: null }, 'benchId'],
  [{ pressureText: '28,5,1' }, 'pressureText'],
  [{ pressureText: '' }, 'pressureText'],
  [{ stepText: '0' }, 'plan'],
  [{ planKind: 'list' as const, listText: '0.1 0.x' }, 'plan'],
  [{ planKind: 'same' as const }, 'plan'],
])('%j is answered beside its field', (change, field) => {
  const problems = problemsOf(change);
  expect(Object.keys(problems)).toEqual([field]);
  expect(Object.values(problems)[0]).toMatch(/\.$/);
});
it('a known head asks for its stage alone, and takes no diameters of a stage that is there', () => {
  const [customerId, headId, stageId] = [newId(), newId(), newId()];
  expect(problemsOf({ customerId, headId })).toHaveProperty('stageId');
  const read = readNewSession({ ...filled, customerId, headId, stageId }, shopSettings, [
    { text: '2', unit: 'mm' },
  ]);
  expect(read).toMatchObject({
    input: { customer: customerId, head: headId, stage: stageId, dimensions: [] },
  });
});
it('the lifts of the last session are taken over as they were keyed', () => {
  const last = [{ text: '0.25', unit: 'L/D' as const }];
  expect(readNewSession({ ...filled, planKind: 'same' }, shopSettings, last)).toMatchObject({
    input: { liftPlan: last },
  });
});
it('a form kept by an older version is read as far as it can be', () => {
  expect(NewSessionForm.parse({ customerName: 'Harrow', planKind: 'curve', liftUnit: 'ft' })).toEqual({
    ...emptyForm,
    customerName: 'Harrow',
    cylindersText: '',
    intakeValvesText: '',
    exhaustValvesText: '',
  });
});
