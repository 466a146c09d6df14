import { z } from 'zod';
import { Id, Instant } from './primitives';
import {
  Bench,
  Customer,
  Head,
  PortDimension,
  Reading,
  Run,
  Rung,
  Session,
  SessionState,
  Stage,
} from './records';

/* What session screens read. Two implementations fill the same shapes: the device's own database on bench routes, the
 * API on desk routes. Corrected flows are not in them: they are computed where they are shown. */

/** Where the newest change of a record stands. At the desk everything is `sent` unless it is in dispute or held. */
export const Mark = z.enum(['onDevice', 'sent', 'dispute', 'held', 'setAside']);
export type Mark = z.infer<typeof Mark>;

const stored = { id: Id, version: z.number().int(), mark: Mark };

export const CustomerRow = z.object({ ...stored, ...Customer.shape });
export const HeadRow = z.object({ ...stored, ...Head.shape });
export const StageRow = z.object({ ...stored, ...Stage.shape });
export const PortDimensionRow = z.object({ ...stored, ...PortDimension.shape });
export const BenchRow = z.object({ ...stored, ...Bench.shape });
export const SessionRow = z.object({ ...stored, ...Session.shape });
export const RunRow = z.object({ ...stored, ...Run.shape });
export const RungRow = z.object({ ...stored, ...Rung.shape });
export const ReadingRow = z.object({ ...stored, ...Reading.shape });
export type CustomerRow = z.infer<typeof CustomerRow>;
export type HeadRow = z.infer<typeof HeadRow>;
export type StageRow = z.infer<typeof StageRow>;
export type PortDimensionRow = z.infer<typeof PortDimensionRow>;
export type BenchRow = z.infer<typeof BenchRow>;
export type SessionRow = z.infer<typeof SessionRow>;
export type RunRow = z.infer<typeof RunRow>;
export type RungRow = z.infer<typeof RungRow>;
export type ReadingRow = z.infer<typeof ReadingRow>;

export const SessionSummary = z.object({
  id: Id,
  label: z.string(),
  state: SessionState,
  customerName: z.string(),
  headName: z.string(),
  stageName: z.string(),
  benchName: z.string(),
  runCount: z.number().int(),
  rungCount: z.number().int(),
  readingCount: z.number().int(),
  /** readings whose newest change the server has not taken as it is */
  notSentCount: z.number().int(),
  /** names of everyone who keyed a reading in it */
  keyedBy: z.array(z.string()),
  lastReadingAt: Instant.nullable(),
});
export type SessionSummary = z.infer<typeof SessionSummary>;

/** One run with its rungs in order of `rungOrdinal` and its readings in order of `readingOrdinal`. */
export const RunView = z.object({ run: RunRow, rungs: z.array(RungRow), readings: z.array(ReadingRow) });
export type RunView = z.infer<typeof RunView>;

export const SessionView = z.object({
  session: SessionRow,
  customer: CustomerRow,
  head: HeadRow,
  stage: StageRow,
  bench: BenchRow,
  portDimensions: z.array(PortDimensionRow),
  runs: z.array(RunView),
  people: z.array(z.object({ id: Id, name: z.string() })),
});
export type SessionView = z.infer<typeof SessionView>;

/** What a session is started from: everything there is to choose among. */
export const Catalogue = z.object({
  customers: z.array(CustomerRow),
  heads: z.array(HeadRow),
  stages: z.array(StageRow),
  benches: z.array(BenchRow),
});
export type Catalogue = z.infer<typeof Catalogue>;
