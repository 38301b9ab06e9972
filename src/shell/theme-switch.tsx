import { icons } from '../components/index.ts';
import { themes, useTheme } from './theme.ts';

const stones = {
  system: { label: 'Theme of the system', icon: icons.system },
  light: { label: 'Light theme', icon: icons.sun },
  dark: { label: 'Dark theme', icon: icons.moon },
};

/** System, light or dark: three stones, one of them sunk. */
export function ThemeSwitch() {
  const [theme, choose] = useTheme();
  return (
    <fieldset className="theme-switch">
      <legend className="sr-only">Theme</legend>
      {themes.map((each) => {
        const { label, icon: IconDrawing } = stones[each];
        return (
          <label key={each} title={label}>
            <input
              type="radio"
              name="theme"
              checked={each === theme}
              onChange={() => {
                choose(each);
              }}
            />
            <IconDrawing width="18" height="18" />
            <span className="sr-only">{label}</span>
          </label>
        );
      })}
    </fieldset>
  );
}
