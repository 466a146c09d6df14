import { useId, useState } from 'react';
import { TextInput, View, type TextInputProps } from 'react-native';
import { AppText } from './AppText';
import { Icon } from './Icon';
import { useTheme } from './ThemeProvider';
import { fontFamilies, radius, space, stroke, targetSize, textSizes } from './tokens';
import { webProps } from './webProps';

export type TextFieldProps = {
  label: string;
  value: string;
  onChange: (text: string) => void;
  /** what is wrong and what to do; stands under the field, the text stays */
  problem?: string | null;
  /** what belongs in it, always visible */
  hint?: string;
  /** unit or other ending shown inside the field */
  unit?: string;
  kind?: 'text' | 'mail' | 'password' | 'decimal' | 'whole' | 'pin';
  isDisabled?: boolean;
  isMultiline?: boolean;
  maxLength?: number;
  /** browser autofill name: "username", "current-password", "one-time-code" */
  autoComplete?: TextInputProps['autoComplete'];
  onSubmit?: () => void;
  isFocusedFirst?: boolean;
};

const inputModes = {
  text: 'text',
  mail: 'email',
  password: 'text',
  decimal: 'decimal',
  whole: 'numeric',
  pin: 'numeric',
} as const;

/** One line (or more) of text with its name above it and its problem under it. Nothing here ever clears it. */
export function TextField(props: TextFieldProps) {
  const { label, value, onChange, problem, hint, unit, kind = 'text', isDisabled = false } = props;
  const { colors, place } = useTheme();
  const [isFocused, setIsFocused] = useState(false);
  const id = useId();
  const described = [hint ? `${id}-hint` : '', problem ? `${id}-problem` : ''].filter(Boolean).join(' ');
  const size = textSizes[place].body + (place === 'bench' ? 4 : 0);
  return (
    <View style={{ gap: space.xs }}>
      <AppText variant="label" id={`${id}-label`}>
        {label}
      </AppText>
      {hint ? (
        <AppText variant="small" color="quietInk" id={`${id}-hint`}>
          {hint}
        </AppText>
      ) : null}
      <View
        style={{
          flexDirection: 'row',
          alignItems: 'center',
          minHeight: targetSize[place],
          borderWidth: problem || isFocused ? stroke.strong : stroke.line,
          borderColor: problem ? colors.redOxide : isFocused ? colors.markingBlue : colors.line,
          borderStyle: isDisabled ? 'dashed' : 'solid',
          borderRadius: radius.field,
          backgroundColor: isDisabled ? colors.ground : colors.surface,
          paddingRight: unit ? space.m : 0,
        }}
      >
        <TextInput
          id={id}
          aria-label={label}
          aria-labelledby={`${id}-label`}
          value={value}
          onChangeText={onChange}
          editable={!isDisabled}
          multiline={props.isMultiline}
          maxLength={props.maxLength}
          secureTextEntry={kind === 'password' || kind === 'pin'}
          inputMode={inputModes[kind]}
          autoComplete={props.autoComplete ?? 'off'}
          autoCapitalize={kind === 'text' ? 'sentences' : 'none'}
          autoCorrect={false}
          spellCheck={kind === 'text'}
          autoFocus={props.isFocusedFirst}
          onFocus={() => setIsFocused(true)}
          onBlur={() => setIsFocused(false)}
          onSubmitEditing={props.onSubmit}
          submitBehavior="submit"
          {...webProps({
            'aria-describedby': described || undefined,
            'aria-invalid': problem ? true : undefined,
          })}
          style={{
            flex: 1,
            minWidth: 0,
            minHeight: (props.isMultiline ? 2 : 1) * (targetSize[place] - 4),
            paddingHorizontal: space.m,
            paddingVertical: space.s,
            color: colors.ink,
            fontFamily: fontFamilies['400'],
            fontSize: size,
            outlineOffset: 2,
          }}
        />
        {unit ? (
          <AppText color="quietInk" variant="label">
            {unit}
          </AppText>
        ) : null}
      </View>
      {problem ? (
        <View role="alert" style={{ flexDirection: 'row', gap: space.s, alignItems: 'flex-start' }}>
          <View style={{ paddingTop: 1 }}>
            <Icon name="refusal" color="redOxide" size={textSizes[place].small + 4} />
          </View>
          <AppText variant="small" weight="600" color="redOxide" id={`${id}-problem`} style={{ flex: 1 }}>
            {problem}
          </AppText>
        </View>
      ) : null}
    </View>
  );
}
