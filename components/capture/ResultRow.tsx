import { useEffect, useState } from 'react';
import { View } from 'react-native';
import { AppText } from '@/components/ui/AppText';
import { Icon } from '@/components/ui/Icon';
import { PressArea } from '@/components/ui/PressArea';
import { Spoken } from '@/components/ui/Spoken';
import { useTheme } from '@/components/ui/ThemeProvider';
import { radius, space, stroke } from '@/components/ui/tokens';
import type { KeypadNotice } from '@/shared/entry/keypadNotice';
import type { CaptureLayout } from './captureLayout';
import type { ShownResult } from './captureProps';

/** True until `untilMs`; a timer takes it back. */
function useIsBefore(untilMs: number | null): boolean {
  const [passedMs, setPassedMs] = useState<number | null>(null);
  useEffect(() => {
    if (untilMs === null) return;
    const timer = setTimeout(() => setPassedMs(untilMs), Math.max(0, untilMs - Date.now()));
    return () => clearTimeout(timer);
  }, [untilMs]);
  return untilMs !== null && passedMs !== untilMs;
}

/** The last corrected figure with UNDO, or why the last key changed nothing. */
export function ResultRow({
  layout,
  result,
  notice,
  flowUnit,
  standardPressure,
  onUndo,
  onOpenWorking,
}: {
  layout: CaptureLayout;
  result: ShownResult | null;
  notice: KeypadNotice | null;
  flowUnit: string;
  standardPressure: string;
  onUndo: (readingId: string) => void;
  onOpenWorking: (readingId: string) => void;
}) {
  const { colors } = useTheme();
  const { size, resultHeight, control } = layout;
  const canUndo = useIsBefore(result?.undoUntilMs ?? null);
  const isLong = notice?.code === 'notSaved';
  return (
    <View style={{ height: resultHeight, flexDirection: 'row', alignItems: 'center', gap: space.s }}>
      <Spoken isLive>{result ? `${result.words}. ${result.correctedText ?? ''} ${flowUnit}` : ''}</Spoken>
      {notice ? (
        <View
          role="alert"
          style={{
            flex: 1,
            height: resultHeight - 6,
            flexDirection: 'row',
            alignItems: 'center',
            gap: space.s,
            paddingHorizontal: space.s,
            borderRadius: radius.key,
            borderWidth: stroke.strong,
            borderColor: notice.code === 'repeatIgnored' ? colors.line : colors.redOxide,
            backgroundColor: colors.surface,
            overflow: 'hidden',
          }}
        >
          <Icon
            name={notice.code === 'repeatIgnored' ? 'repeat' : 'refusal'}
            color={notice.code === 'repeatIgnored' ? 'ink' : 'redOxide'}
          />
          <AppText size={size.small} lineHeight={size.small} weight="600" lines={3} style={{ flex: 1 }}>
            {notice.sentence}
          </AppText>
        </View>
      ) : result ? (
        <PressArea
          isKey
          onPress={() => onOpenWorking(result.readingId)}
          style={{ flex: 1, minWidth: 0, height: resultHeight, justifyContent: 'center' }}
        >
          <AppText size={size.figure} lineHeight={size.figure - 8} weight="800" lines={1}>
            {result.correctedText ?? '–'}
            <AppText size={control === 64 ? 24 : 28} weight="600" color="quietInk">
              {` ${flowUnit}`}
            </AppText>
          </AppText>
          <AppText size={size.small} lineHeight={size.small} weight="600" color="water" lines={1}>
            {result.words}
          </AppText>
          <Spoken>{`corrected to ${standardPressure}. Open the working`}</Spoken>
        </PressArea>
      ) : (
        <AppText size={size.small} color="quietInk" style={{ flex: 1 }} lines={2}>
          {`Corrected flow at ${standardPressure} stands here once saved.`}
        </AppText>
      )}
      {result && canUndo && !isLong ? (
        <PressArea
          isKey
          label="UNDO the last reading"
          onPress={() => onUndo(result.readingId)}
          style={{
            width: control === 64 ? 92 : 120,
            height: control,
            paddingTop: space.hair,
            paddingBottom: space.xs,
          }}
        >
          {(isPressed) => (
            <View
              style={{
                flex: 1,
                alignItems: 'center',
                justifyContent: 'center',
                borderRadius: radius.key,
                borderWidth: stroke.line,
                borderColor: colors.line,
                backgroundColor: isPressed ? colors.pressed : colors.surface,
              }}
            >
              <Icon name="undo" size={26} />
              <AppText size={size.small} lineHeight={size.small + 4} weight="800">
                UNDO
              </AppText>
            </View>
          )}
        </PressArea>
      ) : null}
    </View>
  );
}
