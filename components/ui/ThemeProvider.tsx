import { createContext, useContext, useMemo, type ReactNode } from 'react';
import { useColorScheme, useWindowDimensions } from 'react-native';
import { stroke, themes, type Colors, type Place, type ThemeName } from './tokens';

export type ThemeChoice = 'system' | ThemeName;
export type Theme = {
  name: ThemeName;
  colors: Colors;
  place: Place;
  /** width from which a bench screen is a tablet held in both hands */
  isTablet: boolean;
};

const ThemeContext = createContext<Theme>({
  name: 'daylight',
  colors: themes.daylight,
  place: 'bench',
  isTablet: false,
});

/** Colours of the theme in force, and where the screen is used. */
export function useTheme(): Theme {
  return useContext(ThemeContext);
}

/** What no style object can say: focus for the keyboard only, one flash, no movement for those who ask for none. */
function globalCss(colors: Colors, name: ThemeName): string {
  return `
html, body { background: ${colors.ground}; color-scheme: ${name === 'daylight' ? 'light' : 'dark'}; }
#root :focus-visible, [role=dialog] :focus-visible, [role=dialog]:focus-visible {
  outline: ${stroke.focus}px solid ${colors.markingBlue}; outline-offset: 2px; }
#root :focus:not(:focus-visible), [role=dialog]:focus:not(:focus-visible) { outline: none; }
::placeholder { color: ${colors.quietInk}; opacity: 1; }
@keyframes inchwater-flash { 0% { opacity: 0 } 15% { opacity: 1 } 100% { opacity: 0 } }
[data-flash="once"] { animation: inchwater-flash 420ms ease-out 1 both; }
@media (prefers-reduced-motion: reduce) {
  *, *::before, *::after { animation: none !important; transition: none !important; }
  [data-flash="once"] { opacity: 0; }
}
@media print { html, body { background: #fff; } [data-print="no"] { display: none !important; } }
`;
}

/**
 * Theme of everything below it. The bench starts in daylight, the desk follows the system, unless a person chose.
 * The innermost provider also sets the page behind the app.
 */
export function ThemeProvider({
  place,
  choice,
  children,
}: {
  place: Place;
  choice?: ThemeChoice | null;
  children: ReactNode;
}) {
  const system = useColorScheme();
  const { width } = useWindowDimensions();
  const wanted = choice ?? (place === 'bench' ? 'daylight' : 'system');
  const name: ThemeName = wanted === 'system' ? (system === 'dark' ? 'shed' : 'daylight') : wanted;
  const isTablet = place === 'bench' && width >= 700;
  const theme = useMemo(() => ({ name, colors: themes[name], place, isTablet }), [name, place, isTablet]);
  return (
    <ThemeContext.Provider value={theme}>
      <style>{globalCss(theme.colors, name)}</style>
      {children}
    </ThemeContext.Provider>
  );
}
