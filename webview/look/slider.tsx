import type { JSX } from 'preact';
import { useState } from 'preact/hooks';
import { numberText } from '../../src/core/figures/shown-number';
import { sliderPlace, sliderValue } from './param-text';

interface Props {
  readonly label: string;
  readonly scale: 'linear' | 'log';
  readonly min: number;
  readonly max: number;
  readonly integer: boolean;
  /** null: the step chooses; the knob then rests in the middle. */
  readonly value: number | null;
  readonly onSet: (value: number) => void;
}

const STEPS = 1000;

/** A slider beside a number field; the value is sent when the knob is let go, since each one is a run. */
export function Slider({ label, scale, min, max, integer, value, onSet }: Props): JSX.Element {
  const [moving, setMoving] = useState<number>();
  const place = moving ?? (value === null ? 0.5 : sliderPlace(value, min, max, scale));
  const at = (p: number): number => {
    const v = sliderValue(p, min, max, scale);
    return integer ? Math.round(v) : v;
  };
  return (
    <span class="slider">
      <input
        type="range"
        min={0}
        max={STEPS}
        step={1}
        value={Math.round(place * STEPS)}
        aria-label={`${label}, slider`}
        aria-valuetext={numberText(at(place))}
        onInput={(e) => setMoving(Number(e.currentTarget.value) / STEPS)}
        onChange={(e) => {
          const v = at(Number(e.currentTarget.value) / STEPS);
          setMoving(undefined);
          if (v !== value) onSet(v);
        }}
      />
      <output>{moving === undefined ? '' : numberText(at(moving))}</output>
    </span>
  );
}
