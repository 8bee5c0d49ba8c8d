import { useEffect, useRef } from 'preact/hooks';

/** The ramp of the thickness map with its unit; `ramp` holds 256 RGB triples, thin first. */
export function Legend({ ramp, topNm }: { readonly ramp: Uint8Array; readonly topNm: number }) {
  const canvas = useRef<HTMLCanvasElement>(null);
  useEffect(() => {
    const context = canvas.current?.getContext('2d');
    if (!context) return;
    for (let i = 0; i < 256; i++) {
      context.fillStyle = `rgb(${ramp[3 * i]} ${ramp[3 * i + 1]} ${ramp[3 * i + 2]})`;
      context.fillRect(0, 255 - i, 1, 1);
    }
  }, [ramp]);
  const micrometres = topNm > 2000;
  const label = (share: number) =>
    micrometres ? ((share * topNm) / 1000).toFixed(1) : Math.round(share * topNm).toString();
  return (
    <div class="legend over">
      <ol aria-label="Thickness legend">
        <li>
          {label(1)} {micrometres ? 'µm' : 'nm'}
        </li>
        <li>{label(0.75)}</li>
        <li>{label(0.5)}</li>
        <li>{label(0.25)}</li>
        <li>0</li>
      </ol>
      <canvas ref={canvas} width={1} height={256} />
    </div>
  );
}
