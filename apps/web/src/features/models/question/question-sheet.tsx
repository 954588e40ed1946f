import type { SweepInput } from '@nightcone/contracts';
import { formatQuantity, type ModelDefinition, type Specification, titleOf } from '@nightcone/models';
import { type ClipboardEvent, useDeferredValue, useMemo, useState } from 'react';
import { useForm, useWatch } from 'react-hook-form';
import { useSearchParams } from 'react-router-dom';
import { TextField } from '../../../components/field.tsx';
import { SheetRow } from '../../../components/sheet.tsx';
import { formatClock } from '../../../lib/format-time.ts';
import { useSession } from '../../../lib/session.ts';
import { usePreview } from '../preview/use-preview.ts';
import { type CheckedForm, checkForm } from './check-form.ts';
import { FormGroups } from './form-groups.tsx';
import { type FormTexts, titleName } from './form-texts.ts';
import { HashedText } from './hashed-text.tsx';
import { OtherAxes } from './other-axes.tsx';
import { type PastedQuestion, readPasted } from './paste-dialog.tsx';
import { PreviewPane } from './preview-pane.tsx';
import { type QuestionForm, QuestionProvider } from './question-context.ts';
import { CostEntry, FinishEntry, HashEntry, ValidityEntry } from './question-margin.tsx';
import { notesByControl, questionNotes } from './question-notes.ts';
import { SubmitEntry } from './submit-entry.tsx';
import { sweepTitle } from './sweep-title.ts';
import { type DraftState, useDraft } from './use-draft.ts';
import { useEstimate } from './use-estimate.ts';
import { useJobHash } from './use-job-hash.ts';

/** The form in the sheet, the preview at its right, the evidence in the margin. */
export function QuestionSheet({
  model,
  first,
  untouched,
  onPaste,
}: {
  model: ModelDefinition;
  first: FormTexts;
  untouched: boolean;
  onPaste: (question: PastedQuestion) => void;
}) {
  const { kernel, group } = useSession();
  const { register, setValue, control, formState } = useForm<FormTexts>({ defaultValues: first });
  const texts = useWatch({ control }) as FormTexts;
  const checked = useMemo(() => checkForm(model, texts, kernel?.digest ?? null), [model, texts, kernel?.digest]);
  const [positions, setPositions] = useState<readonly number[]>([]);
  const { previewed, place, at } = usePreviewedPoint(checked, positions);
  const drawn = useDeferredValue(useLast(previewed));
  const preview = usePreview(model, kernel?.digest ?? null, drawn);
  const ownTitle = checked.swept.length > 0 ? sweepTitle(model, checked.swept) : titleOf(model, checked);
  const title = texts[titleName]?.trim() || ownTitle;
  const input = useSweepInput(checked, title);
  const estimate = useEstimate(input);
  const { hash, text } = useJobHash(kernel ? previewed : null);
  const jobs = checked.plan?.count ?? 1;
  const notes = useMemo(
    () => questionNotes(model, texts, previewed, estimate.current ? (estimate.estimate?.notes ?? null) : null, jobs),
    [model, texts, previewed, estimate.current, estimate.estimate, jobs],
  );
  const draft = useDraft(model.id, title, texts, untouched && !formState.isDirty, useSource());
  const [help, setHelp] = useState<{ title: string; help: string } | null>(null);
  const form: QuestionForm = {
    model,
    register,
    setText: (name, text) => setValue(name, text, { shouldDirty: true }),
    texts,
    checked,
    problems: useMemo(() => new Map(checked.problems.map(({ name, message }) => [name, message])), [checked]),
    notes: useMemo(() => notesByControl(notes), [notes]),
    positions: at,
    setPosition: (axis, position) => setPositions(at.map((each, i) => (i === axis ? position : each))),
    showHelp: setHelp,
  };
  const refused = notes.some(({ severity }) => severity === 'refuse')
    ? 'The program would refuse this question; see the validity notes.'
    : checked.problems.length > 0
      ? `${checked.problems.length === 1 ? 'One entry needs' : `${checked.problems.length} entries need`} mending first.`
      : estimate.current && estimate.estimate && !estimate.estimate.quota.fits
        ? 'This is more than the quota of the week has left.'
        : null;

  const onPasteText = (event: ClipboardEvent) => {
    const pasted = event.clipboardData.getData('text');
    if (!pasted.trim().startsWith('{')) return;
    const read = readPasted(pasted);
    if (!read.ok) return;
    event.preventDefault();
    onPaste(read.question);
  };

  return (
    <QuestionProvider value={form}>
      <SheetRow
        margin={
          <>
            <ValidityEntry notes={notes} whole={estimate.current} />
            <CostEntry state={estimate} />
            <FinishEntry state={estimate} />
            <HashEntry
              hash={hash}
              place={place}
              remark={hashRemark(jobs, estimate.current ? estimate.estimate : null)}
            />
            <SubmitEntry
              input={refused ? null : input}
              refused={refused}
              draftText={draftWords(draft, group.timeZone)}
            />
          </>
        }
      >
        <form
          noValidate
          onSubmit={(event) => event.preventDefault()}
          onPaste={onPasteText}
          className="@container"
          aria-label={`Question to ${model.title}`}
        >
          <div className="@4xl:grid @4xl:grid-cols-[minmax(0,31rem)_minmax(0,1fr)] gap-x-8">
            <div className="@4xl:order-2 @max-4xl:contents min-w-0">
              <div className="top-3 @4xl:sticky @max-4xl:contents">
                <PreviewPane model={model} preview={preview} incomplete={previewed === null} place={place} />
              </div>
            </div>
            <div className="min-w-0">
              <p className="min-h-15 text-ink2 text-small" aria-live="off">
                {help ? (
                  <>
                    <b>{help.title}.</b> {help.help}
                  </>
                ) : (
                  'Units may be typed: 0.5 meV, 20 nm. A range such as 2..14 / 25, or values such as 2, 4, 8, make a sweep.'
                )}
              </p>
              <FormGroups />
              <OtherAxes />
              <div className="py-2">
                <TextField
                  label="title"
                  help="For lists and mails; not hashed."
                  placeholder={ownTitle}
                  maxLength={200}
                  {...register(titleName)}
                />
              </div>
              <HashedText text={text} />
            </div>
          </div>
        </form>
      </SheetRow>
    </QuestionProvider>
  );
}

