import { themeChoices, useTheme } from '#src/hooks/use-theme.ts';
import { t } from '#src/texts/t.ts';
import { Choice } from './choice.tsx';

export function ThemeSwitch() {
  const [theme, setTheme] = useTheme();
  return (
    <Choice
      label={t.ui.theme}
      options={themeChoices.map((value) => ({ value, label: t.ui.themes[value] }))}
      value={theme}
      onChange={setTheme}
    />
  );
}
