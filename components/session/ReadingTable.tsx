import { View } from 'react-native';
import { markWords } from '@/components/column/rungState';
import { AppText } from '@/components/ui/AppText';
import { alignDecimals } from '@/components/ui/alignDecimals';
import { DataTable, type DataColumn } from '@/components/ui/DataTable';
import { PressArea } from '@/components/ui/PressArea';
import { localTime } from './localTime';
import { MarkWord } from './MarkWord';
import { hasDoubt, sharedUnit, type RunTableRow } from './readingRows';

type Props = {
  /** which run it is, for screen readers */
  label: string;
  rows: RunTableRow[];
  /** readings that came in a moment ago */
  newIds: ReadonlySet<string>;
  onOpen: (row: RunTableRow) => void;
};

/** The readings of one run, to the letter as they were keyed, with the corrected flow beside them. */
export function ReadingTable({ label, rows, newIds, onOpen }: Props) {
  return (
    <DataTable
      label={label}
      columns={columnsFor(rows, newIds, onOpen)}
      rows={rows}
      rowId={(row) => row.reading.id}
      onOpenRow={onOpen}
    />
  );
}

function columnsFor(
  rows: RunTableRow[],
  newIds: ReadonlySet<string>,
  onOpen: Props['onOpen'],
): DataColumn<RunTableRow>[] {
  const readings = rows.map((row) => row.reading);
  const lift = sharedUnit(readings.map((reading) => reading.liftUnit));
  const flow = sharedUnit(readings.map((reading) => reading.flowUnit));
  const pressure = sharedUnit(readings.map((reading) => reading.pressureUnit));
  const correctedUnit = rows.find((row) => row.corrected)?.corrected?.unit;
  const aligned = alignDecimals(rows.map((row) => row.corrected?.text ?? ''));
  const figure = (row: RunTableRow) => aligned[rows.indexOf(row)] ?? '';
  const keyed = (text: string, unit: string, shared: string | null) => (shared ? text : `${text} ${unit}`);
  return [
    {
      id: 'lift',
      header: 'Lift',
      ...(lift ? { unit: lift } : {}),
      kind: 'decimal',
      minWidth: 66,
      text: ({ reading }) => keyed(reading.liftText, reading.liftUnit, lift),
    },
    {
      id: 'flow',
      header: 'Flow',
      ...(flow ? { unit: flow } : {}),
      kind: 'decimal',
      minWidth: 66,
      text: ({ reading }) => keyed(reading.flowText, reading.flowUnit, flow),
    },
    {
      id: 'pressure',
      header: 'Pressure',
      ...(pressure ? { unit: pressure } : {}),
      kind: 'decimal',
      minWidth: 92,
      text: ({ reading }) => keyed(reading.pressureText, reading.pressureUnit, pressure),
    },
    {
      id: 'corrected',
      header: 'Corrected',
      ...(correctedUnit ? { unit: correctedUnit } : {}),
      kind: 'decimal',
      minWidth: 102,
      text: ({ corrected }) => corrected?.text ?? 'not possible',
      draw: (row) => <CorrectedCell row={row} text={figure(row)} onPress={() => onOpen(row)} />,
    },
    {
      id: 'notes',
      header: 'Notes',
      flex: 2,
      minWidth: 110,
      text: ({ notes }) => notes.join(', '),
      draw: ({ notes }) => (
        <AppText variant="small" color="quietInk">
          {notes.join(', ')}
        </AppText>
      ),
    },
    {
      id: 'by',
      header: 'Keyed by',
      flex: 2,
      minWidth: 120,
      text: ({ keyedBy }) => keyedBy,
      draw: ({ keyedBy, reading }) => (
        <View>
          <AppText variant="small">{keyedBy}</AppText>
          <AppText variant="small" color="quietInk">
            {localTime(reading.at)}
          </AppText>
        </View>
      ),
    },
    {
      id: 'mark',
      header: 'Is',
      minWidth: 110,
      text: ({ reading }) => markWords[reading.mark],
      draw: ({ reading }) => (
        <MarkWord mark={reading.mark} hasDoubt={hasDoubt(reading)} isNew={newIds.has(reading.id)} />
      ),
    },
  ];
}

/** The corrected flow, underlined: pressing it opens its working. */
function CorrectedCell({ row, text, onPress }: { row: RunTableRow; text: string; onPress: () => void }) {
  const { corrected, reading } = row;
  const label = corrected
    ? `Working of ${corrected.text} ${corrected.unit} at lift ${reading.liftText} ${reading.liftUnit}`
    : `Why the reading at lift ${reading.liftText} ${reading.liftUnit} is not corrected`;
  return (
    <PressArea
      onPress={onPress}
      label={label}
      web={{ tabIndex: -1 }}
      style={{ minHeight: 32, justifyContent: 'center' }}
    >
      <AppText
        variant="data"
        weight="800"
        color="markingBlue"
        style={{ textDecorationLine: 'underline', whiteSpace: 'pre-wrap' } as object}
      >
        {corrected ? text : 'why not'}
      </AppText>
    </PressArea>
  );
}
