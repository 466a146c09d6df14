import { useEffect, useState } from 'react';
import { Banner } from '@/components/ui/Banner';
import { Button } from '@/components/ui/Button';
import { Stack } from '@/components/ui/Layout';
import { TextField } from '@/components/ui/TextField';
import { AppError } from '@/shared/errors';
import { problemOf } from './problemOf';

type Props = {
  /** why one has to sign in, when it is not the first time */
  reason?: string;
  mailAtStart?: string;
  signIn: (mail: string, password: string) => Promise<void>;
};

/** Mail and password. A refusal says what to do and clears nothing. */
export function SignInForm({ reason, mailAtStart = '', signIn }: Props) {
  const [mail, setMail] = useState(mailAtStart);
  const [password, setPassword] = useState('');
  const [isBusy, setIsBusy] = useState(false);
  const [error, setError] = useState<unknown>(null);
  const [missing, setMissing] = useState({ mail: '', password: '' });
  const waitSeconds = useCountdown(error);

  const submit = async () => {
    if (isBusy || waitSeconds > 0) return;
    const gaps = {
      mail: mail.trim() ? '' : 'Enter the mail address you sign in with.',
      password: password ? '' : 'Enter the password.',
    };
    setMissing(gaps);
    setError(null);
    if (gaps.mail || gaps.password) return;
    setIsBusy(true);
    try {
      await signIn(mail.trim(), password);
    } catch (refusal) {
      setError(refusal);
    } finally {
      setIsBusy(false);
    }
  };

  return (
    <form
      noValidate
      onSubmit={(event) => {
        event.preventDefault();
        void submit();
      }}
    >
      <Stack gap="l">
        {reason ? <Banner sentence={reason} /> : null}
        {error ? <Banner kind="refusal" sentence={sentenceOf(error, waitSeconds)} /> : null}
        <TextField
          label="Mail address"
          kind="mail"
          value={mail}
          onChange={setMail}
          problem={missing.mail}
          autoComplete="username"
          onSubmit={() => void submit()}
          isFocusedFirst={mailAtStart === ''}
        />
        <TextField
          label="Password"
          kind="password"
          value={password}
          onChange={setPassword}
          problem={missing.password}
          autoComplete="current-password"
          onSubmit={() => void submit()}
          isFocusedFirst={mailAtStart !== ''}
        />
        <Button
          title={waitSeconds > 0 ? `Wait ${waitSeconds} s` : 'Sign in'}
          kind="primary"
          isWide
          isBusy={isBusy}
          isDisabled={waitSeconds > 0}
          onPress={() => void submit()}
        />
      </Stack>
    </form>
  );
}

function sentenceOf(error: unknown, waitSeconds: number): string {
  if (error instanceof AppError && error.code === 'too_many_tries')
    return waitSeconds > 0
      ? `Too many tries. The next one is possible in ${waitSeconds} s.`
      : 'You can try again now.';
  return problemOf(error, {
    wrong_sign_in: 'Mail address and password do not match. Check both; capital letters count.',
    offline:
      'No network, so nobody can be signed in now. What was entered is still here; try again when it is back.',
    invalid: 'That is not a mail address and a password. Check both.',
  }).sentence;
}

/** Seconds that the server asked to wait, counted down. */
function useCountdown(error: unknown): number {
  const [left, setLeft] = useState(0);
  useEffect(() => {
    const asked = error instanceof AppError ? error.extra.retryAfterSeconds : undefined;
    const untilMs = Date.now() + (typeof asked === 'number' ? asked * 1000 : 0);
    const tick = () => setLeft(Math.max(0, Math.ceil((untilMs - Date.now()) / 1000)));
    tick();
    const timer = setInterval(tick, 500);
    return () => clearInterval(timer);
  }, [error]);
  return left;
}
