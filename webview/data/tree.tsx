import type { JSX } from 'preact';
import type { FileDescription } from '../../src/core/protocol/engine';
import { channelLine } from './channel-words';

type FileNode = FileDescription['tree'];

interface Props {
  readonly description: FileDescription;
  readonly chosen: string | undefined;
  readonly onChoose: (channel: string) => void;
}

/** The file's tree with its attributes; channels can be chosen. Files without a tree show their channels as a list. */
export function Tree({ description, chosen, onChoose }: Props): JSX.Element {
  const { tree, channels } = description;
  const placed = new Set<string>();
  const collect = (n: FileNode): void => {
    if (n.channel !== undefined) placed.add(n.channel);
    n.children.forEach(collect);
  };
  collect(tree);
  // Rows of a dataset are channels of their own and stand under it.
  const rowsOf = (n: FileNode): string[] =>
    channels
      .map((c) => c.name)
      .filter((name) => !placed.has(name) && n.kind === 'dataset' && name.startsWith(`${n.path}[`));
  const under = new Set<string>();
  const mark = (n: FileNode): void => {
    for (const r of rowsOf(n)) under.add(r);
    n.children.forEach(mark);
  };
  mark(tree);
  const loose = channels.filter((c) => !placed.has(c.name) && !under.has(c.name));
  const button = (name: string, label: string): JSX.Element => {
    const facts = channels.find((c) => c.name === name);
    return (
      <button
        type="button"
        class="channel"
        data-channel={name}
        aria-current={name === chosen}
        onClick={() => onChoose(name)}
      >
        <b>{label}</b>
        {facts && <span class="muted">{channelLine(facts)}</span>}
      </button>
    );
  };
  const node = (n: FileNode): JSX.Element => (
    <li key={n.path}>
      {n.channel !== undefined ? (
        button(n.channel, n.name)
      ) : (
        <span class="node">
          {n.name} <span class="muted">{n.detail}</span>
        </span>
      )}
      {n.attributes.length > 0 && (
        <details class="attributes" open={n.channel !== undefined && n.channel === chosen}>
          <summary>
            {n.attributes.length} {n.attributes.length === 1 ? 'attribute' : 'attributes'}
          </summary>
          <dl>
            {n.attributes.map(([key, value]) => (
              <div key={key}>
                <dt>{key}</dt>
                <dd>{value}</dd>
              </div>
            ))}
          </dl>
        </details>
      )}
      {(n.children.length > 0 || rowsOf(n).length > 0) && (
        <ul>
          {n.children.map(node)}
          {rowsOf(n).map((r) => (
            <li key={r}>{button(r, r.slice(n.path.length))}</li>
          ))}
        </ul>
      )}
    </li>
  );
  return (
    <ul class="nodes">
      {node(tree)}
      {loose.map((c) => (
        <li key={c.name}>{button(c.name, c.name)}</li>
      ))}
    </ul>
  );
}
