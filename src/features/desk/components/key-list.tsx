import { Fragment, useEffect, useState } from 'react';
import { createPortal } from 'react-dom';
import { Button } from '#client/components/button.tsx';
import { Dialog } from '#client/components/dialog.tsx';
import { type KeyGroup, keysText as text } from '#client/text/keys.ts';
import type { DeskStore } from '../model/desk-state.ts';
import { ALL_KEYS } from './desk-keys.ts';
import type { KeyPress } from './key-binding.ts';
import { PART_KEYS } from './part-keys.ts';

/** The list of all keys, opened by one of them or by a button. */
export function KeyListDialog({ store }: { store: DeskStore }) {
  const [open, setOpen] = useState(false);
  useEffect(() => store.onIntent((intent) => intent.type === 'listKeys' && setOpen(true)), [store]);
  if (!open) return null;
  const close = () => setOpen(false);
  return createPortal(
    <Dialog title={text.title} wide onClose={close}>
      {/* The way out comes first: the dialog begins where the focus is. */}
      <div className="mb-3 flex items-start gap-4">
        <p className="m-0 text-ink-2">{text.lead}</p>
        <Button className="ml-auto shrink-0" onClick={close}>
          {text.close}
        </Button>
      </div>
      <div className="gap-x-8 md:columns-2">
        {(Object.keys(text.groups) as KeyGroup[]).map((group) => (
          <KeyTable key={group} group={group} />
        ))}
      </div>
    </Dialog>,
    document.body,
  );
}

function KeyTable({ group }: { group: KeyGroup }) {
  const keys = [...PART_KEYS, ...ALL_KEYS].filter((binding) => binding.group === group);
  return (
    <table className="mb-4 w-full break-inside-avoid">
      <caption className="mb-1 text-left font-semibold">{text.groups[group]}</caption>
      <tbody>
        {keys.map(({ id, presses }) => (
          <tr key={id} className="border-t border-rule-2 align-top">
            <td className="py-1 pr-3 whitespace-nowrap">
              <Presses presses={presses} />
            </td>
            <th scope="row" className="w-full py-1 text-left font-normal">
              {text.does[id]}
            </th>
          </tr>
        ))}
      </tbody>
    </table>
  );
}

function Presses({ presses }: { presses: readonly KeyPress[] }) {
  return keyWords(presses).map((keys, index) => (
    <span key={keys.join(' ')} className="block">
      {index === 0 ? null : `${text.or} `}
      {keys.map((key, place) => (
        <Fragment key={key}>
          {place === 0 ? null : ' + '}
          <kbd className="rounded-sheet border border-edge px-1 font-sans text-sm">{key}</kbd>
        </Fragment>
      ))}
    </span>
  ));
}

/** Each way to press it as the keys held together; the four arrows are one way. */
export function keyWords(presses: readonly KeyPress[]): string[][] {
  const ways = presses.map(({ key, ctrl, alt, shift }) => {
    const held = [ctrl && text.ctrl, alt && text.alt, shift && text.shift];
    return [...held.filter((each) => each !== undefined), nameOf(key)];
  });
  return ways.filter((way, i) => ways.findIndex((each) => each.join() === way.join()) === i);
}

/** Letters are written large, named keys as they stand on the keyboard. */
function nameOf(key: string): string {
  if (key.startsWith('Arrow')) return text.arrows;
  return text.names[key] ?? (key.length === 1 ? key.toUpperCase() : key);
}
