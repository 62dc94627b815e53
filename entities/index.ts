import { AccountSchema } from './account';
import { AppSessionSchema } from './app-session';
import { ConsentSchema } from './consent';
import { ConsentFormVersionSchema } from './consent-form-version';
import { ConsentSignatureSchema } from './consent-signature';
import { CredentialSchema } from './credential';
import { DataQuerySchema } from './data-query';
import { EligibilityAnswerSchema } from './eligibility-answer';
import { ExtractSchema } from './extract';
import { InvitationSchema } from './invitation';
import { LimbAssessmentSchema } from './limb-assessment';
import { LimbTrialSchema } from './limb-trial';
import { ParticipantSchema } from './participant';
import { ParticipantIdentitySchema } from './participant-identity';
import { ProtocolVersionSchema } from './protocol-version';
import { QueryMessageSchema } from './query-message';
import { QuestionnaireResponseSchema } from './questionnaire-response';
import { RoleGrantSchema } from './role-grant';
import { ScreeningSchema } from './screening';
import { SiteSchema } from './site';
import { StoredFileSchema } from './stored-file';
import { StudySchema } from './study';
import { SymptomReportSchema } from './symptom-report';
import { TrainingFlagSchema } from './training-flag';
import { TrainingSessionSchema } from './training-session';
import { TrainingSetSchema } from './training-set';
import { VerificationSchema } from './verification';
import { VisitSchema } from './visit';

/** Every entity, listed: nothing is discovered from folders. */
export const entities = [
  AccountSchema,
  AppSessionSchema,
  ConsentSchema,
  ConsentFormVersionSchema,
  ConsentSignatureSchema,
  CredentialSchema,
  DataQuerySchema,
  EligibilityAnswerSchema,
  ExtractSchema,
  InvitationSchema,
  LimbAssessmentSchema,
  LimbTrialSchema,
  ParticipantSchema,
  ParticipantIdentitySchema,
  ProtocolVersionSchema,
  QueryMessageSchema,
  QuestionnaireResponseSchema,
  RoleGrantSchema,
  ScreeningSchema,
  SiteSchema,
  StoredFileSchema,
  StudySchema,
  SymptomReportSchema,
  TrainingFlagSchema,
  TrainingSessionSchema,
  TrainingSetSchema,
  VerificationSchema,
  VisitSchema,
];
