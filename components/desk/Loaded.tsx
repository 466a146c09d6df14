import type { ReactNode } from 'react';
import { Banner } from '@/components/ui/Banner';
import { Button } from '@/components/ui/Button';
import { ErrorState, Progress } from '@/components/ui/States';
import { AppError } from '@/shared/errors';
import { problemOf } from './problemOf';

/** What a screen knows about something it asked the server for. */
export type Asked<T> = { data: T | undefined; error: unknown; onTryAgain: () => void };

type Props<T> = {
  asked: Asked<T>;
  /** what is being fetched: "Sessions" */
  name: string;
  /** own sentences for some codes */
  sentences?: Partial<Record<string, string>>;
  children: (data: T) => ReactNode;
};

/** Loading, refused, out of reach, or there. What was there stays on screen when a later look fails. */
export function Loaded<T>({ asked, name, sentences, children }: Props<T>) {
  const { data, error, onTryAgain } = asked;
  if (data === undefined)
    return error ? (
      <ErrorState {...problemOf(error, sentences)} {...(isForGood(error) ? {} : { onTryAgain })} />
    ) : (
      <Progress label={`${name} are being fetched`} />
    );
  return (
    <>
      {error ? (
        <Banner
          kind="attention"
          word="Not up to date"
          sentence={`${problemOf(error).sentence} This is what was there before.`}
        >
          <Button title="Look again" onPress={onTryAgain} />
        </Banner>
      ) : null}
      {children(data)}
    </>
  );
}

/** Whether asking again would be answered the same. */
const isForGood = (error: unknown) => error instanceof AppError && error.again === 'never';
