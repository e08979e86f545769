import { type Dispatch, useMemo } from 'react';
import type { Diagnosis } from '../../../shared-core/diagnosis/diagnosis.ts';
import type { PopulationFigure, PopulationPoint } from '../../../shared-core/diagnosis/figures.ts';
import { formatAtPlace, formatPercent, formatWithSigma } from '../../../shared-core/text/format-number.ts';
import { ChartCanvas } from '../../charts/chart-canvas.tsx';
import { populationConfig } from '../../charts/population-config.ts';
import { copyText } from '../../client/copy-text.ts';
import type { SheetAction } from '../../state/sheet-state.ts';
import { lineLabel } from '../../../shared-core/report/line-label.ts';
import { Prose } from '../../ui/prose.tsx';
import { Section } from '../../ui/section.tsx';
import { usePalette } from '../../ui/theme.ts';
import { populationTable } from './population-table.ts';

export interface PopulationsSectionProps {
  readonly figure: PopulationFigure;
  readonly diagnosis: Diagnosis;
  readonly dispatch: Dispatch<SheetAction>;
}

/** The straight line that is the temperature, and the numbers it goes through. */
export function PopulationsSection({ figure, diagnosis, dispatch }: PopulationsSectionProps) {
  const palette = usePalette();
  const config = useMemo(() => populationConfig(figure, palette), [figure, palette]);
  const copy = async (): Promise<void> => {
    const isCopied = await copyText(populationTable(figure));
    dispatch({
      type: 'said',
      text: isCopied
        ? 'Copied the table of populations'
        : 'The system did not allow copying; select the table instead',
    });
  };
  const { temperature } = diagnosis;
  return (
    <Section title="Populations" className="populations" summary={fitSummary(temperature)}>
      <div className="side-by-side">
        <figure>
          <div className="population-chart">
            <ChartCanvas
              config={config}
              label="Logarithm of the level populations against the energy of the upper level, with the straight line and its band; the table beside it holds the numbers"
            />
          </div>
          <figcaption className="fine-print">
            Points with standard uncertainties; the line is the temperature, the band its{' '}
            {formatPercent(temperature.coverage)} range. Hollow: left out. Arrow: upper limit.
          </figcaption>
        </figure>
        <div>
          <table className="numbers">
            <caption className="out-of-sight">Populations of the upper levels</caption>
            <thead>
              <tr>
                <th scope="col">line</th>
                <th scope="col">level</th>
                <th scope="col">energy, eV</th>
                <th scope="col">ln(pop. ∕ weight)</th>
                <th scope="col">use</th>
              </tr>
            </thead>
            <tbody>
              {figure.points.map((point) => (
                <tr key={point.lineId} className={point.used ? '' : 'is-off'}>
                  <th scope="row">{lineLabel(point.lineId)}</th>
                  <td>{point.upperLevel}</td>
                  <td>{formatAtPlace(point.upperEnergyEv, -4)}</td>
                  <td>{populationText(point)}</td>
                  <td>{wordOfUse(point)}</td>
                </tr>
              ))}
            </tbody>
          </table>
          <button type="button" onClick={() => void copy()}>
            Copy table
          </button>
          <p>
            <Prose text={temperature.text} />
          </p>
          <p>
            <Prose text={diagnosis.electronDensity.text} />
          </p>
          <p>
            <Prose text={diagnosis.meaning.text} />
          </p>
        </div>
      </div>
    </Section>
  );
}

function fitSummary({ chiSquare, degreesOfFreedom }: Diagnosis['temperature']): string {
  if (chiSquare === null || degreesOfFreedom === null) return '';
  return `χ² ${formatAtPlace(chiSquare, -2)} on ${String(degreesOfFreedom)} degrees of freedom`;
}

function populationText(point: PopulationPoint): string {
  if (point.lnPopulation === null) return '–';
  if (point.isUpperLimit) return `< ${formatAtPlace(point.lnPopulation, -2)}`;
  return formatWithSigma(point.lnPopulation, point.lnPopulationSigma);
}

const wordOfUse = (point: PopulationPoint): string =>
  point.isUpperLimit ? 'limit' : point.used ? 'used' : 'left out';
