import type { JSX } from 'preact';
import { RateForm } from '../page/rate-form';
import { useLook } from './context';

/** Asks for the sample rate a file does not say; the answer goes into the recipe's input. */
export function AskRate({ input }: { readonly input: string }): JSX.Element {
  const { post } = useLook();
  return (
    <RateForm
      button="Put into the recipe"
      onAnswer={(answers) => post({ type: 'edit', edit: { op: 'input', input, values: { ...answers } } })}
    />
  );
}
