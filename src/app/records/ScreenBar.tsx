import { Icon } from '../parts/Icon.tsx';
import { ThemeButton } from '../parts/ThemeButton.tsx';
import { doing, trouble } from './desk.ts';

/** The way back and what the screen is; below it what takes long and what went wrong. */
export function ScreenBar({ title, back, to }: { title: string; back: string; to: string }) {
  return (
    <>
      <div class="bar">
        <a class="button" href={to} aria-label={back}>
          <Icon name="back" />
        </a>
        <h1>{title}</h1>
        <ThemeButton />
      </div>
      {doing.value ? (
        <div role="status" class="doing">
          <p>{doing.value} …</p>
          <progress aria-label={doing.value} />
        </div>
      ) : null}
      {trouble.value ? (
        <p role="alert" class="note warn">
          {trouble.value}
        </p>
      ) : null}
    </>
  );
}
