import { useState, type KeyboardEvent, type ReactNode } from 'react';
import { View, type DimensionValue } from 'react-native';
import { AppText } from './AppText';
import { Icon } from './Icon';
import { alignDecimals } from './alignDecimals';
import { useTheme } from './ThemeProvider';
import { PressArea } from './PressArea';
import { glyphAdvanceEm, space, stroke, textSizes } from './tokens';
import { webProps } from './webProps';

export type DataColumn<Row> = {
  id: string;
  header: string;
  /** shown with the header; cells are bare numbers */
  unit?: string;
  /** decimal: right-aligned on the decimal mark */
  kind?: 'text' | 'decimal';
  /** share of the width */
  flex?: number;
  minWidth?: number;
  /** text of a cell; also what a screen reader hears */
  text: (row: Row) => string;
  /** own drawing of a cell instead of its text */
  draw?: (row: Row) => ReactNode;
  isSortable?: boolean;
};
export type DataSort = { columnId: string; isDescending: boolean };
export type DataTableProps<Row> = {
  /** what the table shows, for screen readers */
  label: string;
  columns: DataColumn<Row>[];
  rows: Row[];
  rowId: (row: Row) => string;
  selectedId?: string | null;
  onOpenRow?: (row: Row) => void;
  sort?: DataSort | null;
  onSort?: (sort: DataSort) => void;
  /** taller rows for a thumb */
  isRoomy?: boolean;
  /** beyond it rows scroll under the header */
  maxHeight?: DimensionValue;
};

/** A table of the desk. Arrow keys walk the rows, Enter opens one, the header stays while rows scroll under it. */
export function DataTable<Row>(props: DataTableProps<Row>) {
  const { label, columns, rows, rowId, selectedId, onOpenRow, sort, onSort, isRoomy = false } = props;
  const { colors, place } = useTheme();
  const [focusedAt, setFocusedAt] = useState(0);
  const aligned = new Map(
    columns
      .filter((column) => column.kind === 'decimal')
      .map((column) => [column.id, alignDecimals(rows.map(column.text))]),
  );
  const glyph = textSizes[place].data * glyphAdvanceEm;
  /** Widths come from the letters, all of one width: no cell runs into the next, whatever the window. */
  const leastOf = (column: DataColumn<Row>) => {
    const header =
      column.header.length + (column.unit ? column.unit.length + 1 : 0) + (column.isSortable ? 2 : 0);
    const longest = Math.max(header, ...rows.map((row) => Math.min(28, column.text(row).length)));
    return column.minWidth ?? Math.ceil(longest * glyph) + 2 * space.s;
  };
  const minWidth = columns.reduce((sum, column) => sum + leastOf(column), 4);
  const cellStyle = (column: DataColumn<Row>) => ({
    flex: column.flex ?? 1,
    minWidth: leastOf(column),
    paddingHorizontal: space.s,
    justifyContent: 'center' as const,
    alignItems: column.kind === 'decimal' ? ('flex-end' as const) : ('flex-start' as const),
  });
  const walk = (event: KeyboardEvent<HTMLElement>, row: Row) => {
    const step = event.key === 'ArrowDown' ? 1 : event.key === 'ArrowUp' ? -1 : 0;
    if (event.key === 'Enter' && onOpenRow) onOpenRow(row);
    else if (step !== 0) {
      const neighbours = event.currentTarget.parentElement?.querySelectorAll<HTMLElement>('[role=row]');
      const at = Math.min(rows.length - 1, Math.max(0, focusedAt + step));
      neighbours?.[at]?.focus();
    } else return;
    event.preventDefault();
  };
  return (
    <View
      {...webProps({ tabIndex: onOpenRow ? undefined : 0 })}
      style={{ overflowX: 'auto', overflowY: 'auto', maxHeight: props.maxHeight }}
    >
      <View role="table" aria-label={label} style={{ flexGrow: 1, minWidth }}>
        <View
          role="rowgroup"
          style={{ position: 'sticky', top: 0, zIndex: 1, backgroundColor: colors.ground }}
        >
          <View
            role="row"
            style={{
              flexDirection: 'row',
              minHeight: 40,
              borderLeftWidth: 4,
              borderLeftColor: 'transparent',
              borderBottomWidth: stroke.strong,
              borderBottomColor: colors.line,
            }}
          >
            {columns.map((column) => (
              <HeaderCell
                key={column.id}
                title={column.header}
                unit={column.unit}
                isRight={column.kind === 'decimal'}
                style={cellStyle(column)}
                sorted={
                  sort?.columnId === column.id ? (sort.isDescending ? 'descending' : 'ascending') : 'none'
                }
                onPress={
                  column.isSortable && onSort
                    ? () =>
                        onSort({
                          columnId: column.id,
                          isDescending: sort?.columnId === column.id ? !sort.isDescending : false,
                        })
                    : undefined
                }
              />
            ))}
          </View>
        </View>
        <View role="rowgroup">
          {rows.map((row, at) => {
            const isSelected = rowId(row) === selectedId;
            return (
              <View
                key={rowId(row)}
                role="row"
                {...webProps({
                  'aria-current': isSelected ? 'true' : undefined,
                  tabIndex: onOpenRow ? (at === Math.min(focusedAt, rows.length - 1) ? 0 : -1) : undefined,
                  onFocus: () => setFocusedAt(at),
                  onKeyDown: (event) => walk(event, row),
                  onClick: onOpenRow ? () => onOpenRow(row) : undefined,
                })}
                style={{
                  flexDirection: 'row',
                  minHeight: isRoomy ? 56 : 40,
                  borderBottomWidth: stroke.line,
                  borderLeftWidth: 4,
                  borderColor: colors.line,
                  borderLeftColor: isSelected ? colors.markingBlue : 'transparent',
                  backgroundColor: isSelected ? colors.pressed : colors.surface,
                  cursor: onOpenRow ? 'pointer' : 'auto',
                }}
              >
                {columns.map((column) => (
                  <View key={column.id} role="cell" style={cellStyle(column)}>
                    {column.draw ? (
                      column.draw(row)
                    ) : (
                      <AppText
                        variant="data"
                        weight={column.kind === 'decimal' ? '600' : '400'}
                        style={{ whiteSpace: 'pre-wrap' } as object}
                      >
                        {aligned.get(column.id)?.[at] ?? column.text(row)}
                      </AppText>
                    )}
                  </View>
                ))}
              </View>
            );
          })}
        </View>
      </View>
    </View>
  );
}

function HeaderCell({
  title,
  unit,
  isRight,
  style,
  sorted,
  onPress,
}: {
  title: string;
  unit?: string;
  isRight: boolean;
  style: object;
  sorted: 'ascending' | 'descending' | 'none';
  onPress?: () => void;
}) {
  const text = (
    <AppText variant="label" color="quietInk" align={isRight ? 'right' : 'left'}>
      {title}
      {unit ? <AppText variant="small" color="quietInk">{` ${unit}`}</AppText> : null}
    </AppText>
  );
  return (
    <View role="columnheader" style={style} {...(onPress ? webProps({ 'aria-sort': sorted }) : {})}>
      {onPress ? (
        <PressArea
          onPress={onPress}
          style={{ minHeight: 40, flexDirection: 'row', alignItems: 'center', gap: space.xs }}
        >
          {text}
          <Icon
            name={sorted === 'none' ? 'sort' : sorted === 'ascending' ? 'up' : 'down'}
            size={16}
            color={sorted === 'none' ? 'quietInk' : 'markingBlue'}
          />
        </PressArea>
      ) : (
        text
      )}
    </View>
  );
}
