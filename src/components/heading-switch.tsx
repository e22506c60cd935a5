interface HeadingSwitchProps<View extends string> {
  titles: Readonly<Record<View, string>>;
  shown: View;
  onShow: (view: View) => void;
}

/** The heading of the view that is shown, and beside it the names of the others. */
export function HeadingSwitch<View extends string>({ titles, shown, onShow }: HeadingSwitchProps<View>) {
  return (
    <div className="flex flex-wrap items-baseline gap-x-3">
      {(Object.keys(titles) as View[]).map((view) =>
        view === shown ? (
          <h2 key={view} className="m-0 text-base font-bold">
            {titles[view]}
          </h2>
        ) : (
          <button
            key={view}
            type="button"
            className="touch text-base text-ink-2 underline decoration-rule underline-offset-4 hover:decoration-ink"
            onClick={() => onShow(view)}
          >
            {titles[view]}
          </button>
        ),
      )}
    </div>
  );
}
