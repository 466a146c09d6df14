import { configure, fireEvent, render, screen } from '@testing-library/react';
import { BenchNewSession } from '@/components/session/BenchNewSession';
import { numberedPorts } from '@/shared/session/newSessionForm';
import { useNewSessionStore } from '@/stores/newSession/newSessionStore';
import { readNewSession, readPlan } from '@/stores/newSession/readNewSession';
import type { StartSessionInput } from '@/stores/bench/startSession';
import { benchFields, shopSettings } from '../factories/deviceFixture';
import { newId } from '../factories/records';
import { Catalogue } from '@/shared/schema/views';

// computing what is hidden for every role takes most of the time in jsdom, and a loaded machine needs patience
configure({ defaultHidden: true, asyncUtilTimeout: 10_000 });

const benchId = newId();
const catalogue = Catalogue.parse({
  customers: [],
  heads: [],
  stages: [],
  benches: [{ id: benchId, version: 1, mark: 'sent', ...benchFields }],
});

/** The form over its real store and its real reading. */
function Form({ onStart }: { onStart: (input: StartSessionInput) => void }) {
  const { form, change } = useNewSessionStore();
  const read = readNewSession(form, shopSettings, null);
  const plan = readPlan(form, shopSettings, null);
  return (
    <BenchNewSession
      form={form}
      problems={'problems' in read ? read.problems : {}}
      onChange={change}
      catalogue={catalogue}
      shop={shopSettings}
      numberedPorts={numberedPorts(form.cylindersText)}
      lifts={'lifts' in plan ? plan.lifts : null}
      hasLast={false}
      isBusy={false}
      failure={null}
      onStart={() => {
        if ('input' in read) onStart(read.input);
      }}
    />
  );
}
const field = (name: string) => screen.getByRole('textbox', { name });
const type = (name: string, text: string) => fireEvent.change(field(name), { target: { value: text } });
const choose = (name: string) => fireEvent.click(screen.getByRole('radio', { name }), { detail: 0 });
const start = () => fireEvent.click(screen.getByRole('button', { name: 'Start the session' }), { detail: 0 });

beforeEach(() => useNewSessionStore.getState().clear());

it('starts with what was typed, to the letter', () => {
  const onStart = jest.fn();
  render(<Form onStart={onStart} />);
  choose('New customer');
  type('Name of the customer', 'Harrow Lane Garage');
  type('Head', 'Iron four');
  type('Stage', 'As received');
  choose('Bench by the door');
  type('First', '0.050');
  type('Step', '0.050');
  type('Last', '0.150');
  start();
  expect(onStart).toHaveBeenCalledWith(
    expect.objectContaining({
      customer: { name: 'Harrow Lane Garage' },
      benchId,
      liftPlan: ['0.050', '0.100', '0.150'].map((text) => ({ text, unit: 'in' })),
    }),
  );
});

it('says beside each field what is wrong and clears nothing', () => {
  const onStart = jest.fn();
  render(<Form onStart={onStart} />);
  choose('New customer');
  type('Name of the customer', 'Harrow Lane Garage');
  type('Head', 'Iron four');
  type('Cylinders', '4x');
  choose('Typed one by one');
  type('Lifts, with spaces between them', '0.1 0.2.3');
  start();
  expect(onStart).not.toHaveBeenCalled();
  expect(field('Cylinders').getAttribute('aria-invalid')).toBe('true');
  expect(screen.getByText('“0.2.3” is not one number.')).toBeTruthy();
  expect(field('Cylinders')).toHaveProperty('value', '4x');
  expect(field('Name of the customer')).toHaveProperty('value', 'Harrow Lane Garage');
});

it('numbers the ports by the cylinders until they are named', () => {
  render(<Form onStart={() => undefined} />);
  choose('New customer');
  type('Cylinders', '3');
  expect(field('Intake ports')).toHaveProperty('value', '1 2 3');
  type('Intake ports', '1a 1b');
  type('Cylinders', '6');
  expect(field('Intake ports')).toHaveProperty('value', '1a 1b');
});

it('shows the lifts that the steps give before anything is started', () => {
  render(<Form onStart={() => undefined} />);
  choose('Equal steps');
  type('First', '1');
  type('Step', '1');
  type('Last', '3');
  expect(screen.getByText(/3 lifts: 1 2 3/)).toBeTruthy();
});

it('outlives a reload', () => {
  const { unmount } = render(<Form onStart={() => undefined} />);
  choose('New customer');
  type('Name of the customer', 'Harrow Lane Garage');
  unmount();
  const kept: unknown = JSON.parse(localStorage.getItem('inchwater.bench.newSession') ?? 'null');
  expect(kept).toMatchObject({ customerName: 'Harrow Lane Garage' });
});
