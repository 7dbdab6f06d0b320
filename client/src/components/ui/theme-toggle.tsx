import type { ThemeChoice } from '../../lib/theme.ts';
import { chooseTheme, THEME_CHOICES, useThemeChoice } from '../../lib/theme.ts';
import { Field } from './field.tsx';
import { Select } from './select.tsx';

const WORDS: Readonly<Record<ThemeChoice, string>> = {
  system: 'as the device is set',
  light: 'light',
  dark: 'dark',
  sun: 'sunlight, black on white',
};

/** How the screen is lit, remembered on this device. */
export function ThemeToggle() {
  const choice = useThemeChoice();
  return (
    <Field label="Screen">
      <Select
        options={THEME_CHOICES.map((value) => ({ value, label: WORDS[value] }))}
        value={choice}
        onChange={(event) => chooseTheme(event.target.value as ThemeChoice)}
      />
    </Field>
  );
}
