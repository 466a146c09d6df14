import { useRef, useState, type MouseEvent, type PointerEvent, type ReactNode } from 'react';
import { View, type Role, type StyleProp, type ViewStyle } from 'react-native';
import { webProps, type WebProps } from './webProps';

export type PressAreaProps = {
  /** released inside, or activated by keyboard or a screen reader */
  onPress?: () => void;
  /** `atMs` on the clock of the event, which all events share */
  onDown?: (atMs: number) => void;
  onUp?: (atMs: number, isInside: boolean) => void;
  role?: Role;
  /** accessible name where the content does not say it */
  label?: string;
  href?: string;
  isDisabled?: boolean;
  /** a key of the bench: never takes the focus or starts a scroll when touched */
  isKey?: boolean;
  isChecked?: boolean;
  isSelected?: boolean;
  isExpanded?: boolean;
  web?: WebProps;
  id?: string;
  style?: StyleProp<ViewStyle>;
  children: ReactNode | ((isPressed: boolean) => ReactNode);
};

/** True when the finger or pointer is over the element it went down on. A gloved thumb may roll inside it. */
function isInsideTarget(event: PointerEvent<HTMLElement>): boolean {
  const { clientX: x, clientY: y } = event;
  if (x === undefined || y === undefined) return true;
  const box = event.currentTarget.getBoundingClientRect();
  return x >= box.left && x <= box.right && y >= box.top && y <= box.bottom;
}

/**
 * The one pressable thing. It listens to pointers, not to clicks: a press-down counts at once, two thumbs may overlap,
 * and a thumb that rolls a little still counts. A click that no pointer made (detail 0) comes from a keyboard or a
 * screen reader and stands for down and up.
 */
export function PressArea(props: PressAreaProps) {
  const { onPress, onDown, onUp, isDisabled = false, isKey = false, children } = props;
  const [isPressed, setIsPressed] = useState(false);
  const downPointer = useRef<number | null>(null);

  const down = (event: PointerEvent<HTMLElement>) => {
    if (isDisabled || (event.button ?? 0) !== 0 || downPointer.current !== null) return;
    downPointer.current = event.pointerId ?? 0;
    event.currentTarget.setPointerCapture?.(event.pointerId);
    setIsPressed(true);
    onDown?.(event.timeStamp);
  };
  const up = (event: PointerEvent<HTMLElement>, mayCount: boolean) => {
    if (downPointer.current !== (event.pointerId ?? 0)) return;
    downPointer.current = null;
    setIsPressed(false);
    const isInside = mayCount && isInsideTarget(event);
    onUp?.(event.timeStamp, isInside);
    // a link waits for its click, so that "open in a new tab" stays the browser's
    if (isInside && !props.href) onPress?.();
  };
  const click = (event: MouseEvent<HTMLElement>) => {
    if (props.href) {
      if (event.ctrlKey || event.metaKey || event.shiftKey) return;
      event.preventDefault();
      if (!isDisabled) onPress?.();
      return;
    }
    if (event.detail !== 0 || isDisabled) return;
    const atMs = event.timeStamp;
    onDown?.(atMs);
    onUp?.(atMs, true);
    onPress?.();
  };

  return (
    <View
      id={props.id}
      role={props.role ?? (props.href ? 'link' : 'button')}
      aria-label={props.label}
      aria-disabled={isDisabled || undefined}
      aria-checked={props.isChecked}
      aria-selected={props.isSelected}
      aria-expanded={props.isExpanded}
      {...webProps({
        tabIndex: isDisabled ? -1 : 0,
        href: props.href,
        onClick: click,
        onPointerDown: down,
        onPointerUp: (event) => up(event, true),
        onPointerCancel: (event) => up(event, false),
        ...(isKey ? { onMouseDown: (event: MouseEvent<HTMLElement>) => event.preventDefault() } : {}),
        ...props.web,
      })}
      style={[
        {
          cursor: isDisabled ? 'auto' : 'pointer',
          userSelect: 'none',
          touchAction: isKey ? 'none' : 'manipulation',
        },
        props.style,
      ]}
    >
      {typeof children === 'function' ? children(isPressed) : children}
    </View>
  );
}
