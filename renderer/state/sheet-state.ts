import type { AnalysisOptions } from '../../shared-core/diagnosis/analysis-options.ts';
import type { DiagnosedRecording } from '../../shared-core/pipeline/diagnose-files.ts';
import type { Diagnosis } from '../../shared-core/diagnosis/diagnosis.ts';
import type { Problem, Result } from '../../shared-core/result/result.ts';
import type { InputFile } from '../../shared-core/result/input-file.ts';
import { type ChoicesMade, type Inputs, noInputs, type Role, type Slots, type SlotRole } from './inputs.ts';

export type Outcome = Result<DiagnosedRecording>;

/** One step of the history: what the inputs were, and what the step after it did, in words. */
export interface Step {
  readonly inputs: Inputs;
  readonly label: string;
}

/** A line at the top of the sheet that stays until it is dismissed. */
export interface Notice {
  readonly id: number;
  readonly kind: 'problem' | 'news';
  readonly text: string;
}

/** A diagnosis that was reopened and is still to be compared with what it says now. */
export interface Reopened {
  readonly recordingId: string;
  readonly fileName: string;
  readonly diagnosis: Diagnosis;
}

export interface SheetState {
  readonly past: readonly Step[];
  readonly inputs: Inputs;
  readonly future: readonly Step[];
  readonly outcomes: ReadonlyMap<string, Outcome>;
  /** Key of the last outcome that stands, by recording id: what stays on screen while another is computed. */
  readonly lastGood: Readonly<Record<string, string>>;
  /** The first of these to succeed is shown. */
  readonly toShow: readonly string[];
  /** A dark, response or bench that was just put in: taken back when the outcome under this key fails. */
  readonly onTrial: { readonly key: string; readonly role: SlotRole; readonly fileName: string } | null;
  readonly reopened: Reopened | null;
  readonly isStopped: boolean;
  readonly notices: readonly Notice[];
  /** What was just done, for the status line. */
  readonly lastDone: string;
  readonly nextId: number;
}

export const firstState: SheetState = Object.freeze({
  past: [],
  inputs: noInputs,
  future: [],
  outcomes: new Map<string, Outcome>(),
  lastGood: {},
  toShow: [],
  onTrial: null,
  reopened: null,
  isStopped: false,
  notices: [],
  lastDone: '',
  nextId: 1,
});

export type SheetAction =
  | { readonly type: 'demo-opened'; readonly recording: InputFile; readonly slots: Slots }
  | { readonly type: 'files-added'; readonly files: readonly { file: InputFile; role: Role }[] }
  | {
      readonly type: 'saved-opened';
      readonly fileName: string;
      readonly recording: InputFile;
      readonly slots: Slots;
      readonly options: AnalysisOptions;
      readonly diagnosis: Diagnosis;
    }
  | { readonly type: 'selected'; readonly recordingId: string }
  | { readonly type: 'recording-removed'; readonly recordingId: string }
  | { readonly type: 'slot-removed'; readonly setId: string; readonly role: SlotRole }
  | { readonly type: 'recording-reassigned'; readonly recordingId: string; readonly role: SlotRole }
  | { readonly type: 'slot-reassigned'; readonly setId: string; readonly from: SlotRole; readonly role: Role }
  | { readonly type: 'choice-made'; readonly recordingId: string; readonly choices: ChoicesMade }
  | { readonly type: 'line-switched'; readonly recordingId: string; readonly lineId: string }
  | { readonly type: 'computed'; readonly key: string; readonly outcome: Outcome }
  | { readonly type: 'undo' }
  | { readonly type: 'redo' }
  | { readonly type: 'stopped' }
  | { readonly type: 'resumed' }
  | { readonly type: 'problem-met'; readonly problem: Problem }
  | { readonly type: 'said'; readonly text: string }
  | { readonly type: 'notice-dismissed'; readonly id: number };
