import { type Letter, layOut } from './letter.ts';

export interface NamedInNoteData {
  author: string;
  damName: string;
  drawing: string;
  section: string;
  netName: string;
  noteNumber: number;
  text: string;
  url: string;
}

/** To somebody who was named with @ in a note or an answer. */
export function namedInNoteMail(data: NamedInNoteData): Letter {
  const { author, damName, drawing, section, netName, noteNumber, text, url } = data;
  return layOut({
    kind: 'namedInNote',
    subject: `Note ${noteNumber} names you: ${damName}, ${drawing}, ${section}`,
    paragraphs: [`${author} names you in a note.`, text],
    facts: [
      ['Dam', damName],
      ['Drawing', drawing],
      ['Section', section],
      ['Flow net', netName],
      ['Note', String(noteNumber)],
    ],
    link: { label: 'Open the note', url },
    closing: 'Answer on the drawing, where everybody who works on the net reads it.',
  });
}
