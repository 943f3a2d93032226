export { UnitsPage as Component } from '@/features/units/components/units-page';
