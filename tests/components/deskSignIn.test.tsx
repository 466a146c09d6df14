import { act, fireEvent, render, screen } from '@testing-library/react';
import { SignInForm } from '@/components/desk/SignInForm';
import { AppError } from '@/shared/errors';

const mail = () => screen.getByLabelText<HTMLInputElement>('Mail address');
const password = () => screen.getByLabelText<HTMLInputElement>('Password');
const press = async () => {
  await act(async () => {
    fireEvent.click(screen.getByRole('button', { name: /^Sign in/ }));
  });
};
function fill() {
  fireEvent.change(mail(), { target: { value: 'wren@tarn.example' } });
  fireEvent.change(password(), { target: { value: 'not it' } });
}

test('a wrong password says what to check and keeps what was typed', async () => {
  render(<SignInForm signIn={() => Promise.reject(new AppError('wrong_sign_in'))} />);
  fill();
  await press();
  expect(screen.getByRole('alert').textContent).toContain('Mail address and password do not match');
  expect([mail().value, password().value]).toEqual(['wren@tarn.example', 'not it']);
});

test('too many tries says how long to wait, and takes no try before', async () => {
  let tries = 0;
  const signIn = () => {
    tries += 1;
    return Promise.reject(new AppError('too_many_tries', { extra: { retryAfterSeconds: 42 } }));
  };
  render(<SignInForm signIn={signIn} />);
  fill();
  await press();
  expect(screen.getByRole('alert').textContent).toContain('possible in 42 s');
  const button = screen.getByRole('button', { name: 'Wait 42 s' });
  await act(async () => {
    fireEvent.click(button);
  });
  expect(tries).toBe(1);
});

test('without a network it says so and keeps what was typed', async () => {
  render(<SignInForm signIn={() => Promise.reject(new AppError('offline'))} />);
  fill();
  await press();
  expect(screen.getByRole('alert').textContent).toContain('No network');
  expect(password().value).toBe('not it');
});

test('empty fields are named beside the field and nothing is sent', async () => {
  const signIn = jest.fn(() => Promise.resolve());
  render(<SignInForm signIn={signIn} />);
  await press();
  expect(screen.getByText('Enter the mail address you sign in with.')).toBeTruthy();
  expect(screen.getByText('Enter the password.')).toBeTruthy();
  expect(signIn).not.toHaveBeenCalled();
});

test('a password manager finds its fields', () => {
  render(<SignInForm signIn={() => Promise.resolve()} />);
  expect(mail().getAttribute('autocomplete')).toBe('username');
  expect(password().getAttribute('autocomplete')).toBe('current-password');
  expect(password().type).toBe('password');
});
