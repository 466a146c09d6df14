import { useState, type ReactNode } from 'react';
import { ScrollView, View, useWindowDimensions } from 'react-native';
import { Column } from '@/components/column/Column';
import { RungList } from '@/components/column/RungList';
import { Keypad } from '@/components/keypad/Keypad';
import { useHardwareKeys } from '@/components/keypad/useHardwareKeys';
import { Banner } from '@/components/ui/Banner';
import { Button } from '@/components/ui/Button';
import { Stack } from '@/components/ui/Layout';
import { Sheet } from '@/components/ui/Sheet';
import { StatusStrip } from '@/components/ui/StatusStrip';
import { useTheme } from '@/components/ui/ThemeProvider';
import { space } from '@/components/ui/tokens';
import { DoubtStrip } from './DoubtStrip';
import { MorePanel } from './MorePanel';
import { PromptRow } from './PromptRow';
import { ResultRow } from './ResultRow';
import { SaveKey } from './SaveKey';
import { ValueBoxes } from './ValueBoxes';
import { captureLayout, padHeight, type CaptureLayout } from './captureLayout';
import { unitLabel, type CaptureProps } from './captureProps';

/** Keying a run: one screen, one hand, no scrolling. Everything it shows arrives by props, every key leaves as an event. */
export function CaptureScreen(props: CaptureProps) {
  const { colors } = useTheme();
  const { width, height } = useWindowDimensions();
  const layout = captureLayout(width, height);
  const [panel, setPanel] = useState<'rungs' | 'more' | null>(null);
  const isTablet = layout.control > 64;
  const isLocked = Boolean(props.lockedSentence) || props.currentRungId === null;
  useHardwareKeys(props.onKeypadEvent, panel === null && !isLocked);
  const current = props.rungs.find((rung) => rung.id === props.currentRungId) ?? null;
  const rungList = (
    <RungList
      rungs={props.rungs}
      currentRungId={props.currentRungId}
      flowUnit={unitLabel(props.flowUnit)}
      rowHeight={isTablet ? 80 : 64}
      isCompact={isTablet && layout.columnWidth < 248}
      onGoToRung={(rungId) => {
        setPanel(null);
        props.onGoToRung(rungId);
      }}
    />
  );
  const inner = height - layout.statusHeight;
  const parts = { layout, props, current, onOpen: setPanel };
  return (
    <View role="main" aria-label={props.runTitle} style={{ flex: 1, backgroundColor: colors.ground }}>
      <StatusStrip facts={props.facts} height={layout.statusHeight} onPress={props.onOpenStatus} />
      <Frame isScrolling={layout.isScrolling} margin={isTablet ? space.l : 0}>
        {isTablet ? (
          <View style={{ width: layout.columnWidth, height: inner, paddingVertical: space.s }}>
            {rungList}
          </View>
        ) : (
          <Column
            rungs={props.rungs}
            currentRungId={props.currentRungId}
            width={layout.columnWidth}
            height={inner - 8}
            flashId={props.result?.readingId}
          />
        )}
        {layout.arrangement === 'phone' || layout.arrangement === 'tablet' ? (
          <View style={{ width: Math.max(layout.padWidth, layout.contentWidth), alignItems: 'center' }}>
            <View style={{ width: layout.contentWidth }}>
              <ReadPart {...parts} />
            </View>
            <View style={{ flex: 1 }} />
            <PadPart {...parts} />
            <View style={{ height: layout.bottom }} />
          </View>
        ) : (
          <>
            <View style={{ width: layout.contentWidth, paddingTop: isTablet ? space.s : 0 }}>
              <ReadPart {...parts} />
              <View style={{ flex: 1 }} />
              {isTablet || isLocked ? null : (
                <SaveKey
                  layout={layout}
                  keypad={props.keypad}
                  width={layout.contentWidth}
                  onEvent={props.onKeypadEvent}
                />
              )}
            </View>
            <View style={{ justifyContent: 'flex-end', paddingBottom: layout.bottom }}>
              <PadPart {...parts} isSaveElsewhere={!isTablet} />
            </View>
          </>
        )}
      </Frame>
      {panel === 'rungs' ? (
        <Sheet title={props.runTitle} isFullScreen closeTitle="Back" onClose={() => setPanel(null)}>
          {rungList}
        </Sheet>
      ) : null}
      {panel === 'more' ? (
        <MorePanel
          props={props}
          lift={current ? `${current.liftText} ${current.liftUnit}` : null}
          onOpenRungs={() => setPanel('rungs')}
          onClose={() => setPanel(null)}
        />
      ) : null}
    </View>
  );
}

