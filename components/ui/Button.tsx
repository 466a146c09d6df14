import { View, type StyleProp, type ViewStyle } from 'react-native';
import { AppText } from './AppText';
import { Icon, type IconName } from './Icon';
import { PressArea } from './PressArea';
import { useTheme } from './ThemeProvider';
import { radius, space, stroke, targetSize, type Colors } from './tokens';

export type ButtonProps = {
  /** what it does, with its object: "Hand in session 3-012" */
  title: string;
  onPress: () => void;
  kind?: 'primary' | 'quiet' | 'danger';
  icon?: IconName;
  /** where it leads, for buttons that are really links */
  href?: string;
  isDisabled?: boolean;
  /** work is under way: it says so and takes no second press */
  isBusy?: boolean;
  isExpanded?: boolean;
  /** fills the line */
  isWide?: boolean;
  /** accessible name when the title alone is not enough */
  label?: string;
  style?: StyleProp<ViewStyle>;
};

/** A button of words. 64 px and more at the bench, 44 at the desk. */
export function Button(props: ButtonProps) {
  const { title, onPress, kind = 'quiet', icon, isDisabled = false, isBusy = false } = props;
  const { colors, place, isTablet } = useTheme();
  const isPrimary = kind === 'primary';
  const ink: keyof Colors = isDisabled
    ? 'quietInk'
    : isPrimary
      ? 'onMarkingBlue'
      : kind === 'danger'
        ? 'redOxide'
        : 'markingBlue';
  const border = isDisabled ? colors.line : kind === 'danger' ? colors.redOxide : colors.markingBlue;
  return (
    <PressArea
      onPress={onPress}
      href={props.href}
      label={props.label}
      isDisabled={isDisabled || isBusy}
      isExpanded={props.isExpanded}
      style={[
        {
          minHeight: isTablet ? 80 : targetSize[place],
          justifyContent: 'center',
          alignSelf: props.isWide ? 'stretch' : 'flex-start',
        },
        props.style,
      ]}
    >
      {(isPressed) => (
        <View
          style={{
            flexGrow: 1,
            flexDirection: 'row',
            alignItems: 'center',
            justifyContent: 'center',
            gap: space.s,
            paddingHorizontal: place === 'bench' ? space.l : space.m,
            paddingVertical: space.s,
            borderRadius: radius.key,
            borderWidth: stroke.line,
            borderStyle: isDisabled ? 'dashed' : 'solid',
            borderColor: border,
            backgroundColor: isDisabled
              ? 'transparent'
              : isPrimary
                ? colors.markingBlue
                : isPressed
                  ? colors.pressed
                  : colors.surface,
            transform: isPressed ? [{ translateY: 1 }] : [],
            opacity: isPrimary && isPressed ? 0.85 : 1,
          }}
        >
          {icon ? <Icon name={icon} color={ink} size={place === 'bench' ? 24 : 20} /> : null}
          <AppText
            variant="label"
            weight={isPrimary ? '800' : '600'}
            color={ink}
            align="center"
            style={{ flexShrink: 1 }}
          >
            {isBusy ? `${title} …` : title}
          </AppText>
        </View>
      )}
    </PressArea>
  );
}
