import { useState } from 'react';
import { View } from 'react-native';
import { agoInWords, localTime } from '@/components/session/localTime';
import { AppText } from '@/components/ui/AppText';
import { Banner } from '@/components/ui/Banner';
import { Button } from '@/components/ui/Button';
import { Card, Row } from '@/components/ui/Layout';
import { ConfirmSheet } from '@/components/ui/Sheet';
import { EmptyState } from '@/components/ui/States';
import { space } from '@/components/ui/tokens';
import type { DeviceList as Devices } from '@/shared/schema/api';
import { problemOf } from './problemOf';

type Device = Devices['devices'][number];
type Props = {
  devices: Device[];
  /** null when this person may not */
  shutOut: ((deviceId: string) => Promise<unknown>) | null;
};

/** The shop's tablets and phones: what waits on them, and the door for one that was lost. */
export function DeviceList({ devices, shutOut }: Props) {
  const [asking, setAsking] = useState<Device | null>(null);
  const [isBusy, setIsBusy] = useState(false);
  const [error, setError] = useState<unknown>(null);
  const confirm = async (device: Device) => {
    if (!shutOut) return;
    setIsBusy(true);
    setError(null);
    try {
      await shutOut(device.id);
    } catch (refusal) {
      setError(refusal);
    } finally {
      setIsBusy(false);
      setAsking(null);
    }
  };
  if (devices.length === 0)
    return (
      <EmptyState
        title="No device yet"
        sentence="Open the bench on a tablet or phone and key an enrolment code there. It shows here afterwards."
      />
    );
  return (
    <>
      {error ? <Banner kind="refusal" sentence={problemOf(error).sentence} /> : null}
      <View role="list" aria-label="Devices" style={{ flexDirection: 'row', flexWrap: 'wrap', gap: space.m }}>
        {devices.map((device) => (
          <View role="listitem" key={device.id} style={{ flexGrow: 1, flexBasis: 300, maxWidth: 520 }}>
            <DeviceCard device={device} onShutOut={shutOut ? () => setAsking(device) : null} />
          </View>
        ))}
      </View>
      {asking ? (
        <ConfirmSheet
          title={`Shut out ${asking.name}?`}
          sentence={`${asking.name} can then read nothing more of this shop. What was keyed on it stays on it; what it still sends is kept and waits for the supervisor. To use it again it has to be enrolled anew.`}
          actionTitle={`Shut out ${asking.name}`}
          isDanger
          isBusy={isBusy}
          onConfirm={() => void confirm(asking)}
          onClose={() => setAsking(null)}
        />
      ) : null}
    </>
  );
}

function DeviceCard({ device, onShutOut }: { device: Device; onShutOut: (() => void) | null }) {
  const { name, deviceOrdinal, enrolledAt, lastSeenAt, pendingCount, revokedAt } = device;
  const waiting =
    pendingCount === 0 ? 'Nothing waiting on it' : `${pendingCount} changes waiting on it when last seen`;
  return (
    <Card label={name} gap="xs">
      <Row justify="space-between">
        <AppText variant="heading" level={2}>
          {name}
        </AppText>
        <AppText variant="small" color="quietInk">{`sessions ${deviceOrdinal}-…`}</AppText>
      </Row>
      {revokedAt ? (
        <AppText weight="600" color="redOxide">{`Shut out ${localTime(revokedAt)}`}</AppText>
      ) : (
        <AppText>
          {lastSeenAt ? `Last seen ${agoInWords(lastSeenAt)}` : 'Not seen since it was enrolled'}
        </AppText>
      )}
      <AppText variant="small" {...(pendingCount > 0 ? {} : { color: 'quietInk' as const })}>
        {waiting}
      </AppText>
      <AppText variant="small" color="quietInk">{`Enrolled ${localTime(enrolledAt)}`}</AppText>
      {onShutOut && !revokedAt ? (
        <Button title={`Shut out ${name}`} kind="danger" onPress={onShutOut} style={{ marginTop: space.s }} />
      ) : null}
    </Card>
  );
}
