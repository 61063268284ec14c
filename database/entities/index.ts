import { Account } from './account.entity.ts';
import { Acknowledgement } from './acknowledgement.entity.ts';
import { AnalysisRecord } from './analysis-record.entity.ts';
import { AppliedRow } from './applied-row.entity.ts';
import { Arm } from './arm.entity.ts';
import { AuditChain } from './audit-chain.entity.ts';
import { AuditEntry } from './audit-entry.entity.ts';
import { CheckOpening } from './check-opening.entity.ts';
import { Cut } from './cut.entity.ts';
import { CutChunk } from './cut-chunk.entity.ts';
import { Idempotency } from './idempotency.entity.ts';
import { Import } from './import.entity.ts';
import { ImportImplausible } from './import-implausible.entity.ts';
import { ImportRefusal } from './import-refusal.entity.ts';
import { Job } from './job.entity.ts';
import { Letter } from './letter.entity.ts';
import { Measure } from './measure.entity.ts';
import { Membership } from './membership.entity.ts';
import { MembershipSite } from './membership-site.entity.ts';
import { OpenArm } from './open-arm.entity.ts';
import { PlannedVisit } from './planned-visit.entity.ts';
import { RateCounter } from './rate-counter.entity.ts';
import { Reading } from './reading.entity.ts';
import { ReadingRevision } from './reading-revision.entity.ts';
import { RefreshToken } from './refresh-token.entity.ts';
import { Session } from './session.entity.ts';
import { Signature } from './signature.entity.ts';
import { Site } from './site.entity.ts';
import { Specification } from './specification.entity.ts';
import { Study } from './study.entity.ts';
import { Subject } from './subject.entity.ts';
import { Visit } from './visit.entity.ts';

export type { ImportState } from './import.entity.ts';
export type { JobState } from './job.entity.ts';
export type { MeasureChoice, MeasureNature } from './measure.entity.ts';
export { STUDY_ROLES, type StudyRole } from './membership.entity.ts';
export { NOT_DONE_REASONS, type NotDoneReason } from './reading.entity.ts';
export { CORRECTION_REASONS, type CorrectionReason } from './reading-revision.entity.ts';
export type { StudyState } from './study.entity.ts';
export { SUBJECT_STATES, type SubjectState } from './subject.entity.ts';
export {
  CONTACT_MODES,
  type ContactMode,
  type DatePrecision,
  MISSED_REASONS,
  type MissedReason,
} from './visit.entity.ts';
export {
  Account,
  Acknowledgement,
  AnalysisRecord,
  AppliedRow,
  Arm,
  AuditChain,
  AuditEntry,
  CheckOpening,
  Cut,
  CutChunk,
  Idempotency,
  Import,
  ImportImplausible,
  ImportRefusal,
  Job,
  Letter,
  Measure,
  Membership,
  MembershipSite,
  OpenArm,
  PlannedVisit,
  RateCounter,
  Reading,
  ReadingRevision,
  RefreshToken,
  Session,
  Signature,
  Site,
  Specification,
  Study,
  Subject,
  Visit,
};

/** Every entity outside `sealed`; each data source lists these. */
export const recordEntities = [
  Account,
  Acknowledgement,
  AnalysisRecord,
  AppliedRow,
  Arm,
  AuditChain,
  AuditEntry,
  CheckOpening,
  Cut,
  CutChunk,
  Idempotency,
  Import,
  ImportImplausible,
  ImportRefusal,
  Job,
  Letter,
  Measure,
  Membership,
  MembershipSite,
  OpenArm,
  PlannedVisit,
  RateCounter,
  Reading,
  ReadingRevision,
  RefreshToken,
  Session,
  Signature,
  Site,
  Specification,
  Study,
  Subject,
  Visit,
];
