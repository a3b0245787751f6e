import type { FileNode, Hdf5Attribute, Hdf5Dataset, Hdf5Group } from './format';

/** Last part of a path; the root is "/". */
export function leafName(path: string): string {
  return path === '/' ? '/' : path.slice(path.lastIndexOf('/') + 1);
}

/** Tree for the panel; `channelOf` gives the first channel of a dataset, if it has one. */
export function treeOf(group: Hdf5Group, channelOf: (path: string) => string | undefined): FileNode {
  return {
    name: leafName(group.path),
    path: group.path,
    kind: 'group',
    detail: '',
    attributes: attributeTexts(group.attributes),
    children: [
      ...group.groups.map((g) => treeOf(g, channelOf)),
      ...group.datasets.map((d) => datasetNode(d, channelOf(d.path))),
      ...group.others.map((o) => ({
        name: leafName(o.path),
        path: o.path,
        kind: 'other' as const,
        detail: o.what,
        attributes: [],
        children: [],
      })),
    ],
  };
}

function datasetNode(d: Hdf5Dataset, channel: string | undefined): FileNode {
  const packed = d.filters.length > 0 ? `, ${d.filters.join('+')}` : '';
  const shape = d.shape.length === 0 ? scalarText(d) : `${d.shape.join(' × ')} ${d.typeText}`;
  return {
    name: leafName(d.path),
    path: d.path,
    kind: 'dataset',
    detail: `${shape}${packed}`,
    attributes: attributeTexts(d.attributes),
    ...(channel === undefined ? {} : { channel }),
    children: [],
  };
}

function scalarText(d: Hdf5Dataset): string {
  const value = d.small();
  return value === undefined ? d.typeText : clip(valueText(value));
}

function attributeTexts(attributes: readonly Hdf5Attribute[]): (readonly [string, string])[] {
  return attributes.map((a) => [a.name, clip(valueText(a.value))] as const);
}

function valueText(value: Hdf5Attribute['value']): string {
  return Array.isArray(value) ? `[${value.map(String).join(', ')}]` : String(value);
}

function clip(text: string): string {
  return text.length > 400 ? `${text.slice(0, 399)}…` : text;
}
