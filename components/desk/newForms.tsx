import type { DeskChange } from '@/shared/schema/api';
import type { Catalogue } from '@/shared/schema/views';
import type { VerdictOf } from '@/shared/sync/protocol';
import { checkCount, checkLabel, checkNote, checkNumberOrNothing, checkShort } from './checks';
import { newCustomer, newHead, newStage, newValve } from './newRecords';
import { NewRecordSheet } from './NewRecordSheet';

type Common = {
  send: (changes: DeskChange[]) => Promise<{ verdicts: VerdictOf[] }>;
  onMade: (rid: string) => void;
  onClose: () => void;
};

/** A customer by name; mail and telephone can follow. */
export function NewCustomerSheet(common: Common) {
  return (
    <NewRecordSheet
      {...common}
      title="New customer"
      actionTitle="Add the customer"
      fields={[{ name: 'name', label: 'Name', check: checkLabel }]}
      changesFor={([rid], { name = '' }) => [newCustomer(rid, name)]}
    />
  );
}

/** A head of a customer. */
export function NewHeadSheet({ customerId, ...common }: Common & { customerId: string }) {
  return (
    <NewRecordSheet
      {...common}
      title="New head"
      actionTitle="Add the head"
      fields={[
        { name: 'name', label: 'Name', hint: 'What the shop calls it', check: checkLabel },
        { name: 'casting', label: 'Casting or make', hint: 'May stay empty', check: checkShort(120) },
        { name: 'cylinders', label: 'Cylinders', kind: 'whole', start: '4', check: checkCount(1, 24) },
        {
          name: 'intake',
          label: 'Intake valves a cylinder',
          kind: 'whole',
          start: '1',
          check: checkCount(1, 6),
        },
        {
          name: 'exhaust',
          label: 'Exhaust valves a cylinder',
          kind: 'whole',
          start: '1',
          check: checkCount(1, 6),
        },
      ]}
      changesFor={([rid], texts) => [
        newHead(rid, customerId, {
          name: texts.name ?? '',
          casting: texts.casting ?? '',
          cylinderCount: Number(texts.cylinders),
          intakeValveCount: Number(texts.intake),
          exhaustValveCount: Number(texts.exhaust),
        }),
      ]}
    />
  );
}

/** The next stage of a head, with the valve diameters that a lift in L/D needs. */
export function NewStageSheet({
  headId,
  stages,
  ...common
}: Common & { headId: string; stages: Catalogue['stages'] }) {
  const ordinals = stages.filter((stage) => stage.headId === headId).map((stage) => stage.stageOrdinal);
  const hint = 'May stay empty: then as in the stage before';
  return (
    <NewRecordSheet
      {...common}
      title="New stage"
      actionTitle="Add the stage"
      fields={[
        {
          name: 'name',
          label: 'Name',
          hint: 'The state of the head when tested',
          start: ordinals.length === 0 ? 'as received' : '',
          check: checkLabel,
        },
        { name: 'work', label: 'What was done', isMultiline: true, check: checkNote },
        {
          name: 'intake',
          label: 'Intake valve',
          hint,
          kind: 'decimal',
          unit: 'mm',
          check: checkNumberOrNothing,
        },
        {
          name: 'exhaust',
          label: 'Exhaust valve',
          hint,
          kind: 'decimal',
          unit: 'mm',
          check: checkNumberOrNothing,
        },
      ]}
      changesFor={([rid, intakeId, exhaustId], texts) => [
        newStage(rid, {
          headId,
          stageOrdinal: Math.max(0, ...ordinals) + 1,
          name: texts.name ?? '',
          workDone: texts.work ?? '',
        }),
        ...(texts.intake ? [newValve(intakeId, rid, 'intake', texts.intake)] : []),
        ...(texts.exhaust ? [newValve(exhaustId, rid, 'exhaust', texts.exhaust)] : []),
      ]}
    />
  );
}
