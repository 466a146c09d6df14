import { Screen } from '@/components/ui/Screen';
import { EmptyState } from '@/components/ui/States';
import { useIsInside } from '@/stores/desk/useMay';

export default function SessionsRoute() {
  const isInside = useIsInside();
  if (!isInside) return null;
  return (
    <Screen title="Sessions">
      <EmptyState
        title="Choose a session"
        sentence="Its runs and readings show here, as they come in from the bench. The oldest unfinished one stands on top of the list. The key ? shows what can be done by keyboard."
      />
    </Screen>
  );
}
