import type { JSX } from 'preact';
import type { Figure } from '../../src/core/figures/figure';
import { DASHES, markStyle, strokeOf, fillOf, type ThemeKind } from '../../src/core/figures/colours';
import { mapStrip, type ImageTrace } from '../../src/core/figures/image';
import { numberText } from '../../src/core/figures/shown-number';
import type { Readout } from './readout';
import { axisTitle } from './to-plotly';

/** "Energy, 0 to 20": what the colours say. */
const imageName = ({ quantity, unit, low, high, scale }: ImageTrace): string =>
  `${quantity}${unit === '' ? '' : ` [${unit}]`}, ${numberText(low, 3)} to ${numberText(high, 3)}${scale === 'log' ? ', logarithmic' : ''}`;

interface Props {
  readonly figure: Figure;
  readonly theme: ThemeKind;
  readonly readout: Readout | undefined;
}

/** Names of the traces with a sample of their line; under the pointer also their values, so nothing covers the data. */
export function Legend({ figure, theme, readout }: Props): JSX.Element {
  const marks = [...new Map(figure.marks.map((m) => [m.role, m])).keys()];
  return (
    <div class="legend">
      <ul class="legend-names">
        {figure.traces.map((t, i) => {
          const stroke = strokeOf(t.role, theme);
          return (
            <li key={i}>
              <svg class="swatch" viewBox="0 0 22 10" aria-hidden="true">
                {t.type === 'image' && (
                  <image href={mapStrip(theme)} width="22" height="10" preserveAspectRatio="none" />
                )}
                {t.type === 'points' && (
                  <circle cx="11" cy="5" r="4" fill="none" stroke={stroke.colour} stroke-width="2" />
                )}
                {(t.type === 'range' || t.type === 'bars') && (
                  <rect x="0" y="1" width="22" height="8" fill={fillOf(t.role, theme)} />
                )}
                {t.type === 'line' && (
                  <line
                    x1="0"
                    y1="5"
                    x2="22"
                    y2="5"
                    stroke={stroke.colour}
                    stroke-width="2"
                    stroke-dasharray={DASHES[stroke.dash]}
                  />
                )}
              </svg>
              <span class="trace-name">{t.type === 'image' ? imageName(t) : t.name}</span>
              {readout?.values[i] !== undefined && <span class="trace-value">{readout.values[i]}</span>}
            </li>
          );
        })}
        {marks.map((role) => {
          const style = markStyle(role, theme);
          return (
            <li key={role}>
              <svg class="swatch" viewBox="0 0 22 10" aria-hidden="true">
                <rect
                  x="0.5"
                  y="0.5"
                  width="21"
                  height="9"
                  fill={style.fill}
                  stroke={style.colour}
                  stroke-dasharray={DASHES[style.dash]}
                />
              </svg>
              <span class="trace-name">{role}</span>
            </li>
          );
        })}
      </ul>
      <p class="under">
        <span class="y-title">{axisTitle(figure.y)}</span>
        <span class="readout" aria-hidden="true">
          {readout?.at}
        </span>
      </p>
    </div>
  );
}
