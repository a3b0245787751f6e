const ENTITIES: Readonly<Record<string, string>> = {
  '&': '&amp;',
  '<': '&lt;',
  '>': '&gt;',
  '"': '&quot;',
  "'": '&#39;',
};

/** Text made safe inside HTML elements and attributes: names in data files are not ours. */
export function escapeHtml(text: string): string {
  return text.replace(/[&<>"']/g, (c) => ENTITIES[c]);
}

/** HTML that is already safe. */
export interface Html {
  readonly html: string;
}

/** Template whose values are escaped unless they are Html themselves; lists are joined. */
export function safe(
  parts: TemplateStringsArray,
  ...values: readonly (string | number | Html | readonly Html[])[]
): Html {
  const text = (v: (typeof values)[number]): string =>
    typeof v === 'object' ? ('html' in v ? v.html : v.map((x) => x.html).join('')) : escapeHtml(String(v));
  return { html: parts.reduce((all, part, i) => all + text(values[i - 1]) + part) };
}

/** JSON that cannot end the script element it stands in. Typed arrays become lists, NaN null, numbers 9 digits. */
export function scriptJson(value: unknown): string {
  const plain = JSON.stringify(value, (_, v: unknown) => {
    if (ArrayBuffer.isView(v))
      return Array.from(v as Float64Array, (x) => (Number.isFinite(x) ? Number(x.toPrecision(9)) : null));
    return v;
  });
  return plain
    .replace(/</g, '\\u003c')
    .replace(/\u2028/g, '\\u2028')
    .replace(/\u2029/g, '\\u2029');
}