type PartProps = {
  layout: CaptureLayout;
  props: CaptureProps;
  current: CaptureProps['rungs'][number] | null;
  onOpen: (panel: 'rungs' | 'more') => void;
};

function Frame({
  isScrolling,
  margin,
  children,
}: {
  isScrolling: boolean;
  margin: number;
  children: ReactNode;
}) {
  const row = { flexDirection: 'row', justifyContent: 'space-between', paddingRight: margin } as const;
  if (!isScrolling) return <View style={[{ flex: 1, overflow: 'hidden' }, row]}>{children}</View>;
  return <ScrollView contentContainerStyle={row}>{children}</ScrollView>;
}

/** What is read: the lift to set, what is keyed, what came out. */
function ReadPart({ layout, props, current, onOpen }: PartProps) {
  const at = current ? props.rungs.indexOf(current) + 1 : 0;
  const repeats = current?.readings.filter((reading) => reading.isUsed).length ?? 0;
  const place = [
    props.runTitle,
    ...(current ? [`${at} of ${props.rungs.length}`] : []),
    ...(repeats > 0 ? [`repeat ${repeats}`] : []),
  ].join(' · ');
  const isDoubting = props.doubt && props.keypad.flowText === '' && props.keypad.notice === null;
  return (
    <>
      <PromptRow
        layout={layout}
        liftText={current?.liftText ?? null}
        liftUnit={current?.liftUnit ?? ''}
        place={place}
        onOpenRungs={layout.control > 64 ? undefined : () => onOpen('rungs')}
        onOpenMore={() => onOpen('more')}
      />
      {props.doubt && isDoubting ? (
        <DoubtStrip
          layout={layout}
          doubt={props.doubt}
          height={layout.arrangement === 'tabletSide' ? undefined : layout.valuesHeight + layout.resultHeight}
          onAnswer={(id) => props.onAnswerDoubt?.(id)}
        />
      ) : (
        <>
          {current && !props.lockedSentence ? (
            <ValueBoxes
              layout={layout}
              keypad={props.keypad}
              flowUnit={props.flowUnit}
              pressureUnit={props.pressureUnit}
              onEvent={props.onKeypadEvent}
            />
          ) : null}
          <ResultRow
            layout={layout}
            result={props.result}
            notice={props.keypad.notice}
            flowUnit={unitLabel(props.flowUnit)}
            standardPressure={props.standardPressure}
            onUndo={props.onUndo}
            onOpenWorking={props.onOpenWorking}
          />
        </>
      )}
    </>
  );
}

/** What is pressed: the pad and SAVE; or, when nothing is left to key, what comes next. */
function PadPart({
  layout,
  props,
  current,
  onOpen,
  isSaveElsewhere = false,
}: PartProps & { isSaveElsewhere?: boolean }) {
  if (props.lockedSentence || !current) {
    return (
      <View
        style={{
          width: layout.padWidth,
          minHeight: padHeight(layout),
          padding: space.s,
          justifyContent: 'flex-end',
        }}
      >
        <Stack gap="m">
          {props.lockedSentence ? (
            <Banner kind="attention" sentence={props.lockedSentence} />
          ) : (
            <>
              <Banner
                kind="done"
                sentence={`All ${props.rungs.length} lifts of this run are saved or skipped.`}
              />
              <Button title="Finish this run" kind="primary" isWide onPress={props.onFinishRun} />
              <Button title="Add a lift" icon="add" isWide onPress={props.onAddLift} />
            </>
          )}
          <Button title="Go to a lift" icon="column" isWide onPress={() => onOpen('rungs')} />
          <Button title="Leave to the runs" icon="door" isWide onPress={props.onLeave} />
        </Stack>
      </View>
    );
  }
  return (
    <View style={{ gap: layout.padToSave - layout.keyGap / 2 }}>
      <Keypad
        mark={props.keypad.mark}
        keyHeight={layout.keyHeight}
        gap={layout.keyGap}
        labelSize={layout.size.key}
        width={layout.padWidth}
        onEvent={props.onKeypadEvent}
      />
      {isSaveElsewhere ? null : (
        <SaveKey
          layout={layout}
          keypad={props.keypad}
          width={layout.padWidth}
          onEvent={props.onKeypadEvent}
        />
      )}
    </View>
  );
}
