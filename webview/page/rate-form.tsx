import type { JSX } from 'preact';
import { useState } from 'preact/hooks';
import type { ChannelAnswers } from '../../src/core/protocol/panel';
import { utcOf } from '../words/instants';
import { readAnswers } from './answers';

interface Props {
  readonly button: string;
  readonly onAnswer: (answers: ChannelAnswers) => void;
}

/** The small form for what a file does not say: rate, and the time of the first sample if it is known. */
export function RateForm({ button, onAnswer }: Props): JSX.Element {
  const [rate, setRate] = useState('');
  const [epoch, setEpoch] = useState('');
  const [tried, setTried] = useState(false);
  const reading = readAnswers(rate, epoch);
  const send = (): void => {
    setTried(true);
    if (reading.ok) onAnswer(reading.answers);
  };
  const onKeyDown = (e: KeyboardEvent): void => {
    if (e.key === 'Enter') send();
  };
  return (
    <div class="ask" data-ask="rate" role="group" aria-label="What the file does not say">
      <label>
        Sample rate
        <span class="field-input">
          <input
            type="text"
            inputMode="decimal"
            data-param="rate"
            placeholder="4096"
            value={rate}
            aria-invalid={tried && reading.rate !== undefined}
            onInput={(e) => setRate(e.currentTarget.value)}
            onKeyDown={onKeyDown}
          />
          <span class="unit">Hz</span>
        </span>
      </label>
      <label>
        GPS time of the first sample, if known
        <span class="field-input">
          <input
            type="text"
            data-param="epoch"
            placeholder="1400000000.0"
            value={epoch}
            aria-invalid={tried && reading.epoch !== undefined}
            onInput={(e) => setEpoch(e.currentTarget.value)}
            onKeyDown={onKeyDown}
          />
          <span class="unit">s</span>
          {epoch.trim() !== '' && <span class="muted">{utcOf(epoch)}</span>}
        </span>
      </label>
      <button type="button" data-action="answer" onClick={send}>
        {button}
      </button>
      {tried && !reading.ok && (
        <p class="wrong" role="alert">
          {[reading.rate, reading.epoch].filter(Boolean).join(' ')}
        </p>
      )}
    </div>
  );
}
