'use client';

import {
  useEffect,
  useLayoutEffect,
  useMemo,
  useRef,
  useState,
  type FormEvent,
  type KeyboardEvent,
} from 'react';
import { useNow } from '@/app/_components/hooks/use-now';
import { useShortcut } from '@/app/_components/hooks/use-shortcut';
import { Button, KeyHint } from '@/app/_components/ui/button';
import { LineFields } from './line-fields';
import { MoreFields } from './more-fields';
import { useNight } from './night-provider';
import { RefusedFrames } from './refused-frames';
import { useFrameLine } from './use-frame-line';

/** Frames for this night that wait to be sent, oldest first. */
export function useWaitingFrames() {
  const { waiting } = useNight();
  return useMemo(
    () =>
      waiting.flatMap(({ outgoing, refused }) =>
        outgoing.kind === 'frame' && refused === null ? [outgoing.body] : [],
      ),
    [waiting],
  );
}

/** What the line is about to log, and what it logged last, for those who listen. */
function Spoken({ text }: { readonly text: string }) {
  return (
    <p role="status" className="sr-only">
      {text}
    </p>
  );
}

interface LineFootProps {
  readonly state: Pick<ReturnType<typeof useFrameLine>, 'repeatLast' | 'hasFormer'>;
  readonly isMore: boolean;
  readonly onMore: () => void;
}

function LineFoot({ state, isMore, onMore }: LineFootProps) {
  return (
    <div className="mt-2 flex flex-wrap items-center gap-x-4 gap-y-1 text-small text-ink-2">
      <button
        type="button"
        onClick={state.repeatLast}
        disabled={!state.hasFormer}
        className="min-h-6 underline disabled:no-underline"
      >
        Repeat last <KeyHint>Shift Enter</KeyHint>
      </button>
      <button type="button" aria-expanded={isMore} onClick={onMore} className="min-h-6 underline">
        {isMore ? 'Fewer fields' : 'File, place, seeing …'}
      </button>
      <span className="max-md:hidden">
        <kbd className="font-sans">L</kbd> comes here, <kbd className="font-sans">Esc</kbd> leaves
      </span>
    </div>
  );
}

/** A frame in one line, by keyboard: Enter logs it and the line goes on to the next. */
export function LogLine() {
  const { log, objects, send, serverNow } = useNight();
  const waiting = useWaitingFrames();
  const now = useNow(serverNow);
  const state = useFrameLine({ log, objects, waiting, now });
  const form = useRef<HTMLFormElement>(null);
  const [spoken, setSpoken] = useState('');
  const [isMore, setMore] = useState(false);

  const fieldAt = (selector: string) => form.current?.querySelector<HTMLInputElement>(selector);
  const submit = (event: FormEvent) => {
    event.preventDefault();
    const input = state.read();
    if (input === null) {
      // The field is marked once the page is drawn again.
      requestAnimationFrame(() => fieldAt('[aria-invalid=true]')?.focus());
      return;
    }
    send({ kind: 'frame', body: input });
    setSpoken(`Frame ${input.number ?? ''} logged.`);
    state.reset();
  };
  // As long as nobody types, the field with the focus is selected whole, whatever the proposal becomes: it can be typed over.
  const proposed = state.isUntouched ? Object.values(state.line).join('\n') : null;
  useLayoutEffect(() => {
    const field = document.activeElement;
    if (proposed !== null && field instanceof HTMLInputElement && form.current?.contains(field))
      field.select();
  }, [proposed]);
  const onKeyDown = (event: KeyboardEvent) => {
    if (event.key === 'Enter' && event.shiftKey) {
      event.preventDefault();
      state.repeatLast();
    } else if (event.key === 'Escape' && document.activeElement instanceof HTMLElement) {
      document.activeElement.blur();
    }
  };
  useEffect(() => {
    // A finger's keyboard would cover half the page unasked.
    if (matchMedia('(pointer: fine)').matches) {
      const field = form.current?.querySelector<HTMLInputElement>('[name=object]');
      field?.focus({ preventScroll: true });
      field?.select();
    }
  }, []);
  // At once: what is typed next belongs into the field.
  useShortcut('L', () => fieldAt('[name=object]')?.focus());

  return (
    <div className="border-b border-rule bg-sunk px-3.5 py-2.5">
      <RefusedFrames onPutBack={state.fill} />
      <form
        ref={form}
        onSubmit={submit}
        onKeyDown={onKeyDown}
        noValidate
        aria-label="Log a frame"
        className="grid grid-cols-4 items-start gap-2 lg:grid-cols-[64px_104px_minmax(120px,1.4fr)_70px_112px_84px_minmax(100px,1.6fr)_auto]"
      >
        <LineFields state={state} now={now} />
        <div className="pt-[1.15rem]">
          <Button type="submit" look="primary" shortcut="Enter" className="max-lg:w-full">
            Log
          </Button>
        </div>
        {isMore ? <MoreFields state={state} /> : null}
      </form>
      <LineFoot state={state} isMore={isMore} onMore={() => setMore(!isMore)} />
      <Spoken text={spoken} />
    </div>
  );
}
