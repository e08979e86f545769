import { useId, useMemo } from 'react';
import type { DiagnosedLine } from '../../../shared-core/diagnosis/diagnosis.ts';
import type { LineFigure } from '../../../shared-core/diagnosis/figures.ts';
import {
  formatAtPlace,
  formatSignificant,
  formatWithSigma,
} from '../../../shared-core/text/format-number.ts';
import { ChartCanvas } from '../../charts/chart-canvas.tsx';
import { lineConfig } from '../../charts/line-config.ts';
import { lineLabel } from '../../../shared-core/report/line-label.ts';
import { Quantity } from '../../ui/quantity.tsx';
import { usePalette } from '../../ui/theme.ts';

export interface LineCardProps {
  readonly line: DiagnosedLine;
  readonly figure: LineFigure | null;
  readonly isLeftOut: boolean;
  readonly onSwitch: (lineId: string) => void;
}

/** One line: chart, the numbers of its fit, and whether it is used. */
export function LineCard({ line, figure, isLeftOut, onSwitch }: LineCardProps) {
  const id = useId();
  const name = lineLabel(line.id);
  // Only what a person left out can a person take back in; the other reasons stand in the data.
  const canSwitch = line.used || isLeftOut;
  return (
    <li className={line.used ? 'line-card' : 'line-card is-off'}>
      <div className="line-head">
        <h3>
          {name}{' '}
          <span className="line-place">
            {formatAtPlace(line.referenceNm, -2)}
            <span className="unit"> nm</span>
          </span>
        </h3>
        <label className="switch" htmlFor={`${id}-use`}>
          <input
            id={`${id}-use`}
            type="checkbox"
            role="switch"
            aria-label={`Use ${name}`}
            aria-describedby={line.used ? undefined : `${id}-why`}
            checked={line.used}
            disabled={!canSwitch}
            onChange={() => onSwitch(line.id)}
          />
          use
        </label>
      </div>
      <div className="line-chart">
        {figure === null ? (
          <p className="line-empty">no fit</p>
        ) : (
          <LineChart figure={figure} label={`${line.id}: recorded points, fitted profile and residuals`} />
        )}
      </div>
      <LineNumbers line={line} />
      {!line.used && (
        <p id={`${id}-why`} className="line-why">
          {line.reasons.join(' ')}
        </p>
      )}
    </li>
  );
}

function LineChart({ figure, label }: { readonly figure: LineFigure; readonly label: string }) {
  const palette = usePalette();
  const config = useMemo(() => lineConfig(figure, palette), [figure, palette]);
  return <ChartCanvas config={config} label={label} />;
}

const areaUnits: Record<DiagnosedLine['areaUnit'], string> = {
  electrons: 'e⁻',
  counts: 'counts',
  'signal nm': 'signal nm',
};

function LineNumbers({ line }: { readonly line: DiagnosedLine }) {
  const lorentzian =
    line.lorentzianFwhmNm === null
      ? null
      : formatWithSigma(line.lorentzianFwhmNm, line.lorentzianFwhmSigmaNm);
  return (
    <dl className="line-numbers">
      <div>
        <dt>area</dt>
        <dd>
          <Quantity text={formatWithSigma(line.area, line.areaSigma)} />{' '}
          <span className="unit">
            <Quantity text={areaUnits[line.areaUnit]} />
          </span>
        </dd>
      </div>
      <div>
        <dt>
          <abbr title="Gaussian part of the width, full width at half maximum">width G</abbr>
        </dt>
        <dd>
          {formatSignificant(line.gaussianFwhmNm, 3)} <span className="unit">nm</span>
        </dd>
      </div>
      <div>
        <dt>
          <abbr title="Lorentzian part of the width, full width at half maximum">width L</abbr>
        </dt>
        <dd>
          {lorentzian === null ? '–' : <Quantity text={lorentzian} />} <span className="unit">nm</span>
        </dd>
      </div>
      <div>
        <dt>
          <abbr title="chi-square per degree of freedom">
            χ<sup>2</sup>/ν
          </abbr>
        </dt>
        <dd>
          {line.reducedChiSquare === null ? '–' : formatAtPlace(line.reducedChiSquare, -2)}
          {line.fitStatus !== 'converged' && <span className="line-status"> {line.fitStatus}</span>}
        </dd>
      </div>
    </dl>
  );
}
