import { useLocalSearchParams, useRouter } from 'expo-router';
import { z } from 'zod';
import { EnrolForm, type EnrolProblem } from '@/components/bench/EnrolForm';
import { browserWarnings } from '@/components/bench/browserWarnings';
import { AppError } from '@/shared/errors';
import { useBenchStore } from '@/stores/bench/benchStore';

const Params = z.object({
  code: z.string().max(20).optional().catch(undefined),
  /** where the person was going; nowhere but into the bench */
  then: z
    .string()
    .regex(/^\/bench(?:\/[\w/-]*)?$/)
    .optional()
    .catch(undefined),
});

export default function EnrolRoute() {
  const router = useRouter();
  const { code, then } = Params.parse(useLocalSearchParams());
  const { phase, device, enrol } = useBenchStore();
  const onEnrol = async (typed: string, deviceName: string): Promise<EnrolProblem | null> => {
    try {
      await enrol(typed, deviceName);
      router.replace(then ?? '/bench');
      return null;
    } catch (error) {
      return problemOf(error);
    }
  };
  return (
    <EnrolForm
      startCode={code}
      startName={device?.name}
      warnings={browserWarnings({
        userAgent: navigator.userAgent,
        isSecure: window.isSecureContext,
        hasServiceWorker: 'serviceWorker' in navigator,
      })}
      isAgain={phase === 'ready'}
      onEnrol={onEnrol}
      onBack={() => router.replace(phase === 'ready' ? '/bench' : '/')}
    />
  );
}

function problemOf(error: unknown): EnrolProblem {
  const refusal = error instanceof AppError ? error : new AppError('not_saved');
  const of = (path: string) => refusal.fields.find((field) => field.path === path)?.sentence;
  if (refusal.code === 'offline')
    return { sentence: 'No network. Enrolling needs it once; the code stays typed here.' };
  if (refusal.code === 'invalid')
    return {
      sentence: of('code') || of('deviceName') ? '' : refusal.message,
      code: of('code'),
      deviceName: of('deviceName'),
    };
  return { sentence: refusal.message };
}
