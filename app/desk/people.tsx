import { Loaded } from '@/components/desk/Loaded';
import { PeopleList } from '@/components/desk/PeopleList';
import { Screen } from '@/components/ui/Screen';
import { useDeskStore } from '@/stores/desk/deskStore';
import { useMay } from '@/stores/desk/useMay';
import { usePeople, useSetPin } from '@/stores/queries/deskQueries';

export default function PeopleRoute() {
  const person = useDeskStore((state) => state.signedIn?.person);
  const mayManage = useMay('managePeople');
  const people = usePeople();
  const setPin = useSetPin();
  if (!person) return null;
  return (
    <Screen title="People" subtitle="Who works in the shop, and what each may do">
      <Loaded
        asked={{ data: people.data?.people, error: people.error, onTryAgain: () => void people.refetch() }}
        name="People"
      >
        {(data) => (
          <PeopleList
            people={data}
            ownId={person.id}
            mayManage={mayManage}
            setPin={(personId, pin) => setPin.mutateAsync({ personId, pin })}
          />
        )}
      </Loaded>
    </Screen>
  );
}
