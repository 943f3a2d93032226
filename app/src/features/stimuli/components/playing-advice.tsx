import { MarginBlock, WarningBlock } from '@/components/page/page';

/** Before anything is played: what a test signal can harm. */
export function LevelCaution() {
  return (
    <MarginBlock title="Before you play it">
      <WarningBlock lead="Disconnect what can be hurt.">
        A test tone at full scale can destroy tweeters and hearing within a second. Take loudspeakers and
        headphones off the unit, start with its volume down, and go up while you watch the recorder. An
        amplifier is measured into a load that can take its power, through a divider; ask somebody qualified
        where mains or high voltages are within reach.
      </WarningBlock>
    </MarginBlock>
  );
}

/** Where a file can be played, and what to mind there. */
export function PlayingAdvice({ isExact }: { isExact: boolean }) {
  return (
    <MarginBlock title="Where to play it">
      <dl className="bl-stimulus-advice">
        <dt>From a stick or a network player</dt>
        <dd>
          Volume fixed or at its highest, equaliser, crossfade and levelling off. Choose the rate that the
          player passes on as it is: a player that resamples is measured with its resampler.
        </dd>
        <dt>From a disc</dt>
        <dd>44.1 kHz and 16 bits. Burn it as one track, so that nothing is cut between the parts.</dd>
        <dt>From a computer</dt>
        <dd>
          Set the output to the file’s own rate and every volume on the way to full; give the player the
          output for itself where it can have it. A browser resamples to the system’s rate and may dither:
          good for a first listen, not for a record.
        </dd>
        <dt>At the recorder</dt>
        <dd>
          Leave 4 dB of headroom above full scale: waves between the samples go higher than the samples. Start
          it before the first sound and stop it after the last; its rate may be another than the file’s.
        </dd>
      </dl>
      {isExact && (
        <WarningBlock lead="Bit for bit.">
          The jitter test holds a pattern that must reach the converter unchanged: no volume control, no
          resampling, no dither on the way.
        </WarningBlock>
      )}
    </MarginBlock>
  );
}
