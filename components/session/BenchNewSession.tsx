import type { ReactNode } from 'react';
import { unitLabel } from '@/components/capture/captureProps';
import { AppText } from '@/components/ui/AppText';
import { Banner } from '@/components/ui/Banner';
import { Button } from '@/components/ui/Button';
import { Choice } from '@/components/ui/Choice';
import { Card, Stack } from '@/components/ui/Layout';
import { TextField } from '@/components/ui/TextField';
import type { PlannedLift } from '@/shared/schema/primitives';
import type { ShopSettings } from '@/shared/schema/records';
import type { Catalogue } from '@/shared/schema/views';
import { BenchLiftPlan } from './BenchLiftPlan';
import { BenchNewHead, BenchNewStage } from './BenchNewHead';
import { BenchPick } from './BenchPick';
import type { BenchFormPart } from './benchForm';

export type BenchNewSessionProps = BenchFormPart & {
  catalogue: Catalogue;
  shop: ShopSettings;
  numberedPorts: string;
  lifts: readonly PlannedLift[] | null;
  hasLast: boolean;
  isBusy: boolean;
  /** what kept it from being started, other than a field */
  failure: string | null;
  onStart: () => void;
};

/** Starts a session: whose head, in which state, on which bench, at which lifts. */
export function BenchNewSession(props: BenchNewSessionProps) {
  const { form, problems, onChange, catalogue, shop } = props;
  const part = { form, problems, onChange };
  const heads = catalogue.heads.filter((head) => head.customerId === form.customerId);
  const stages = catalogue.stages.filter((stage) => stage.headId === form.headId);
  const isNewHead = form.customerId === 'new' || form.headId === 'new';
  const isNewStage = isNewHead || form.stageId === 'new';
  const problemCount = Object.keys(problems).length;
  return (
    <Stack gap="xl">
      <Part title="The head">
        <BenchPick
          label="Customer"
          items={catalogue.customers.map(({ id, name }) => ({ id, title: name }))}
          value={form.customerId}
          newTitle="New customer"
          problem={problems.customerId}
          onChange={(customerId) => onChange({ customerId, headId: null, stageId: null })}
        />
        {form.customerId === 'new' ? (
          <TextField
            label="Name of the customer"
            maxLength={120}
            value={form.customerName}
            onChange={(customerName) => onChange({ customerName })}
            problem={problems.customerName}
          />
        ) : null}
        {form.customerId !== null && form.customerId !== 'new' ? (
          <BenchPick
            label="Head"
            items={heads.map(({ id, name, casting }) => ({ id, title: name, detail: casting }))}
            value={form.headId}
            newTitle="New head"
            problem={problems.headId}
            onChange={(headId) => onChange({ headId, stageId: null })}
          />
        ) : null}
        {isNewHead ? <BenchNewHead {...part} numberedPorts={props.numberedPorts} /> : null}
        {!isNewHead && form.headId !== null ? (
          <BenchPick
            label="Stage"
            items={stages.map(({ id, name, workDone }) => ({ id, title: name, detail: workDone }))}
            value={form.stageId}
            newTitle="New stage"
            problem={problems.stageId}
            onChange={(stageId) => onChange({ stageId })}
          />
        ) : null}
        {isNewStage ? <BenchNewStage {...part} /> : null}
      </Part>
      <Part title="The bench">
        {catalogue.benches.length === 0 ? (
          <Banner
            kind="attention"
            sentence="No bench is on this device yet. Benches are made at the desk and come with the next connection."
          />
        ) : (
          <Choice
            label="Bench"
            options={catalogue.benches.map((bench) => ({
              value: bench.id,
              title: bench.name,
              isDisabled: bench.status === 'outOfUse',
              ...(bench.status === 'inUse'
                ? {}
                : { detail: bench.status === 'outOfUse' ? 'out of use' : 'needs a check' }),
            }))}
            value={form.benchId}
            onChange={(benchId) => onChange({ benchId })}
            problem={problems.benchId ?? null}
          />
        )}
        <TextField
          label="Standard pressure"
          hint="Flows are brought to this test pressure"
          kind="decimal"
          maxLength={12}
          unit={unitLabel(form.pressureUnit ?? shop.standardPressureUnit)}
          value={form.pressureText ?? shop.standardPressureText}
          onChange={(pressureText) => onChange({ pressureText })}
          problem={problems.pressureText}
        />
      </Part>
      <Part title="The lift plan">
        <BenchLiftPlan
          {...part}
          liftUnit={form.liftUnit ?? shop.liftUnit}
          lifts={props.lifts}
          hasLast={props.hasLast}
        />
      </Part>
      {problemCount > 0 ? (
        <Banner
          kind="refusal"
          sentence={
            problemCount === 1
              ? 'One thing is missing or not right; it is marked above.'
              : `${problemCount} things are missing or not right; they are marked above.`
          }
        />
      ) : null}
      {props.failure ? <Banner kind="refusal" sentence={props.failure} /> : null}
      <Button title="Start the session" kind="primary" isWide isBusy={props.isBusy} onPress={props.onStart} />
    </Stack>
  );
}

function Part({ title, children }: { title: string; children: ReactNode }) {
  return (
    <Card label={title} gap="l">
      <AppText variant="heading" level={2}>
        {title}
      </AppText>
      {children}
    </Card>
  );
}
