import { keepTheme } from '../keep.ts';
import { theme } from '../state.ts';
import { Icon } from './Icon.tsx';

/** Switches between the dark theme and the one for bright sun. */
export function ThemeButton({ over = false }: { readonly over?: boolean }) {
  const toSunlight = theme.value === 'dark';
  return (
    <button
      type="button"
      class={over ? 'over' : ''}
      aria-label={toSunlight ? 'Sunlight theme' : 'Dark theme'}
      onClick={() => {
        theme.value = toSunlight ? 'sunlight' : 'dark';
        keepTheme();
      }}
    >
      <Icon name="sun" />
    </button>
  );
}
