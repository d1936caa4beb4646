'use client';

import { ConsequenceSwitch } from './consequence-switch';
import { Icon, type IconName } from './icon';
import type { Theme } from './theme';
import { useTheme } from './use-theme';

export const themeChoices: { value: Theme; label: string; icon: IconName }[] = [
  { value: 'light', label: 'light', icon: 'light' },
  { value: 'dark', label: 'dark', icon: 'dark' },
  { value: 'system', label: 'system', icon: 'system' },
];

export function ThemeSwitch({ initial }: { initial: Theme }) {
  const [theme, choose] = useTheme(initial);
  return (
    <ConsequenceSwitch<Theme>
      label="Light or dark"
      isLabelHidden
      size="small"
      value={theme}
      onChange={choose}
      options={themeChoices.map(({ value, label, icon }) => ({
        value,
        label: (
          <span className="inline-flex items-center gap-1.5">
            <Icon name={icon} size={14} />
            {label}
          </span>
        ),
      }))}
    />
  );
}
