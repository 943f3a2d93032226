import type { BodyView } from './body-view';
import { SpectrumView } from './spectrum-view';

/** A tone whose wave rises above its own samples, and the same where there is room for it. */
export function IntersampleView({ view }: { view: BodyView }) {
  return (
    <>
      <SpectrumView
        view={view}
        title="Over full scale"
        sub="samples at 0 dBFS, the wave between them at +3.01 dBTP"
        heightPx={340}
      />
      <SpectrumView
        view={view}
        name="spectrumLower"
        title="With room for it"
        sub="the same tone 6 dB lower"
        heightPx={340}
      />
    </>
  );
}
