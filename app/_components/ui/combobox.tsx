'use client';

import { useId, useState, type KeyboardEvent } from 'react';
import { classNames } from './class-names';
import { controlClass } from './control-class';
import type { FieldControl } from './field';

export interface ComboOption {
  readonly value: string;
  /** A quieter second part: what kind of thing it is. */
  readonly note?: string;
}

interface ComboboxProps {
  readonly control: FieldControl;
  readonly value: string;
  readonly onChange: (value: string) => void;
  readonly options: readonly ComboOption[];
  /** Whether an option fits what was typed; by its beginning, ignoring case, if nothing is said. */
  readonly fits?: (option: string, typed: string) => boolean;
  /** Enter takes the highlighted option and does nothing else; otherwise it goes on to the form. */
  readonly holdsEnter?: boolean;
  readonly name?: string;
  readonly mono?: boolean;
  readonly autoFocus?: boolean;
}

const most = 50;
const begins = (option: string, typed: string) => option.toLowerCase().startsWith(typed.toLowerCase());

/** What is in the list: everything as long as the text is an option as it stands, else what fits it. */
function listed(
  { options, fits = begins }: Pick<ComboboxProps, 'options' | 'fits'>,
  typed: string,
): readonly ComboOption[] {
  const text = typed.trim();
  const isWhole = text === '' || options.some(({ value }) => value === text);
  return (isWhole ? options : options.filter(({ value }) => fits(value, text))).slice(0, most);
}

/**
 * Which option Enter or Tab would take: the one that stands there as it was typed, else the first that fits. A whole
 * name shows every option, so the first of those is not what was meant.
 */
function highlighted(props: Pick<ComboboxProps, 'options' | 'fits'>, typed: string): number {
  const text = typed.trim();
  if (text === '') return -1;
  const exact = listed(props, typed).findIndex(({ value }) => value === text);
  return exact >= 0 || props.options.some(({ value }) => value === text) ? exact : 0;
}

/** What the list of a combobox knows and does: open or not, which option is highlighted, which keys do what. */
function useComboList(props: ComboboxProps) {
  const { value, onChange, holdsEnter = false } = props;
  const [isOpen, setOpen] = useState(false);
  const [active, setActive] = useState(-1);
  const shown = listed(props, value);
  const current = isOpen ? shown[active] : undefined;
  const close = () => {
    setOpen(false);
    setActive(-1);
  };
  const take = (option: ComboOption) => {
    onChange(option.value);
    close();
  };
  const type = (typed: string) => {
    onChange(typed);
    setOpen(true);
    setActive(highlighted(props, typed));
  };
  const onArrow = (event: KeyboardEvent, isDown: boolean) => {
    event.preventDefault();
    setOpen(true);
    const by = isDown ? 1 : active < 0 ? 0 : -1;
    setActive(shown.length === 0 ? -1 : (active + by + shown.length) % shown.length);
  };
  const onEnter = (event: KeyboardEvent) => {
    if (current === undefined) return close();
    if (holdsEnter && current.value !== value) event.preventDefault();
    take(current);
  };
  const onKeyDown = (event: KeyboardEvent) => {
    if (event.key === 'ArrowDown' || event.key === 'ArrowUp') onArrow(event, event.key === 'ArrowDown');
    else if (event.key === 'Tab' && current !== undefined) take(current);
    else if (event.key === 'Enter' && isOpen) onEnter(event);
    else if (event.key === 'Escape' && isOpen) {
      event.preventDefault();
      event.stopPropagation();
      close();
    }
  };
  const hasList = isOpen && shown.length > 0;
  return { shown, active, current, hasList, open: () => setOpen(true), close, take, type, onKeyDown };
}

interface ComboListProps {
  readonly id: string;
  readonly list: ReturnType<typeof useComboList>;
}

function ComboList({ id, list: { shown, active, hasList, take } }: ComboListProps) {
  return (
    <ul
      id={id}
      role="listbox"
      aria-label="Suggestions"
      hidden={!hasList}
      className="absolute left-0 z-20 mt-0.5 max-h-64 w-max max-w-80 min-w-full overflow-auto rounded-control border border-edge bg-sheet py-1 text-table"
    >
      {(hasList ? shown : []).map((option, index) => (
        <li
          key={`${option.value} ${option.note ?? ''}`}
          id={`${id}-${index}`}
          role="option"
          aria-selected={index === active}
          // Before the field loses focus, which closes the list.
          onPointerDown={(event) => {
            event.preventDefault();
            take(option);
          }}
          className="flex min-h-6 cursor-pointer items-baseline gap-3 px-2 py-0.5 hover:bg-sunk aria-selected:bg-accent aria-selected:text-accent-ink"
        >
          {option.value}
          {option.note === undefined ? null : (
            <span className={classNames('ml-auto text-small', index !== active && 'text-ink-2')}>
              {option.note}
            </span>
          )}
        </li>
      ))}
    </ul>
  );
}

/**
 * A text with suggestions, drawn by us: the browser's own list is white. Typing narrows, arrows choose, Enter or Tab
 * takes, Esc closes and keeps what was typed.
 */
export function Combobox(props: ComboboxProps) {
  const { control, value, name, mono = false, autoFocus } = props;
  const id = useId();
  const list = useComboList(props);
  return (
    <span className="relative block min-w-0">
      <input
        {...control}
        type="text"
        name={name}
        value={value}
        autoComplete="off"
        spellCheck={false}
        autoFocus={autoFocus}
        role="combobox"
        aria-expanded={list.hasList}
        aria-controls={id}
        aria-autocomplete="list"
        aria-activedescendant={list.current === undefined ? undefined : `${id}-${list.active}`}
        onChange={(event) => list.type(event.target.value)}
        onClick={list.open}
        onBlur={list.close}
        onFocus={(event) => event.target.select()}
        onKeyDown={list.onKeyDown}
        className={classNames(controlClass, mono && 'font-mono')}
      />
      <ComboList id={id} list={list} />
    </span>
  );
}
