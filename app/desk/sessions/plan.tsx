import { useRouter } from 'expo-router';
import { Loaded } from '@/components/desk/Loaded';
import { PlanForm } from '@/components/desk/PlanForm';
import { Screen } from '@/components/ui/Screen';
import { EmptyState } from '@/components/ui/States';
import { useDeskStore } from '@/stores/desk/deskStore';
import { useMay } from '@/stores/desk/useMay';
import { useCatalogue, useDeskChanges, usePlanSession } from '@/stores/queries/deskQueries';

export default function PlanRoute() {
  const router = useRouter();
  const signedIn = useDeskStore((state) => state.signedIn);
  const mayPlan = useMay('planSession');
  const mayAdd = useMay('keyAndPlan');
  const catalogue = useCatalogue();
  const plan = usePlanSession();
  const changes = useDeskChanges();
  if (!signedIn) return null;
  return (
    <Screen
      title="Plan a session"
      width="reading"
      subtitle="It goes to every enrolled tablet"
      onBack={() => router.push('/desk')}
      backHref="/desk"
      backLabel="Back to sessions"
    >
      {mayPlan ? (
        <Loaded
          asked={{ data: catalogue.data, error: catalogue.error, onTryAgain: () => void catalogue.refetch() }}
          name="Customers, heads and benches"
        >
          {(data) => (
            <PlanForm
              catalogue={data}
              shop={signedIn.shop.settings}
              mayAdd={mayAdd}
              plan={plan.mutateAsync}
              send={changes.mutateAsync}
              onPlanned={(id) => router.replace(`/desk/sessions/${id}`)}
            />
          )}
        </Loaded>
      ) : (
        <EmptyState
          title="Not for your role"
          sentence="Sessions are planned by those who key at the bench, or by the supervisor."
          actionTitle="Back to sessions"
          onAction={() => router.push('/desk')}
        />
      )}
    </Screen>
  );
}
