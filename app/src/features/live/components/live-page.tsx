import { Button } from '@radix-ui/themes';
import { useMemo, useRef, useState, type ReactNode } from 'react';
import { Link, useBlocker } from 'react-router-dom';
import { ConfirmDialog } from '@/components/forms/confirm-dialog';
import { FilingSlots } from '@/components/filing/filing-slots';
import { KeyCap } from '@/components/key-cap';
import { TheLine } from '@/components/line/the-line';
import { Columns, Page, Section, WarningBlock } from '@/components/page/page';
import { PageHead } from '@/components/page/page-head';
import { Sentence, SlotSelect } from '@/components/sentence/slot';
import { unitName } from '@/lib/capture-words';
import { useFilingChoices } from '@/lib/use-filing-choices';
import type { Delivered } from '../audio/audio-rig';
import { LiveBenchProvider, useLive, useLiveBench } from '../hooks/live-bench-context';
import { useArchiveTakes } from '../hooks/use-archive-takes';
import { useFiling } from '../hooks/use-filing';
import { useLiveForm } from '../hooks/use-live-form';
import { useLiveKeys } from '../hooks/use-live-keys';
import { useRigPick } from '../hooks/use-rig-pick';
import { useRigUse } from '../hooks/use-rig-use';
import { lineStations } from '../model/line-stations';
import { isTake, type LiveForm } from '../model/live-form';
import { practiceDeviceOf, type PracticeFaults } from '../model/practice-faults';
import type { LocalTake } from '../model/take';
import { CautionDialog } from './caution-dialog';
import { LiveCharts } from './live-charts';
import { LiveFigures, LiveShows } from './live-figures';
import { LiveSentence } from './live-sentence';
import { NotesBlock } from './notes-block';
import { OutputBlock } from './output-block';
import { PracticeSentence } from './practice-sentence';
import { RigBlock } from './rig-block';
import { RigSetup } from './rig-setup';
import { TakeBand } from './take-band';
import { TakesBlock } from './takes-block';
import './live.css';

interface LivePageProps {
  /** The charts and tables of a take; another feature's, so that they are the archive's own. */
  renderTake: (take: LocalTake) => ReactNode;
}

/** Play, capture, look, take, keep: one person at one keyboard. */
export function LivePage({ renderTake }: LivePageProps) {
  return (
    <LiveBenchProvider>
      <LiveDesk renderTake={renderTake} />
    </LiveBenchProvider>
  );
}

