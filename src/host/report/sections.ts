import type { Quantity, Warning } from '../../core/data/quantity';
import type { Table } from '../../core/data/table';
import { utcText, parseGps } from '../../core/data/gps-time';
import type { Card, InputProvenance } from '../../core/protocol/engine';
import { number } from '../cli/format';
import { safe, type Html } from './html';

/** Parts of the report that read without any script: inputs, numbers, warnings, tables, provenance. */
export function inputSection(i: InputProvenance): Html {
  const gaps =
    i.gaps.length === 0 ? 'none' : i.gaps.map((g) => `${number(g.seconds)} s from GPS ${g.start}`).join('; ');
  const rows: readonly (readonly [string, string])[] = [
    ['File', `${i.file} (${i.format}), channel ${i.channel}`],
    [
      'Span',
      `${i.startKnown ? `GPS ${i.start} (${utcText(parseGps(i.start))}), ` : 'start not known, '}${number(i.duration)} s, ${i.samples} samples`,
    ],
    ['Sample rate', `${number(i.rate)} Hz, from ${i.rateFrom}`],
    ['Start', `from ${i.startFrom}`],
    ['Unit', i.unit === '' ? 'not stated' : i.unit],
    ['Gaps', gaps],
    ['SHA-256 of the samples as little-endian float64', i.sha256],
  ];
  return safe`<section class="input">
    <h2>Input ${i.name}</h2>
    ${pairs(rows)}
  </section>`;
}

/** `first` is the index of the card's first figure among all of the report. */
export function cardSection(card: Card, first: number): Html {
  const body =
    card.state === 'done'
      ? safe`<p class="sentence">${card.sentence}</p>
          ${card.figures.map(
            (f, k) =>
              safe`<figure data-figure="${first + k}">
                <div class="plot" role="img" aria-label="${f.caption}"></div>
                <figcaption>${f.title}. ${f.caption}</figcaption>
              </figure>`,
          )}
          ${numbers(card.numbers)}${card.warnings.map(warning)}${card.tables.map(table)}${provenance(card)}`
      : safe`<p class="problem">${card.state}: ${card.error?.message ?? ''}</p>`;
  return safe`<section class="card" id="step-${card.id}">
    <h2>${card.title} <small>${card.id}</small></h2>
    ${body}
  </section>`;
}

function pairs(rows: readonly (readonly [string, string])[]): Html {
  return safe`<table class="facts">
    <tbody>
      ${rows.map(
        ([k, v]) =>
          safe`<tr>
            <th scope="row">${k}</th>
            <td>${v}</td>
          </tr>`,
      )}
    </tbody>
  </table>`;
}

function numbers(list: readonly Quantity[]): Html {
  const interval = (q: Quantity): string =>
    q.low === undefined || q.high === undefined
      ? ''
      : `${number(q.low, 4)} to ${number(q.high, 4)}${q.intervalMeaning === undefined ? '' : ` (${q.intervalMeaning})`}`;
  const rows = list.map(
    (q) =>
      safe`<tr>
        <th scope="row">${q.label}</th>
        <td class="value">${number(q.value)} ${q.unit}</td>
        <td>${interval(q)}</td>
        <td>${q.convention ?? ''}</td>
      </tr>`,
  );
  return safe`<table class="numbers">
    <tbody>
      ${rows}
    </tbody>
  </table>`;
}

function warning(w: Warning): Html {
  return safe`<p class="warning ${w.severity}">
    <strong>${w.severity}</strong> <code>${w.code}</code> ${w.found}. ${w.consequence} ${w.remedy}
  </p>`;
}

function table(t: Table): Html {
  const head = t.columns.map(
    (c) => safe`<th scope="col">${c.unit === '' ? c.label : `${c.label} / ${c.unit}`}</th>`,
  );
  const rows = t.rows.map(
    (r) =>
      safe`<tr>
        ${r.map((c) => safe`<td>${c === null ? '–' : typeof c === 'number' ? number(c) : c}</td>`)}
      </tr>`,
  );
  return safe`<table class="rows">
    <caption>
      ${t.title}
    </caption>
    <thead>
      <tr>
        ${head}
      </tr>
    </thead>
    <tbody>
      ${rows}
    </tbody>
  </table>`;
}

function provenance({ provenance: p }: Card): Html {
  if (!p) return safe``;
  return safe`<details>
    <summary>How this was made</summary>
    ${pairs([
      ['Step', `${p.step}, version ${p.version}`],
      ['Of', p.of.join(', ')],
      ['Parameters', JSON.stringify(p.params)],
      ['Fingerprint', p.fingerprint],
    ])}
  </details>`;
}
