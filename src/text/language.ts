/** The languages of the interface, by their BCP 47 tag, each by its own name. A new one is added here first. */
export const LANGUAGES = { en: 'English' } as const satisfies Record<string, string>;
export type Language = keyof typeof LANGUAGES;

/** What another language has to say where one says `T`: the same members, functions of the same arguments. */
export type SameTexts<T> = T extends string
  ? string
  : T extends (...given: infer Given) => infer Said
    ? (...given: Given) => SameTexts<Said>
    : T extends readonly (infer Each)[]
      ? readonly SameTexts<Each>[]
      : T extends object
        ? { readonly [Name in keyof T]: SameTexts<T[Name]> }
        : T;

/** The texts of an area in every language: one that is missing, or says less than the English, does not compile. */
export type Catalogue<English> = { readonly en: English } & {
  readonly [Other in Exclude<Language, 'en'>]: SameTexts<English>;
};

/** The first of the languages wanted that there is, by its tag or by what stands before the first hyphen. */
export function pickLanguage(
  wanted: readonly string[],
  known: readonly string[] = Object.keys(LANGUAGES),
): string {
  for (const tag of wanted) {
    const found = known.find((each) => each === tag) ?? known.find((each) => each === tag.split('-')[0]);
    if (found !== undefined) return found;
  }
  return known[0] ?? 'en';
}

/** The language of this screen: the first of the browser's that the interface has. */
export const language = pickLanguage(globalThis.navigator?.languages ?? []) as Language;

/** The texts of an area in the language of the screen. */
export function inLanguage<English>(catalogue: Catalogue<English>): SameTexts<English> {
  return (catalogue as unknown as Record<Language, SameTexts<English>>)[language];
}