function LiveDesk({ renderTake }: LivePageProps) {
  const bench = useLiveBench();
  const choices = useFilingChoices();
  const [filing, setFiling] = useFiling();
  const unit = choices.units.find(({ id }) => id === filing.unitId);
  const condition = unit?.conditions.find(({ id }) => id === filing.conditionId);
  const rigOnBooks = choices.rigs.find(({ id }) => id === filing.rigId);
  const [form, change] = useLiveForm(filing.rigId);
  const [setup, setSetup] = useRigPick(filing.rigId);
  const rig = useLive((state) => state.rig);
  const playing = useLive((state) => state.playing);
  const take = useLive((state) => state.take);
  const isHeld = useLive((state) => state.isHeld);
  const takes = useLive((state) => state.takes);
  const notice = useLive((state) => state.notice);
  const fault = useLive((state) => state.fault);
  const isPractice = useLive((state) => state.choice?.kind === 'practice');
  const sampleRateHz = useLive((state) => state.delivered?.outputRateHz ?? setup.pick.sampleRateHz);
  const { sendings, sent, keep } = useArchiveTakes();
  const [openId, setOpenId] = useState<string | null>(null);
  /** What waits for the caution to be confirmed. */
  const [pending, setPending] = useState<(() => void) | null>(null);
  /** The opened rig for which it was; another one asks again. */
  const [confirmedFor, setConfirmedFor] = useState<Delivered | null>(null);
  const delivered = useLive((state) => state.delivered);
  const noteRef = useRef<HTMLInputElement>(null);
  const { use, ranges, setRange, isUnread } = useRigUse(filing.rigId, sampleRateHz);
  const isOpen = rig === 'open';
  const description = [unit ? unitName(unit) : null, condition?.name, rigOnBooks?.name]
    .filter(Boolean)
    .join(', ');
  const orders = { form, filing, description };

  /** Sound leaves the computer only once the caution has been confirmed since the rig was opened. */
  const withCare = (act: () => void) => {
    if (isPractice || confirmedFor === delivered) act();
    else setPending(() => act);
  };
  const start = () => {
    // A rig whose limit can't be read may not play louder than it allows, and so not at all.
    if (!isOpen || take || (isUnread && !isPractice)) return;
    setOpenId(null);
    withCare(() => void (isTake(form) ? bench.runTake(orders) : bench.play(form)));
  };
  const stop = () => void bench.stop();
  const changeForm = (part: Partial<LiveForm>) => {
    const next = change(part);
    if (playing && isTake(next)) stop();
    else if (playing) void bench.play(next);
    else void bench.setLook(next);
  };
  const keepTone = () => {
    if (playing) {
      void bench.keepTone(orders).then((made) => {
        if (!made) return;
        setOpenId(made.id);
        keep(made);
      });
      return;
    }
    const [newest] = takes;
    if (newest && !newest.isKept) keep(newest);
  };
  useLiveKeys({
    onPlay: () => (playing ? stop() : start()),
    onStop: stop,
    onHold: () => bench.hold(!isHeld),
    onKeep: keepTone,
    onNote: () => noteRef.current?.focus(),
  });

  const opened = [...takes, ...sent].find(({ id }) => id === openId) ?? null;
  return (
    <Page>
      <PageHead
        title={
          unit
            ? `${unit.maker} ${unit.model}${unit.serialNumber ? `, no. ${unit.serialNumber}` : ''}`
            : 'Live'
        }
        titleAside={condition ? `${condition.name}, live` : unit ? 'live' : undefined}
        actions={
          <Button size="3" disabled={!playing && !takes.some(({ isKept }) => !isKept)} onClick={keepTone}>
            Keep this take <KeyCap>K</KeyCap>
          </Button>
        }
        line={
          <LiveLine
            form={form}
            unit={unit ? unitName(unit) : 'no unit named'}
            rigName={rigOnBooks?.name ?? ''}
          />
        }
      />
      <div className="bl-live-order">
        <div>
          <Sentence>
            On the bench: <FilingSlots {...choices} value={filing} onChange={setFiling} />
            {ranges.length > 0 && use.range !== null && (
              <>
                {', its input set to '}
                <SlotSelect
                  label="Input range"
                  value={use.range}
                  options={ranges.map((range) => ({ value: range, label: range }))}
                  onChange={setRange}
                />
              </>
            )}
            .
          </Sentence>
          {isOpen && <LiveSentence form={form} sampleRateHz={sampleRateHz} onChange={changeForm} />}
        </div>
        {isOpen && (
          <div className="bl-live-buttons">
            <Button
              size="3"
              variant="surface"
              color="gray"
              highContrast
              aria-pressed={isHeld}
              onClick={() => bench.hold(!isHeld)}
            >
              {isHeld ? 'Go on' : 'Hold'} <KeyCap>H</KeyCap>
            </Button>
            {playing ? (
              <Button size="3" color="gray" highContrast onClick={stop}>
                Stop the tone <KeyCap>Esc</KeyCap>
              </Button>
            ) : (
              <Button size="3" disabled={take !== null} onClick={start}>
                {isTake(form) ? 'Start the take' : 'Play'} <KeyCap>Space</KeyCap>
              </Button>
            )}
          </div>
        )}
      </div>
      <TakeBand onStop={stop} />
      <div role="status">{notice && <WarningBlock lead={notice} />}</div>
      {fault && (
        <div role="alert">
          <WarningBlock
            tone="fault"
            lead={fault.message}
            wayOut={<Link to="/archive">Upload a file instead</Link>}
          >
            {fault.remedy}
          </WarningBlock>
        </div>
      )}
      <Columns
        margin={
          <>
            {isOpen && (
              <>
                <LiveFigures use={use} />
                <LiveShows />
                <OutputBlock
                  levelDbfs={Math.min(form.levelDbfs, use.limitDbfs)}
                  use={use}
                  isPractice={isPractice}
                  onChange={(levelDbfs) => changeForm({ levelDbfs })}
                />
              </>
            )}
            <TakesBlock
              takes={takes}
              sent={sent}
              sendings={sendings}
              openId={openId}
              onOpen={setOpenId}
              onKeep={keep}
            />
            {isOpen && (
              <>
                <RigBlock use={use} onCheck={() => withCare(() => void bench.checkItself())} />
                <NotesBlock fieldRef={noteRef} />
              </>
            )}
          </>
        }
      >
        {opened ? (
          <OpenedTake take={opened} onClose={() => setOpenId(null)}>
            {renderTake(opened)}
          </OpenedTake>
        ) : isOpen ? (
          <LiveMain
            form={form}
            baselineRecordId={isPractice ? null : (use.baseline?.recordId ?? null)}
            conditions={description}
            practice={
              isPractice && (
                <PracticeSentence
                  faults={setup.faults}
                  onChange={(faults: PracticeFaults) => {
                    setSetup({ ...setup, faults });
                    bench.setDevice(practiceDeviceOf(faults));
                  }}
                />
              )
            }
          />
        ) : (
          <RigSetup
            pick={setup.pick}
            faults={setup.faults}
            onPick={(pick) => {
              setSetup({ ...setup, pick });
            }}
            onFaults={(faults) => setSetup({ ...setup, faults })}
          />
        )}
      </Columns>
      <LeaveGuard isTaking={take !== null} />
      <CautionDialog
        isOpen={pending !== null}
        levelDbfs={Math.min(form.levelDbfs, use.limitDbfs)}
        use={use}
        onOpenChange={(next) => !next && setPending(null)}
        onConfirm={() => {
          setConfirmedFor(delivered);
          pending?.();
        }}
      />
    </Page>
  );
}

