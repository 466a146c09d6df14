/// <reference types="expo/types" />
import type { KeyboardEvent, MouseEvent, PointerEvent } from 'react';

/** Props that react-native-web hands on to the DOM and that react-native's own types do not know. */
export type WebProps = {
  onClick?: (event: MouseEvent<HTMLElement>) => void;
  onMouseDown?: (event: MouseEvent<HTMLElement>) => void;
  onPointerDown?: (event: PointerEvent<HTMLElement>) => void;
  onPointerUp?: (event: PointerEvent<HTMLElement>) => void;
  onPointerCancel?: (event: PointerEvent<HTMLElement>) => void;
  onKeyDown?: (event: KeyboardEvent<HTMLElement>) => void;
  onFocus?: () => void;
  href?: string;
  tabIndex?: 0 | -1;
  dataSet?: Record<string, string>;
  'aria-describedby'?: string;
  'aria-invalid'?: boolean;
  'aria-pressed'?: boolean;
  'aria-current'?: 'true' | 'page' | 'step';
  'aria-level'?: number;
  'aria-sort'?: 'ascending' | 'descending' | 'none';
  'aria-keyshortcuts'?: string;
  'aria-rowindex'?: number;
  'aria-atomic'?: boolean;
};

/** Names web-only props in one typed place; spread the result on a react-native element. */
export function webProps(props: WebProps): object {
  return props;
}
