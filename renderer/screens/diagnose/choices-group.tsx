import type { Diagnosis } from '../../../shared-core/diagnosis/diagnosis.ts';
import type { ChoicesMade } from '../../state/inputs.ts';

export interface ChoicesGroupProps {
  readonly diagnosis: Diagnosis;
  readonly onChoose: (choices: ChoicesMade) => void;
}

/** The few choices in judging the populations: stated, never silent, each one step of the undo history. */
export function ChoicesGroup({ diagnosis, onChoose }: ChoicesGroupProps) {
  const { widening, selfAbsorption, levels } = diagnosis.options;
  return (
    <fieldset className="choices">
      <legend>How to judge the populations</legend>
      <Choice
        label="Widen the interval by the Birge ratio when the points scatter more than they should"
        isOn={widening === 'birge'}
        onToggle={(isOn) => onChoose({ widening: isOn ? 'birge' : 'none' })}
      />
      <Choice
        label="Correct the temperature for self-absorption where it is found"
        isOn={selfAbsorption === 'correct'}
        onToggle={(isOn) => onChoose({ selfAbsorption: isOn ? 'correct' : 'report' })}
      />
      <Choice
        label="Use only levels in equilibrium with the electrons, where the density shows which"
        isOn={levels === 'equilibrated'}
        onToggle={(isOn) => onChoose({ levels: isOn ? 'equilibrated' : 'all' })}
      />
    </fieldset>
  );
}

interface ChoiceProps {
  readonly label: string;
  readonly isOn: boolean;
  readonly onToggle: (isOn: boolean) => void;
}

function Choice({ label, isOn, onToggle }: ChoiceProps) {
  return (
    <label>
      <input type="checkbox" checked={isOn} onChange={(event) => onToggle(event.target.checked)} />
      {label}
    </label>
  );
}