/** Another page would end the take under way. */
function LeaveGuard({ isTaking }: { isTaking: boolean }) {
  const blocker = useBlocker(
    ({ currentLocation, nextLocation }) => isTaking && currentLocation.pathname !== nextLocation.pathname,
  );
  return (
    <ConfirmDialog
      isOpen={blocker.state === 'blocked'}
      onOpenChange={() => blocker.reset?.()}
      title="End the take and leave?"
      confirmLabel="End it and leave"
      cancelLabel="Stay"
      isDestructive
      onConfirm={() => blocker.proceed?.()}
    >
      A take is under way. Leaving the page ends every sound, and what was recorded of this take is lost.
    </ConfirmDialog>
  );
}

function LiveLine({ form, unit, rigName }: { form: LiveForm; unit: string; rigName: string }) {
  const input = useLive((state) => state.input);
  const playing = useLive((state) => state.playing);
  const rig = useLive((state) => state.rig);
  const take = useLive((state) => state.take);
  const takes = useLive((state) => state.takes);
  const isHeld = useLive((state) => state.isHeld);
  const bench = useLiveBench();
  const stations = useMemo(
    () => lineStations(bench.state(), form, unit, rigName),
    // The state is read whole; these are the parts of it that the line shows.
    // eslint-disable-next-line react-hooks/exhaustive-deps
    [bench, form, unit, rigName, input, playing, rig, take, takes, isHeld],
  );
  const back = stations[2];
  return <TheLine label="Where the sound is" stations={stations} now={back?.more} />;
}

function LiveMain({
  form,
  baselineRecordId,
  conditions,
  practice,
}: {
  form: LiveForm;
  baselineRecordId: string | null;
  conditions: string;
  practice: ReactNode;
}) {
  const bench = useLiveBench();
  const isKept = useLive((state) => state.reference !== null);
  const hasSpectrum = useLive((state) => state.spectrum !== null);
  return (
    <>
      <LiveCharts form={form} conditions={conditions} baselineRecordId={baselineRecordId} />
      <p className="bl-live-words">
        <button
          type="button"
          className="bl-word"
          disabled={!hasSpectrum}
          aria-pressed={isKept}
          onClick={() => bench.setReference(!isKept)}
        >
          {isKept ? 'Let the kept spectrum go' : 'Keep this spectrum beside the next'}
        </button>
      </p>
      {practice}
    </>
  );
}

function OpenedTake({
  take,
  onClose,
  children,
}: {
  take: LocalTake;
  onClose: () => void;
  children: ReactNode;
}) {
  return (
    <Section
      title={`Take: ${take.title}`}
      sub={take.statement.isPractice ? 'of the practice device' : undefined}
      tools={
        <button type="button" className="bl-word" onClick={onClose}>
          Back to the live picture
        </button>
      }
    >
      {take.record ? children : <p>It could not be measured: {take.failure}.</p>}
    </Section>
  );
}
