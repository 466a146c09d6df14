import type { SessionSettings } from '@/shared/schema/records';
import type { ReadingRow, SessionSummary, SessionView } from '@/shared/schema/views';
import { newId, readingFields, sessionFields } from './records';

const stored = { version: 1, mark: 'sent' as const };

/** A stored reading, to be overridden where a test cares. */
export const readingRow = (over: Partial<ReadingRow> = {}): ReadingRow => ({
  ...readingFields(over),
  id: newId(),
  ...stored,
  ...over,
});

/** A session with one intake run of the given readings. */
export function sessionView(
  readings: ReadingRow[],
  settings: Partial<SessionSettings> = {},
  people = [{ id: newId(), name: 'Odd Sommer' }],
): SessionView {
  const [customerId, headId, stageId, benchId, sessionId, runId] = Array.from({ length: 6 }, newId) as [
    string,
    string,
    string,
    string,
    string,
    string,
  ];
  const fields = sessionFields({ stageId, benchId, label: '3-012' });
  return {
    session: { id: sessionId, ...stored, ...fields, settings: { ...fields.settings, ...settings } },
    customer: { id: customerId, ...stored, name: 'Marsh Racing', mail: null, phone: null, note: '' },
    head: {
      id: headId,
      ...stored,
      customerId,
      name: 'Two-valve four',
      casting: '7742',
      cylinderCount: 4,
      boreText: null,
      boreUnit: null,
      intakeValveCount: 1,
      exhaustValveCount: 1,
      ports: [{ side: 'intake', port: '1' }],
    },
    stage: { id: stageId, ...stored, headId, stageOrdinal: 1, name: 'as received', workDone: '' },
    bench: {
      id: benchId,
      ...stored,
      name: 'Long bench',
      element: 'vane',
      elementPlace: 'room',
      settingKind: 'none',
      settingText: null,
      settingUnit: null,
      settingStepText: null,
      settingStepUnit: null,
      flowResolutionText: '1',
      flowResolutionUnit: 'cfm',
      pressureResolutionText: '0.1',
      pressureResolutionUnit: 'inH2O',
      pressureLowText: null,
      pressureLowUnit: null,
      pressureHighText: null,
      pressureHighUnit: null,
      ranges: [],
      leakExponentText: '0.5',
      status: 'inUse',
      statusWhy: '',
    },
    portDimensions: [],
    runs: [
      {
        run: {
          id: runId,
          ...stored,
          sessionId,
          runOrdinal: 1,
          side: 'intake',
          port: '1',
          direction: 'drawing',
          pass: 'up',
          setUp: {
            boreAdapter: '',
            inlet: 'notNoted',
            exhaustStub: '',
            plug: '',
            valves: 'notNoted',
            springs: '',
            liftReadAt: '',
          },
          valvesOpenCount: 1,
          liftZeroBeforeText: null,
          liftZeroBeforeUnit: null,
          liftZeroAfterText: null,
          liftZeroAfterUnit: null,
          airId: null,
          plenumTemperatureText: null,
          plenumTemperatureUnit: null,
        },
        rungs: [],
        readings,
      },
    ],
    people,
  };
}

/** A session as a list shows it. */
export const summary = (over: Partial<SessionSummary> = {}): SessionSummary => ({
  id: newId(),
  label: '3-012',
  state: 'open',
  customerName: 'Marsh Racing',
  headName: 'Two-valve four',
  stageName: 'as received',
  benchName: 'Long bench',
  runCount: 2,
  rungCount: 12,
  readingCount: 7,
  notSentCount: 0,
  keyedBy: ['Odd Sommer'],
  lastReadingAt: '2026-12-01T10:00:00.000Z',
  ...over,
});
