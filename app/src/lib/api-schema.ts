import type { components, paths } from './api-types';

type Schemas = components['schemas'];

export type Session = Schemas['SessionDto'];
export type Person = Schemas['PersonDto'];
export type Role = Person['roles'][number];
export type Capture = Schemas['CaptureDto'];
export type CapturePage = Schemas['CaptureListDto'];
export type RecordSummary = Schemas['RecordSummaryDto'];
export type RecordDetail = Schemas['RecordDto'];
export type Verification = Schemas['VerificationDto'];
export type Overview = Schemas['OverviewDto'];
export type Unit = Schemas['UnitDto'];
export type UnitCondition = Unit['conditions'][number];
export type Rig = Schemas['RigDto'];
export type RigCalibration = Schemas['CalibrationDto'];
export type RigBaseline = Schemas['BaselineDto'];
export type Job = Schemas['JobDto'];
export type Today = Schemas['TodayDto'];
export type Invitation = Schemas['InvitationDto'];
export type AuditEntry = Schemas['AuditEntryDto'];

export type CaptureListQuery = NonNullable<paths['/api/captures']['get']['parameters']['query']>;
export type AnalyseRequest = Schemas['RequestRecordDto'];
export type CaptureFiling = Schemas['FileCaptureDto'];
