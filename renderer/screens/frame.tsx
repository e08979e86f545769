import type { ReactNode } from 'react';
import type { Bench } from '../../shared-core/bench/bench.ts';
import { type ThemeChoice, themeChoices } from '../ui/theme.ts';

export type Place = 'Diagnose' | 'Safety';

const places: readonly Place[] = ['Diagnose', 'Safety'];

export interface FrameProps {
  readonly place: Place;
  readonly onPlace: (place: Place) => void;
  readonly bench: Bench;
  readonly themeChoice: ThemeChoice;
  readonly onTheme: (choice: ThemeChoice) => void;
  readonly onKeys: () => void;
  readonly children: ReactNode;
}

/** Name, places, bench and lamp on top; the place below. */
export function Frame(props: FrameProps) {
  const { bench } = props;
  return (
    <div className="frame">
      <header className="frame-head">
        <span className="wordmark">
          <svg width="18" height="18" viewBox="0 0 18 18" aria-hidden="true">
            <path d="M2 15 V6 M6.5 15 V2 M10.5 15 V9 M13.5 15 V11.5 M16 15 V13" />
          </svg>
          Lampwright
        </span>
        <nav aria-label="Places">
          {places.map((place) => (
            <button
              key={place}
              type="button"
              className="place"
              aria-current={place === props.place ? 'page' : undefined}
              onClick={() => props.onPlace(place)}
            >
              {place}
            </button>
          ))}
        </nav>
        <dl className="bench-names">
          <div>
            <dt>bench</dt>
            <dd>{bench.name ?? 'not described'}</dd>
          </div>
          {bench.lamp?.id !== undefined && (
            <div>
              <dt>lamp</dt>
              <dd>{bench.lamp.id}</dd>
            </div>
          )}
        </dl>
        <label className="theme-choice">
          <span>theme</span>
          <select
            value={props.themeChoice}
            onChange={(event) => {
              const choice = themeChoices.find((each) => each === event.target.value);
              if (choice !== undefined) props.onTheme(choice);
            }}
          >
            {themeChoices.map((choice) => (
              <option key={choice}>{choice}</option>
            ))}
          </select>
        </label>
        <button type="button" className="quiet" onClick={props.onKeys} aria-keyshortcuts="?">
          <kbd>?</kbd> keys
        </button>
      </header>
      {props.children}
    </div>
  );
}
