import { useState } from 'react';
import { v7 } from 'uuid';
import { Banner } from '@/components/ui/Banner';
import { Button } from '@/components/ui/Button';
import { Choice } from '@/components/ui/Choice';
import { Card, Stack } from '@/components/ui/Layout';
import { TextField } from '@/components/ui/TextField';
import type { DeskChange, PlanSessionRequest } from '@/shared/schema/api';
import type { LiftUnit } from '@/shared/schema/primitives';
import type { ShopSettings } from '@/shared/schema/records';
import { liftsFromList } from '@/shared/session/liftPlan';
import type { Catalogue } from '@/shared/schema/views';
import type { VerdictOf } from '@/shared/sync/protocol';
import { checkNote, checkNumber } from './checks';
import { LiftPlanField } from './LiftPlanField';
import { NewCustomerSheet, NewHeadSheet, NewStageSheet } from './newForms';
import { PickList } from './PickList';
import { problemOf } from './problemOf';

type Props = {
  catalogue: Catalogue;
  shop: ShopSettings;
  /** whether customers, heads and stages may be added here */
  mayAdd: boolean;
  plan: (request: PlanSessionRequest) => Promise<unknown>;
  send: (changes: DeskChange[]) => Promise<{ verdicts: VerdictOf[] }>;
  onPlanned: (sessionId: string) => void;
};

/** Plans a session: whose head, in which state, on which bench, at which lifts. */
export function PlanForm({ catalogue, shop, mayAdd, plan, send, onPlanned }: Props) {
  const [sessionId] = useState(() => v7());
  const [customerId, setCustomerId] = useState<string | null>(null);
  const [headId, setHeadId] = useState<string | null>(null);
  const [stageId, setStageId] = useState<string | null>(null);
  const benches = catalogue.benches.filter((bench) => bench.status !== 'outOfUse');
  const [benchId, setBenchId] = useState<string | null>(
    benches.length === 1 ? (benches[0]?.id ?? null) : null,
  );
  const [pressureText, setPressureText] = useState(shop.standardPressureText);
  const [liftText, setLiftText] = useState('');
  const [liftUnit, setLiftUnit] = useState<LiftUnit>(shop.liftUnit);
  const [note, setNote] = useState('');
  const [adding, setAdding] = useState<'customer' | 'head' | 'stage' | null>(null);
  const [isChecked, setIsChecked] = useState(false);
  const [isBusy, setIsBusy] = useState(false);
  const [error, setError] = useState<unknown>(null);

  const heads = catalogue.heads.filter((head) => head.customerId === customerId);
  const stages = catalogue.stages
    .filter((stage) => stage.headId === headId)
    .sort((a, b) => a.stageOrdinal - b.stageOrdinal);
  const lifts = liftsFromList(liftText, liftUnit, shop.decimalMark);
  const pressureProblem = checkNumber(pressureText);
  const noteProblem = checkNote(note);

  const missing = [
    ...(stageId ? [] : ['the stage of a head']),
    ...(benchId ? [] : ['the bench']),
    ...(pressureProblem ? ['the standard pressure'] : []),
    ...('sentence' in lifts ? ['the lift plan'] : []),
    ...(noteProblem ? ['the note'] : []),
  ];

  const chooseCustomer = (id: string) => {
    setCustomerId(id);
    setHeadId(null);
    setStageId(null);
  };
  const chooseHead = (id: string) => {
    setHeadId(id);
    setStageId(null);
  };
  const submit = async () => {
    setIsChecked(true);
    setError(null);
    if (isBusy || !stageId || !benchId || 'sentence' in lifts || pressureProblem || noteProblem) return;
    setIsBusy(true);
    try {
      await plan({
        id: sessionId,
        stageId,
        benchId,
        standardPressureText: pressureText,
        standardPressureUnit: shop.standardPressureUnit,
        liftPlan: lifts.lifts,
        note,
      });
      onPlanned(sessionId);
    } catch (refusal) {
      setError(refusal);
    } finally {
      setIsBusy(false);
    }
  };
  const common = { send, onClose: () => setAdding(null) };
  const added = (choose: (id: string) => void) => (id: string) => {
    choose(id);
    setAdding(null);
  };

  return (
    <Stack gap="l">
      <Card label="The head">
        <PickList
          label="Customer"
          items={catalogue.customers.map(({ id, name }) => ({ id, title: name }))}
          value={customerId}
          onChange={chooseCustomer}
          problem={isChecked && !customerId ? 'Choose whose head it is.' : null}
          addTitle={mayAdd ? 'New customer' : null}
          onAdd={() => setAdding('customer')}
        />
        {customerId ? (
          <PickList
            label="Head"
            items={heads.map(({ id, name, casting }) => ({ id, title: name, detail: casting }))}
            value={headId}
            onChange={chooseHead}
            problem={isChecked && !headId ? 'Choose the head.' : null}
            addTitle={mayAdd ? 'New head' : null}
            onAdd={() => setAdding('head')}
          />
        ) : null}
        {headId ? (
          <PickList
            label="Stage"
            items={stages.map(({ id, name, workDone }) => ({ id, title: name, detail: workDone }))}
            value={stageId}
            onChange={setStageId}
            problem={isChecked && !stageId ? 'Choose the state it is tested in.' : null}
            addTitle={mayAdd ? 'New stage' : null}
            onAdd={() => setAdding('stage')}
          />
        ) : null}
      </Card>
      <Card label="The bench">
        <Choice
          label="Bench"
          value={benchId}
          onChange={setBenchId}
          options={catalogue.benches.map((bench) => ({
            value: bench.id,
            title: bench.name,
            ...(bench.status === 'inUse'
              ? {}
              : { detail: bench.status === 'outOfUse' ? 'out of use' : 'needs a check' }),
            isDisabled: bench.status === 'outOfUse',
          }))}
          problem={isChecked && !benchId ? 'Choose the bench.' : null}
        />
        <TextField
          label="Standard pressure"
          hint="Flows are brought to this test pressure"
          kind="decimal"
          unit={shop.standardPressureUnit}
          value={pressureText}
          onChange={setPressureText}
          problem={isChecked ? pressureProblem : null}
        />
      </Card>
      <Card label="The lifts">
        <LiftPlanField
          text={liftText}
          unit={liftUnit}
          decimalMark={shop.decimalMark}
          isChecked={isChecked}
          onText={setLiftText}
          onUnit={setLiftUnit}
        />
      </Card>
      <TextField
        label="Note for the bench"
        hint="May stay empty"
        isMultiline
        value={note}
        onChange={setNote}
        problem={noteProblem}
      />
      {isChecked && missing.length > 0 ? (
        <Banner kind="attention" sentence={`Before it can be planned: ${missing.join(', ')}.`} />
      ) : null}
      {error ? (
        <Banner kind="refusal" sentence={`${problemOf(error).sentence} Nothing was planned.`} />
      ) : null}
      <Button title="Plan the session" kind="primary" isWide isBusy={isBusy} onPress={() => void submit()} />
      {adding === 'customer' ? <NewCustomerSheet {...common} onMade={added(chooseCustomer)} /> : null}
      {adding === 'head' && customerId ? (
        <NewHeadSheet {...common} customerId={customerId} onMade={added(chooseHead)} />
      ) : null}
      {adding === 'stage' && headId ? (
        <NewStageSheet {...common} headId={headId} stages={catalogue.stages} onMade={added(setStageId)} />
      ) : null}
    </Stack>
  );
}
