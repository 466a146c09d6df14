import { fireEvent, render, screen, within } from '@testing-library/react';
import { useState } from 'react';
import { Button } from '@/components/ui/Button';
import { Choice } from '@/components/ui/Choice';
import { DataTable } from '@/components/ui/DataTable';
import { PressArea } from '@/components/ui/PressArea';
import { ConfirmSheet } from '@/components/ui/Sheet';
import { TextField } from '@/components/ui/TextField';
import { AppText } from '@/components/ui/AppText';
import { alignDecimals } from '@/components/ui/alignDecimals';

describe('a button', () => {
  it('acts when the pointer is released inside it, once', () => {
    const onPress = jest.fn();
    render(<Button title="Hand in session 3-012" onPress={onPress} />);
    const button = screen.getByRole('button', { name: 'Hand in session 3-012' });
    fireEvent.pointerDown(button);
    expect(onPress).not.toHaveBeenCalled();
    fireEvent.pointerUp(button);
    fireEvent.click(button, { detail: 1 });
    expect(onPress).toHaveBeenCalledTimes(1);
  });
  it('takes a click that no pointer made, as screen readers and Enter send it', () => {
    const onPress = jest.fn();
    render(<Button title="Add a lift" onPress={onPress} />);
    fireEvent.click(screen.getByRole('button'), { detail: 0 });
    expect(onPress).toHaveBeenCalledTimes(1);
  });
  it('ignores a click that a touch on something else left behind', () => {
    const onPress = jest.fn();
    render(<Button title="Add a lift" onPress={onPress} />);
    fireEvent.click(screen.getByRole('button'), { detail: 1 });
    expect(onPress).not.toHaveBeenCalled();
  });
  it('does nothing when the touch turned into a scroll', () => {
    const onPress = jest.fn();
    render(<Button title="Add a lift" onPress={onPress} />);
    fireEvent.pointerDown(screen.getByRole('button'));
    fireEvent.pointerCancel(screen.getByRole('button'));
    expect(onPress).not.toHaveBeenCalled();
  });
  it('takes no press while it is busy', () => {
    const onPress = jest.fn();
    render(<Button title="Approve" isBusy onPress={onPress} />);
    const button = screen.getByRole('button');
    fireEvent.pointerDown(button);
    fireEvent.pointerUp(button);
    fireEvent.click(button);
    expect(onPress).not.toHaveBeenCalled();
  });
});

it('two thumbs may overlap: each area has its own pointer', () => {
  const downs: string[] = [];
  render(
    <>
      {['1', '2'].map((key) => (
        <PressArea key={key} onDown={() => downs.push(key)}>
          <AppText>{key}</AppText>
        </PressArea>
      ))}
    </>,
  );
  fireEvent.pointerDown(screen.getByRole('button', { name: '1' }), { pointerId: 1 });
  fireEvent.pointerDown(screen.getByRole('button', { name: '2' }), { pointerId: 2 });
  expect(downs).toEqual(['1', '2']);
});

it('a field keeps what was typed beside its problem, and says the problem to screen readers', () => {
  function Form() {
    const [text, setText] = useState('');
    return (
      <TextField
        label="Mail address"
        value={text}
        onChange={setText}
        problem="Mail address and password do not match."
      />
    );
  }
  render(<Form />);
  const field = screen.getByLabelText('Mail address');
  fireEvent.change(field, { target: { value: 'mara@example.test' } });
  expect(field).toHaveProperty('value', 'mara@example.test');
  const described = field.getAttribute('aria-describedby') ?? '';
  expect(document.getElementById(described)?.textContent).toBe('Mail address and password do not match.');
  expect(field.getAttribute('aria-invalid')).toBe('true');
});

it('a choice is a radio group that arrow keys walk', () => {
  const onChange = jest.fn();
  render(
    <Choice
      label="Direction"
      value="drawing"
      onChange={onChange}
      options={[
        { value: 'drawing', title: 'Drawing' },
        { value: 'blowing', title: 'Blowing' },
      ]}
    />,
  );
  const group = screen.getByRole('radiogroup', { name: 'Direction' });
  const drawing = within(group).getByRole('radio', { name: 'Drawing' });
  expect(drawing.getAttribute('aria-checked')).toBe('true');
  fireEvent.keyDown(drawing, { key: 'ArrowDown' });
  expect(onChange).toHaveBeenCalledWith('blowing');
  expect(document.activeElement).toBe(within(group).getByRole('radio', { name: 'Blowing' }));
});

it('what others act on asks once and repeats its object', () => {
  const onConfirm = jest.fn();
  render(
    <ConfirmSheet
      title="Hand in?"
      sentence="The supervisor will see 14 readings."
      actionTitle="Hand in session 3-012"
      onConfirm={onConfirm}
      onClose={() => undefined}
    />,
  );
  expect(screen.getByRole('dialog', { name: 'Hand in?' })).toBeTruthy();
  fireEvent.click(screen.getByRole('button', { name: 'Hand in session 3-012' }));
  expect(onConfirm).toHaveBeenCalledTimes(1);
});

describe('a table', () => {
  type Line = { id: string; lift: string; flow: string };
  const rows: Line[] = [
    { id: 'a', lift: '2', flow: '29.8' },
    { id: 'b', lift: '10', flow: '115.82' },
    { id: 'c', lift: '12', flow: '' },
  ];
  const columns = [
    { id: 'lift', header: 'Lift', unit: 'mm', kind: 'decimal' as const, text: (row: Line) => row.lift },
    { id: 'flow', header: 'Flow', unit: 'cfm', kind: 'decimal' as const, text: (row: Line) => row.flow },
  ];
  it('stands decimal marks under each other', () => {
    expect(alignDecimals(['29.8', '115.82', '7', ''])).toEqual([
      '29.8\u00a0',
      '115.82',
      '7\u00a0\u00a0\u00a0',
      '',
    ]);
  });
  it('is walked by arrow keys and opens a row by Enter', () => {
    const onOpenRow = jest.fn();
    render(
      <DataTable
        label="Readings"
        columns={columns}
        rows={rows}
        rowId={(row) => row.id}
        onOpenRow={onOpenRow}
      />,
    );
    const [, first, second] = screen.getAllByRole('row');
    if (!first || !second) throw new Error('rows are missing');
    first.focus();
    fireEvent.keyDown(first, { key: 'ArrowDown' });
    expect(document.activeElement).toBe(second);
    fireEvent.keyDown(second, { key: 'Enter' });
    expect(onOpenRow).toHaveBeenCalledWith(rows[1]);
  });
});
