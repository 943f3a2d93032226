import { Section } from '@/components/page/page';
import type { ServedBody } from '../api/record-queries';
import { pairsOf } from '../model/jitter-model';
import { productsOf } from '../model/two-tone-model';
import { IdleLines } from './lines/idle-lines';
import { PairsTable } from './lines/pairs-table';
import { ProductsTable } from './lines/products-table';

/** Lines that stand out of the noise and are no harmonics: hum and whistles, products, sideband pairs. */
export function ComponentsTable({ record }: { record: ServedBody }) {
  const { measure, channels } = record;
  if (measure === 'idle') {
    return (
      <Section title="Lines above the noise">
        <IdleLines channels={channels} />
      </Section>
    );
  }
  if (measure === 'two-tone') {
    return (
      <Section title="Products" sub="f1 the low tone, f2 the high one">
        <ProductsTable products={productsOf(record)} channels={channels.map(({ channel }) => channel)} />
      </Section>
    );
  }
  if (measure !== 'jitter') return null;
  return (
    <Section title="Pairs beside the tone" sub="lines of the stimulus itself left out">
      <PairsTable pairs={pairsOf(record)} />
    </Section>
  );
}