/** What the address says beside the model: a draft belongs to it. */
const useSource = () => useSearchParams()[0].toString();

/** The last value that was there: a form with an error keeps its drawing. */
function useLast<T>(value: T | null): T | null {
  const [last, setLast] = useState(value);
  if (value !== null && value !== last) setLast(value);
  return value ?? last;
}

/** The point of the sweep that is drawn and hashed: the place of each axis, the middle ones first. */
function usePreviewedPoint(checked: CheckedForm, positions: readonly number[]) {
  return useMemo(() => {
    const lengths = checked.axes.map((axis) => axis.range?.count ?? axis.values?.length ?? 1);
    const at = lengths.map((length, i) => Math.min(length - 1, positions[i] ?? Math.floor(length / 2)));
    if (!checked.plan) return { previewed: null, place: '', at };
    const index = lengths.reduce((sum, length, i) => sum * length + (at[i] as number), 0);
    const point = checked.plan.point(index);
    const place = checked.swept
      .map((control) => {
        const axis = checked.axes.findIndex(({ pointers }) => pointers.includes(control.pointer));
        const value = control.values[at[axis] ?? 0] ?? 0;
        const symbol = control.field.display?.symbol;
        const unit = 'unit' in control.field ? control.field.unit : '';
        return unit
          ? formatQuantity(value, unit)
          : `${symbol && /^[A-Za-z]$/.test(symbol) ? symbol : (control.field.display?.title ?? '')} = ${formatQuantity(value)}`;
      })
      .join(', ');
    return { previewed: point.ok ? (point.specification as Specification) : null, place, at };
  }, [checked, positions]);
}

function useSweepInput(checked: CheckedForm, title: string): SweepInput | null {
  return useMemo(() => {
    if (!checked.specification) return null;
    const { model, parameters, numerics } = checked.specification;
    return {
      title: title.slice(0, 200),
      specification: { schema: 'nightcone.job/1', model, parameters, numerics },
      axes: checked.axes,
      when: 'now',
    };
  }, [checked, title]);
}

function hashRemark(jobs: number, estimate: { alreadyComputed: number } | null): string {
  const known = estimate?.alreadyComputed ?? null;
  if (jobs > 1)
    return `one of ${jobs}; ${known === null ? 'looking which are known' : known === 0 ? 'none was computed before' : `${known} were computed before`}`;
  return known === null
    ? 'looking whether it is known'
    : known > 0
      ? 'computed before: the answer is there at once'
      : 'not computed before';
}

function draftWords({ hereAt, serverAt, refused }: DraftState, zone: string): string {
  if (hereAt === null) return 'What you type is kept as a draft.';
  const clock = (at: number) => formatClock(new Date(at), zone);
  if (serverAt !== null && !refused) return `Draft kept at ${clock(serverAt)}, here and on the server.`;
  return `Draft kept at ${clock(hereAt)} in this browser${refused ? '; the server did not take it' : ''}.`;
}
