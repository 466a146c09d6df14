import { DeviceList } from '@/components/desk/DeviceList';
import { EnrolmentCard } from '@/components/desk/EnrolmentCard';
import { Loaded } from '@/components/desk/Loaded';
import { Screen } from '@/components/ui/Screen';
import { useIsInside, useMay } from '@/stores/desk/useMay';
import { useDevices, useMakeEnrolmentCode, useRevokeDevice } from '@/stores/queries/deskQueries';

export default function DevicesRoute() {
  const isInside = useIsInside();
  const mayEnrol = useMay('enrolDevice');
  const mayRevoke = useMay('revokeDevice');
  const devices = useDevices();
  const makeCode = useMakeEnrolmentCode();
  const revoke = useRevokeDevice();
  if (!isInside) return null;
  return (
    <Screen title="Devices" subtitle="Tablets and phones that key at the bench">
      {mayEnrol ? (
        <EnrolmentCard
          makeCode={() => makeCode.mutateAsync()}
          addressFor={(code) => `${window.location.origin}/bench/enrol?code=${code}`}
        />
      ) : null}
      <Loaded
        asked={{
          data: devices.data?.devices,
          error: devices.error,
          onTryAgain: () => void devices.refetch(),
        }}
        name="Devices"
      >
        {(data) => <DeviceList devices={data} shutOut={mayRevoke ? revoke.mutateAsync : null} />}
      </Loaded>
    </Screen>
  );
}
