import type { NewSessionForm } from '@/shared/session/newSessionForm';

/** What each part of the form in which a session is started needs: the texts, what is wrong, and how to change them. */
export type BenchFormPart = {
  form: NewSessionForm;
  problems: Partial<Record<keyof NewSessionForm | 'plan', string>>;
  onChange: (change: Partial<NewSessionForm>) => void;
};
