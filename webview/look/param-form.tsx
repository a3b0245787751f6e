import type { JSX } from 'preact';
import { useEffect, useState } from 'preact/hooks';
import type { CardView, ParamSpec } from '../../src/core/protocol/panel';
import { useLook } from './context';
import { OfForm } from './of-form';
import { boundsWords, defaultWords, fieldText, readField, sliderBounds, unitOf } from './param-text';
import { Slider } from './slider';

/** The parameters of a step, built from its description. Only valid values reach the document. */
export function ParamForm({ view }: { readonly view: CardView }): JSX.Element {
  const { steps, post } = useLook();
  const description = steps.get(view.do);
  if (!description)
    return <p class="muted">There is no step "{view.do}", so its parameters are not known.</p>;
  const params = Object.entries(description.params);
  const set = (key: string, value: unknown): void =>
    post({ type: 'edit', edit: { op: 'set', step: view.id, params: { [key]: value } } });
  return (
    <div class="params" data-form={view.id}>
      <p class="muted">{description.summary}</p>
      <OfForm view={view} takes={description.takes} />
      {params.length === 0 && <p class="muted">This step has no parameters.</p>}
      {params.map(([key, param]) => (
        <Field
          key={key}
          id={`${view.id}-${key}`}
          name={key}
          param={param}
          value={view.params[key]}
          onSet={(v) => set(key, v)}
        />
      ))}
    </div>
  );
}

interface FieldProps {
  readonly id: string;
  readonly name: string;
  readonly param: ParamSpec;
  /** As in the document; undefined when the document does not say it. */
  readonly value: unknown;
  readonly onSet: (value: unknown) => void;
}

function Field({ id, name, param, value, onSet }: FieldProps): JSX.Element {
  const given = value !== undefined;
  const bounds = boundsWords(param);
  return (
    <div class="field" data-given={given}>
      <label for={id}>
        {param.label} <code class="muted">{name}</code>
      </label>
      <div class="field-input">
        <Control id={id} name={name} param={param} value={value} onSet={onSet} />
        {unitOf(param) !== '' && <span class="unit">{unitOf(param)}</span>}
        {given && (
          <button type="button" class="text-button" data-action="default" onClick={() => onSet(undefined)}>
            use default
          </button>
        )}
      </div>
      <p class="help" id={`${id}-help`}>
        {param.help}{' '}
        <span class="muted">
          Default: {defaultWords(param)}.{bounds !== '' && ` Allowed: ${bounds}.`}
        </span>
      </p>
    </div>
  );
}

function Control({ id, name, param, value, onSet }: FieldProps): JSX.Element {
  const attributes = { id, 'data-param': name, 'aria-describedby': `${id}-help` };
  switch (param.kind) {
    case 'choice':
      return (
        <select
          {...attributes}
          value={typeof value === 'string' ? value : param.default}
          onChange={(e) => onSet(e.currentTarget.value)}
        >
          {param.choices.map((c) => (
            <option key={c} value={c}>
              {c}
            </option>
          ))}
        </select>
      );
    case 'flag':
      return (
        <input
          {...attributes}
          type="checkbox"
          checked={(value ?? param.default) === true}
          onChange={(e) => onSet(e.currentTarget.checked)}
        />
      );
    case 'number': {
      const bounds = sliderBounds(param);
      return (
        <>
          <TextField id={id} name={name} param={param} value={value} onSet={onSet} />
          {bounds && (
            <Slider
              label={param.label}
              scale={param.slider ?? 'linear'}
              {...bounds}
              integer={param.integer === true}
              value={typeof value === 'number' ? value : param.default}
              onSet={onSet}
            />
          )}
        </>
      );
    }
    default:
      return <TextField id={id} name={name} param={param} value={value} onSet={onSet} />;
  }
}

/** A text field that keeps what is typed until it is valid, and sends it on Enter or when left. */
function TextField({ id, name, param, value, onSet }: FieldProps): JSX.Element {
  const shown = fieldText(param, value);
  const [draft, setDraft] = useState<string>();
  const [wrong, setWrong] = useState<string>();
  useEffect(() => {
    setDraft(undefined);
    setWrong(undefined);
  }, [shown]);
  const commit = (): void => {
    if (draft === undefined) return;
    const reading = readField(param, draft);
    if (!reading.ok) {
      setWrong(reading.message);
      return;
    }
    setWrong(undefined);
    if (fieldText(param, reading.value) === shown) setDraft(undefined);
    else onSet(reading.value);
  };
  return (
    <>
      <input
        id={id}
        data-param={name}
        type="text"
        inputMode={param.kind === 'number' ? 'decimal' : 'text'}
        spellcheck={false}
        autocomplete="off"
        aria-describedby={`${id}-help`}
        aria-invalid={wrong !== undefined}
        aria-errormessage={wrong === undefined ? undefined : `${id}-wrong`}
        placeholder={defaultWords(param)}
        value={draft ?? shown}
        onInput={(e) => setDraft(e.currentTarget.value)}
        onBlur={commit}
        onKeyDown={(e) => {
          if (e.key === 'Enter') commit();
          if (e.key === 'Escape' && draft !== undefined) {
            e.stopPropagation();
            setDraft(undefined);
            setWrong(undefined);
          }
        }}
      />
      {wrong !== undefined && (
        <span class="wrong" id={`${id}-wrong`} role="alert">
          {param.label} {wrong}
        </span>
      )}
    </>
  );
}
