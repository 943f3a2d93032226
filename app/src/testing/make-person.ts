import type { Person } from '@/lib/api-schema';

export function makePerson(change: Partial<Person> = {}): Person {
  return {
    id: 'p1',
    displayName: 'Ilse Varga',
    email: 'ilse@lantern-yard.example',
    roles: ['technician'],
    isDisabled: false,
    createdAt: '2026-11-01T08:00:00.000Z',
    lastSeenAt: null,
    ...change,
  };
}
