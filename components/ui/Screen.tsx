import { useEffect, type ReactNode } from 'react';
import { ScrollView, View } from 'react-native';
import { AppText } from './AppText';
import { Icon } from './Icon';
import { PressArea } from './PressArea';
import { useTheme } from './ThemeProvider';
import { radius, space, stroke, targetSize } from './tokens';

const widths = { narrow: 480, reading: 760, wide: 1440 } as const;

export type ScreenProps = {
  title: string;
  /** second line of the header */
  subtitle?: string;
  onBack?: () => void;
  /** where back leads, said to screen readers: "Back to sessions" */
  backLabel?: string;
  backHref?: string;
  /** the status strip, above everything */
  status?: ReactNode;
  /** what can be done with the whole screen, right in the header */
  actions?: ReactNode;
  /** stays at the bottom while the rest scrolls */
  footer?: ReactNode;
  width?: keyof typeof widths;
  children: ReactNode;
};

/** Frame of every screen but capture: status, header with back, one scrolling column, a footer for the main action. */
export function Screen(props: ScreenProps) {
  const { title, subtitle, onBack, backLabel = 'Back', status, actions, footer } = props;
  const { colors, place } = useTheme();
  const column = {
    width: '100%',
    maxWidth: widths[props.width ?? (place === 'bench' ? 'reading' : 'wide')],
    alignSelf: 'center',
    paddingHorizontal: place === 'bench' ? space.l : space.xl,
  } as const;
  const target = targetSize[place];
  useEffect(() => {
    document.title = `${title} · Inchwater`;
  }, [title]);
  return (
    <View style={{ flex: 1, backgroundColor: colors.ground }}>
      {status}
      <ScrollView
        role="main"
        style={{ flex: 1 }}
        contentContainerStyle={[column, { paddingVertical: space.l, gap: space.l }]}
      >
        <View style={{ flexDirection: 'row', flexWrap: 'wrap', alignItems: 'center', gap: space.m }}>
          {onBack ? (
            <PressArea
              onPress={onBack}
              label={backLabel}
              href={props.backHref}
              web={{ dataSet: { print: 'no' } }}
            >
              {(isPressed) => (
                <View
                  style={{
                    width: target,
                    height: target,
                    alignItems: 'center',
                    justifyContent: 'center',
                    borderRadius: radius.key,
                    borderWidth: stroke.line,
                    borderColor: colors.line,
                    backgroundColor: isPressed ? colors.pressed : colors.surface,
                  }}
                >
                  <Icon name="back" />
                </View>
              )}
            </PressArea>
          ) : null}
          <View style={{ flexGrow: 1, flexShrink: 1, flexBasis: 200 }}>
            <AppText variant="title" level={1}>
              {title}
            </AppText>
            {subtitle ? <AppText color="quietInk">{subtitle}</AppText> : null}
          </View>
          {actions}
        </View>
        {props.children}
      </ScrollView>
      {footer ? (
        <View
          style={{
            borderTopWidth: stroke.line,
            borderTopColor: colors.line,
            backgroundColor: colors.surface,
          }}
        >
          <View style={[column, { paddingVertical: space.m, gap: space.s }]}>{footer}</View>
        </View>
      ) : null}
    </View>
  );
}
