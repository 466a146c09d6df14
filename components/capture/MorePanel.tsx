import { View } from 'react-native';
import { AppText } from '@/components/ui/AppText';
import { Icon, type IconName } from '@/components/ui/Icon';
import { PressArea } from '@/components/ui/PressArea';
import { Sheet } from '@/components/ui/Sheet';
import { useTheme } from '@/components/ui/ThemeProvider';
import { radius, space, stroke } from '@/components/ui/tokens';
import { Chip } from '@/shared/schema/records';
import { chipWords, type CaptureProps } from './captureProps';

type Verb = { icon: IconName; title: string; detail: string; onPress: () => void };

/** What is needed now and then, one press away from the pad. */
export function MorePanel({
  props,
  lift,
  onOpenRungs,
  onClose,
}: {
  props: CaptureProps;
  /** the lift being keyed, null when every one is done */
  lift: string | null;
  onOpenRungs: () => void;
  onClose: () => void;
}) {
  const then = (act: () => void) => () => {
    onClose();
    act();
  };
  const verbs: Verb[] = [
    {
      icon: 'repeat',
      title: 'Repeat a lift',
      detail: 'The lift saved last',
      onPress: then(props.onRepeat),
    },
    ...(lift === null
      ? []
      : [
          {
            icon: 'skip' as const,
            title: `Skip lift ${lift}`,
            detail: 'It can be keyed later',
            onPress: then(props.onSkip),
          },
        ]),
    {
      icon: 'column',
      title: 'Go to a lift',
      detail: 'Every lift, to press',
      onPress: onOpenRungs,
    },
    { icon: 'add', title: 'Add a lift', detail: 'One not in the plan', onPress: then(props.onAddLift) },
    {
      icon: 'check',
      title: 'Finish this run',
      detail: 'On to the next port',
      onPress: then(props.onFinishRun),
    },
    {
      icon: 'door',
      title: 'Leave to the runs',
      detail: 'Half-keyed digits stay',
      onPress: then(props.onLeave),
    },
  ];
  return (
    <Sheet title="More" isFullScreen closeTitle="Back" onClose={onClose}>
      {verbs.map((verb) => (
        <VerbKey key={verb.title} verb={verb} />
      ))}
      <View role="group" aria-label="Notes for this reading" style={{ gap: space.s }}>
        <AppText variant="label">Note for this reading</AppText>
        <View style={{ flexDirection: 'row', flexWrap: 'wrap', gap: space.s }}>
          {Chip.options.map((chip) => (
            <ChipKey
              key={chip}
              chip={chip}
              isOn={props.chips.includes(chip)}
              onPress={() => props.onToggleChip(chip)}
            />
          ))}
        </View>
      </View>
    </Sheet>
  );
}

function VerbKey({ verb }: { verb: Verb }) {
  const { colors } = useTheme();
  return (
    <PressArea onPress={verb.onPress}>
      {(isPressed) => (
        <View
          style={{
            minHeight: 72,
            flexDirection: 'row',
            alignItems: 'center',
            gap: space.m,
            paddingVertical: space.s,
            paddingHorizontal: space.m,
            borderRadius: radius.key,
            borderWidth: stroke.line,
            borderColor: colors.line,
            backgroundColor: isPressed ? colors.pressed : colors.surface,
          }}
        >
          <Icon name={verb.icon} size={28} color="markingBlue" />
          <View style={{ flex: 1 }}>
            <AppText variant="heading" weight="800">
              {verb.title}
            </AppText>
            <AppText variant="small" color="quietInk">
              {verb.detail}
            </AppText>
          </View>
        </View>
      )}
    </PressArea>
  );
}

function ChipKey({ chip, isOn, onPress }: { chip: Chip; isOn: boolean; onPress: () => void }) {
  const { colors } = useTheme();
  return (
    <PressArea role="checkbox" isChecked={isOn} onPress={onPress}>
      {(isPressed) => (
        <View
          style={{
            minHeight: 64,
            flexDirection: 'row',
            alignItems: 'center',
            gap: space.s,
            paddingHorizontal: space.l,
            borderRadius: radius.key,
            borderWidth: isOn ? stroke.strong : stroke.line,
            borderColor: isOn ? colors.markingBlue : colors.line,
            backgroundColor: isPressed ? colors.pressed : colors.surface,
          }}
        >
          {isOn ? <Icon name="check" color="markingBlue" /> : null}
          <AppText variant="label" weight={isOn ? '800' : '600'}>
            {chipWords[chip]}
          </AppText>
        </View>
      )}
    </PressArea>
  );
}
