import { useMemo } from 'react';
import { View } from 'react-native';
import { AppText } from '@/components/ui/AppText';
import { Button } from '@/components/ui/Button';
import { Stack } from '@/components/ui/Layout';
import { EmptyState } from '@/components/ui/States';
import { TextField } from '@/components/ui/TextField';
import { space } from '@/components/ui/tokens';
import { webProps } from '@/components/ui/webProps';
import type { SessionSummary } from '@/shared/schema/views';
import { FilterChips } from './FilterChips';
import { Loaded, type Asked } from './Loaded';
import { SessionCard } from './SessionCard';
import { sessionsToShow, stateFilters, type SessionFilter } from './sessionOrder';

type Props = {
  asked: Asked<SessionSummary[]>;
  filter: SessionFilter;
  onFilter: (filter: SessionFilter) => void;
  selectedId: string | null;
  hrefOf: (sessionId: string) => string;
  onGo: (href: string) => void;
  /** leads to planning; null when this person may not */
  onPlan: (() => void) | null;
};

/** The sessions of the shop, oldest unfinished first, narrowed by state and words. */
export function SessionList(props: Props) {
  const { asked, filter, onFilter, selectedId, hrefOf, onGo, onPlan } = props;
  const shown = useMemo(() => sessionsToShow(asked.data ?? [], filter), [asked.data, filter]);
  const isNarrowed = filter.state !== 'all' || filter.text.trim() !== '';
  return (
    <Stack gap="m">
      {onPlan ? <Button title="Plan a session" kind="primary" icon="add" isWide onPress={onPlan} /> : null}
      <View {...webProps({ dataSet: { find: 'sessions' } })}>
        <TextField
          label="Find"
          value={filter.text}
          onChange={(text) => onFilter({ ...filter, text })}
          hint="Number, customer, head, stage, bench or name"
        />
      </View>
      <FilterChips
        label="State"
        options={stateFilters}
        value={filter.state}
        onChange={(state) => onFilter({ ...filter, state })}
      />
      <Loaded asked={asked} name="Sessions">
        {(all) =>
          shown.length > 0 ? (
            <>
              <AppText variant="small" color="quietInk" isLive>
                {shown.length === all.length
                  ? `${all.length} sessions`
                  : `${shown.length} of ${all.length} sessions`}
              </AppText>
              <View role="list" aria-label="Sessions" style={{ gap: space.s }}>
                {shown.map((session) => (
                  <SessionCard
                    key={session.id}
                    session={session}
                    isSelected={session.id === selectedId}
                    href={hrefOf(session.id)}
                    onGo={onGo}
                  />
                ))}
              </View>
            </>
          ) : isNarrowed ? (
            <EmptyState
              title="None fits"
              sentence={`None of the ${all.length} sessions fits that state and those words.`}
              actionTitle="Show all sessions"
              onAction={() => onFilter({ state: 'all', text: '' })}
            />
          ) : (
            <EmptyState
              title="No session yet"
              sentence="Sessions planned here go to every enrolled tablet; sessions started at the bench show here by themselves."
              {...(onPlan ? { actionTitle: 'Plan the first session', onAction: onPlan } : {})}
            />
          )
        }
      </Loaded>
    </Stack>
  );
}
