export { AuditPage as Component } from '@/features/people/components/audit-page';
