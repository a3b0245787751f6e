import type { StepDescription } from '../../src/core/protocol/engine';
import type { NamedKind } from '../../src/core/protocol/panel';

/** Names by port, in the order of the step's ports. */
export type PortNames = readonly (readonly string[])[];

/** Hands the names in `of` to the ports that take their kind, first come first served, as the engine does. */
export function assignPorts(
  takes: StepDescription['takes'],
  of: readonly string[],
  names: readonly NamedKind[],
): PortNames {
  const kinds = new Map(names.map((n) => [n.name, n.kind]));
  const left = [...of];
  return takes.map((port) => {
    const fits = (n: string): boolean => kinds.get(n) === port.kind;
    if (port.count === 'many') {
      const all = left.filter(fits);
      for (const n of all) left.splice(left.indexOf(n), 1);
      return all;
    }
    const at = left.findIndex(fits);
    return at < 0 ? [] : left.splice(at, 1);
  });
}

export function ofFromPorts(ports: PortNames): string[] {
  return ports.flat();
}
