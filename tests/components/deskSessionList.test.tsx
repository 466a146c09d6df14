import { fireEvent, render, screen } from '@testing-library/react';
import type { ComponentProps } from 'react';
import { SessionList } from '@/components/desk/SessionList';
import { neighboursOf, sessionHref, sessionsToShow } from '@/components/desk/sessionOrder';
import { AppError } from '@/shared/errors';
import { summary } from '../factories/deskViews';

type Props = ComponentProps<typeof SessionList>;
const props = (over: Partial<Props> = {}): Props => ({
  asked: { data: [], error: null, onTryAgain: () => undefined },
  filter: { state: 'all', text: '' },
  onFilter: () => undefined,
  selectedId: null,
  hrefOf: (id) => sessionHref(id, { state: 'all', text: '' }),
  onGo: () => undefined,
  onPlan: null,
  ...over,
});
const asked = (data: Props['asked']['data'], error: unknown = null, onTryAgain = () => undefined) => ({
  data,
  error,
  onTryAgain,
});

const [oldest, approved, planned] = [
  summary({ label: '3-001' }),
  summary({ label: '3-002', state: 'approved' }),
  summary({ label: '0-001', readingCount: 0, runCount: 0, keyedBy: [], customerName: 'Fen Boats' }),
];

test('the oldest unfinished session stands first, approved ones last', () => {
  const all = [approved, planned, oldest];
  expect(sessionsToShow(all, { state: 'all', text: '' }).map((s) => s.label)).toEqual([
    '3-001',
    '0-001',
    '3-002',
  ]);
});

test('state and words narrow the list; a planned one is one without a reading', () => {
  const all = [oldest, approved, planned];
  expect(sessionsToShow(all, { state: 'planned', text: '' })).toEqual([planned]);
  expect(sessionsToShow(all, { state: 'open', text: '' })).toEqual([oldest]);
  expect(sessionsToShow(all, { state: 'all', text: 'fen BOATS' })).toEqual([planned]);
  expect(neighboursOf(sessionsToShow(all, { state: 'all', text: '' }), oldest.id)).toEqual({
    earlierId: null,
    laterId: planned.id,
  });
});

test('a session is a link that keeps the filter in its address', () => {
  const onGo = jest.fn();
  const hrefOf = (id: string) => sessionHref(id, { state: 'open', text: 'fen' });
  render(<SessionList {...props({ asked: asked([oldest]), hrefOf, onGo })} />);
  const link = screen.getByRole('link', { name: /3-001/ });
  expect(link.getAttribute('href')).toBe(`/desk/sessions/${oldest.id}?state=open&find=fen`);
  expect(link.textContent).toContain('7 readings of 12 planned');
  fireEvent.click(link);
  expect(onGo).toHaveBeenCalledWith(link.getAttribute('href'));
});

test('while sessions are fetched it says so', () => {
  render(<SessionList {...props({ asked: asked(undefined) })} />);
  expect(screen.getByText('Sessions are being fetched')).toBeTruthy();
});

test('an empty shop offers the first plan only to those who may', () => {
  const { rerender } = render(<SessionList {...props()} />);
  expect(screen.getByText('No session yet')).toBeTruthy();
  expect(screen.queryByRole('button', { name: /^plan (a|the)/i })).toBeNull();
  const onPlan = jest.fn();
  rerender(<SessionList {...props({ onPlan })} />);
  fireEvent.click(screen.getByRole('button', { name: 'Plan the first session' }));
  expect(onPlan).toHaveBeenCalledTimes(1);
});

test('a filter that nothing fits is told apart from an empty shop, and can be taken off', () => {
  const onFilter = jest.fn();
  const filter = { state: 'returned', text: '' };
  render(<SessionList {...props({ asked: asked([oldest]), filter, onFilter })} />);
  fireEvent.click(screen.getByRole('button', { name: 'Show all sessions' }));
  expect(onFilter).toHaveBeenCalledWith({ state: 'all', text: '' });
});

test('without a network and nothing fetched yet it says so and tries again', () => {
  const onTryAgain = jest.fn();
  render(<SessionList {...props({ asked: asked(undefined, new AppError('offline'), onTryAgain) })} />);
  expect(screen.getByRole('alert').textContent).toContain('No network');
  fireEvent.click(screen.getByRole('button', { name: 'Try again' }));
  expect(onTryAgain).toHaveBeenCalledTimes(1);
});

test('what was fetched before stays on screen when a later look fails', () => {
  render(<SessionList {...props({ asked: asked([oldest], new AppError('offline')) })} />);
  expect(screen.getByText(/This is what was there before/)).toBeTruthy();
  expect(screen.getByRole('link', { name: /3-001/ })).toBeTruthy();
});
