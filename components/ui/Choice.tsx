import { useId, type KeyboardEvent } from 'react';
import { View } from 'react-native';
import { AppText } from './AppText';
import { Icon } from './Icon';
import { PressArea } from './PressArea';
import { useTheme } from './ThemeProvider';
import { radius, space, stroke, targetSize } from './tokens';
import { webProps } from './webProps';

export type ChoiceOption<T extends string> = {
  value: T;
  title: string;
  detail?: string;
  isDisabled?: boolean;
};
export type ChoiceProps<T extends string> = {
  label: string;
  options: ChoiceOption<T>[];
  value: T | null;
  onChange: (value: T) => void;
  /** beside each other for two or three short ones, otherwise a list */
  layout?: 'row' | 'list';
  problem?: string | null;
  isLabelHidden?: boolean;
};

const steps: Record<string, number> = { ArrowDown: 1, ArrowRight: 1, ArrowUp: -1, ArrowLeft: -1 };

/** One of several, as big buttons. Arrow keys move inside the group, Tab leaves it. */
export function Choice<T extends string>(props: ChoiceProps<T>) {
  const { label, options, value, onChange, layout = 'list', problem } = props;
  const { colors, place } = useTheme();
  const id = useId();
  const focusable = Math.max(
    0,
    options.findIndex((option) => option.value === value && !option.isDisabled),
  );
  const move = (from: number) => (event: KeyboardEvent<HTMLElement>) => {
    const step = steps[event.key];
    if (step === undefined) return;
    event.preventDefault();
    let at = from;
    do at = (at + step + options.length) % options.length;
    while (options[at]?.isDisabled && at !== from);
    const next = options[at];
    if (!next || next.isDisabled) return;
    onChange(next.value);
    const radios = event.currentTarget.parentElement?.querySelectorAll<HTMLElement>('[role=radio]');
    radios?.[at]?.focus();
  };
  return (
    <View style={{ gap: space.xs }}>
      {props.isLabelHidden ? null : (
        <AppText variant="label" id={`${id}-label`}>
          {label}
        </AppText>
      )}
      <View
        role="radiogroup"
        aria-label={label}
        {...webProps({ 'aria-describedby': problem ? `${id}-problem` : undefined })}
        style={{ flexDirection: layout === 'row' ? 'row' : 'column', gap: space.s }}
      >
        {options.map((option, at) => {
          const isChosen = option.value === value;
          return (
            <PressArea
              key={option.value}
              role="radio"
              isChecked={isChosen}
              isDisabled={option.isDisabled}
              onPress={() => onChange(option.value)}
              web={{ onKeyDown: move(at), tabIndex: at === focusable ? 0 : -1 }}
              style={layout === 'row' ? { flex: 1 } : {}}
            >
              {(isPressed) => (
                <View
                  style={{
                    flexGrow: 1,
                    minHeight: targetSize[place],
                    flexDirection: 'row',
                    alignItems: 'center',
                    gap: space.s,
                    paddingHorizontal: space.m,
                    paddingVertical: space.s,
                    borderRadius: radius.key,
                    borderWidth: isChosen ? stroke.strong : stroke.line,
                    borderColor: isChosen ? colors.markingBlue : colors.line,
                    borderStyle: option.isDisabled ? 'dashed' : 'solid',
                    backgroundColor: isPressed ? colors.pressed : colors.surface,
                  }}
                >
                  <View style={{ width: 24 }}>
                    {isChosen ? <Icon name="check" color="markingBlue" /> : null}
                  </View>
                  <View style={{ flex: 1 }}>
                    <AppText
                      variant="label"
                      color={option.isDisabled ? 'quietInk' : 'ink'}
                      weight={isChosen ? '800' : '600'}
                    >
                      {option.title}
                    </AppText>
                    {option.detail ? (
                      <AppText variant="small" color="quietInk">
                        {option.detail}
                      </AppText>
                    ) : null}
                  </View>
                </View>
              )}
            </PressArea>
          );
        })}
      </View>
      {problem ? (
        <AppText variant="small" weight="600" color="redOxide" id={`${id}-problem`}>
          {problem}
        </AppText>
      ) : null}
    </View>
  );
}
