import { useState } from 'react';
import { View } from 'react-native';
import { roleWord } from '@/components/session/words';
import { AppText } from '@/components/ui/AppText';
import { Banner } from '@/components/ui/Banner';
import { Button } from '@/components/ui/Button';
import { Card, Row } from '@/components/ui/Layout';
import { space } from '@/components/ui/tokens';
import type { PeopleList as People } from '@/shared/schema/api';
import { PinSheet } from './PinSheet';

type Person = People['people'][number];
type Props = {
  people: Person[];
  ownId: string;
  /** whether the PINs of others may be set too */
  mayManage: boolean;
  setPin: (personId: string, pin: string) => Promise<unknown>;
};

/** Who works in the shop, and what each may do. */
export function PeopleList({ people, ownId, mayManage, setPin }: Props) {
  const [changing, setChanging] = useState<Person | null>(null);
  const [done, setDone] = useState<string | null>(null);
  return (
    <>
      {done ? (
        <Banner
          kind="done"
          sentence={`The PIN of ${done} is set. Tablets take it the next time they have a network.`}
        />
      ) : null}
      <View role="list" aria-label="People" style={{ flexDirection: 'row', flexWrap: 'wrap', gap: space.m }}>
        {people.map((person) => (
          <View role="listitem" key={person.id} style={{ flexGrow: 1, flexBasis: 300, maxWidth: 520 }}>
            <Card label={person.name} gap="xs">
              <Row justify="space-between">
                <AppText variant="heading" level={2}>
                  {person.name}
                </AppText>
                {person.id === ownId ? (
                  <AppText variant="small" color="quietInk">
                    you
                  </AppText>
                ) : null}
              </Row>
              <AppText variant="small" color="quietInk">
                {person.mail ?? 'keys at the bench only, no sign-in'}
              </AppText>
              {person.roles.map((role) => (
                <AppText key={role} variant="small">
                  {roleWord(role)}
                </AppText>
              ))}
              <AppText variant="small" {...(person.hasPin ? { color: 'quietInk' as const } : {})}>
                {person.hasPin ? 'Has a PIN' : 'No PIN yet: cannot key at the bench'}
              </AppText>
              {mayManage || person.id === ownId ? (
                <Button
                  title={person.id === ownId ? 'Set your PIN' : `Set the PIN of ${person.name}`}
                  onPress={() => {
                    setDone(null);
                    setChanging(person);
                  }}
                  style={{ marginTop: space.s }}
                />
              ) : null}
            </Card>
          </View>
        ))}
      </View>
      {changing ? (
        <PinSheet
          name={changing.name}
          setPin={(pin) => setPin(changing.id, pin)}
          onDone={() => {
            setDone(changing.name);
            setChanging(null);
          }}
          onClose={() => setChanging(null)}
        />
      ) : null}
    </>
  );
}
