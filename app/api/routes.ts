import type { RouteTable } from '@/lib/web/openapi';
import * as assessmentsCircumstancesRoute from './assessments/[id]/circumstances/route';
import * as assessmentsCompleteRoute from './assessments/[id]/complete/route';
import * as assessmentsTrialRoute from './assessments/[id]/trials/[side]/[trial]/route';
import * as auditRoute from './audit/route';
import * as auditFileRoute from './audit/file/route';
import * as consentRoute from './consents/[id]/route';
import * as consentsCountersignRoute from './consents/[id]/countersign/route';
import * as consentsFileWhichRoute from './consents/[id]/file/[which]/route';
import * as consentsLinkRoute from './consents/[id]/link/route';
import * as consentsPaperRoute from './consents/[id]/paper/route';
import * as consentsPaperSignatureRoute from './consents/[id]/paper-signature/route';
import * as consentsPartsRoute from './consents/[id]/parts/route';
import * as consentsSignRoute from './consents/[id]/sign/route';
import * as correctionsRoute from './corrections/route';
import * as extractsRoute from './extracts/route';
import * as extractRoute from './extracts/[id]/route';
import * as extractsFileRoute from './extracts/[id]/files/[name]/route';
import * as extractsRetryRoute from './extracts/[id]/retry/route';
import * as extractsPreviewRoute from './extracts/preview/route';
import * as historyRoute from './history/route';
import * as participantsRoute from './participants/route';
import * as participantRoute from './participants/[code]/route';
import * as participantFactsRoute from './participants/[code]/facts/route';
import * as participantIdentityRoute from './participants/[code]/identity/route';
import * as peopleRoute from './people/route';
import * as joinRoute from './join/route';
import * as sessionHandOverRoute from './session/hand-over/route';
import * as sessionRoleRoute from './session/role/route';
import * as sessionTakeBackRoute from './session/take-back/route';
import * as queriesRoute from './queries/route';
import * as queriesAnswerRoute from './queries/[id]/answer/route';
import * as queriesAskAgainRoute from './queries/[id]/ask-again/route';
import * as queriesCancelRoute from './queries/[id]/cancel/route';
import * as queriesCloseOneRoute from './queries/[id]/close/route';
import * as queriesRemindRoute from './queries/[id]/remind/route';
import * as queriesCloseRoute from './queries/close/route';
import * as invitationsRoute from './invitations/route';
import * as resultsRoute from './results/route';
import * as screeningsRoute from './screenings/route';
import * as screeningRoute from './screenings/[id]/route';
import * as screeningsAnswersRoute from './screenings/[id]/answers/route';
import * as screeningsConfirmRoute from './screenings/[id]/confirm/route';
import * as screeningsConsentsRoute from './screenings/[id]/consents/route';
import * as screeningsEnrolRoute from './screenings/[id]/enrol/route';
import * as screeningsIdentityRoute from './screenings/[id]/identity/route';
import * as screeningsLeaveRoute from './screenings/[id]/leave/route';
import * as verificationsRoute from './verifications/route';
import * as visitsRoute from './visits/route';
import * as visitsAssessmentRoute from './visits/[id]/assessment/route';
import * as visitsBeginRoute from './visits/[id]/begin/route';
import * as visitsBookRoute from './visits/[id]/book/route';
import * as visitsCompleteRoute from './visits/[id]/complete/route';
import * as visitsMissRoute from './visits/[id]/miss/route';
import * as visitsUndoRoute from './visits/[id]/undo/route';
import * as armRoute from './arm/route';
import * as armCheckRoute from './arm/check/route';
import * as flagsRoute from './flags/route';
import * as flagsSeenRoute from './flags/[id]/seen/route';
import * as liftingRoute from './lifting/route';
import * as questionnairesRoute from './questionnaires/route';
import * as questionnaireRoute from './questionnaires/[id]/route';
import * as questionnairesSubmitRoute from './questionnaires/[id]/submit/route';
import * as symptomsRoute from './symptoms/route';
import * as symptomRoute from './symptoms/[id]/route';
import * as symptomsReadRoute from './symptoms/[id]/read/route';
import * as symptomsReviewRoute from './symptoms/[id]/review/route';
import * as todayRoute from './today/route';
import * as trainingRoute from './training/route';
import * as weekRoute from './week/route';

/** Every address of the API. tests/house.test.ts fails when a route.ts is missing here. */
export const routes: RouteTable = {
  '/api/assessments/{id}/circumstances': { PUT: assessmentsCircumstancesRoute.PUT },
  '/api/assessments/{id}/complete': { POST: assessmentsCompleteRoute.POST },
  '/api/assessments/{id}/trials/{side}/{trial}': { PUT: assessmentsTrialRoute.PUT },
  '/api/audit': { GET: auditRoute.GET },
  '/api/audit/file': { GET: auditFileRoute.GET },
  '/api/consents/{id}': { GET: consentRoute.GET },
  '/api/consents/{id}/countersign': { POST: consentsCountersignRoute.POST },
  '/api/consents/{id}/file/{which}': { GET: consentsFileWhichRoute.GET },
  '/api/consents/{id}/link': { POST: consentsLinkRoute.POST },
  '/api/consents/{id}/paper': { POST: consentsPaperRoute.POST },
  '/api/consents/{id}/paper-signature': { POST: consentsPaperSignatureRoute.POST },
  '/api/consents/{id}/parts': { POST: consentsPartsRoute.POST },
  '/api/consents/{id}/sign': { POST: consentsSignRoute.POST },
  '/api/corrections': { POST: correctionsRoute.POST },
  '/api/extracts': { GET: extractsRoute.GET, POST: extractsRoute.POST },
  '/api/extracts/preview': { GET: extractsPreviewRoute.GET },
  '/api/extracts/{id}': { GET: extractRoute.GET },
  '/api/extracts/{id}/files/{name}': { GET: extractsFileRoute.GET },
  '/api/extracts/{id}/retry': { POST: extractsRetryRoute.POST },
  '/api/history': { GET: historyRoute.GET },
  '/api/invitations': { POST: invitationsRoute.POST },
  '/api/join': { POST: joinRoute.POST },
  '/api/session/hand-over': { POST: sessionHandOverRoute.POST },
  '/api/session/role': { POST: sessionRoleRoute.POST },
  '/api/session/take-back': { POST: sessionTakeBackRoute.POST },
  '/api/participants': { GET: participantsRoute.GET },
  '/api/participants/{code}': { GET: participantRoute.GET },
  '/api/participants/{code}/facts': { POST: participantFactsRoute.POST },
  '/api/participants/{code}/identity': { POST: participantIdentityRoute.POST },
  '/api/people': { GET: peopleRoute.GET },
  '/api/queries': { GET: queriesRoute.GET, POST: queriesRoute.POST },
  '/api/queries/close': { POST: queriesCloseRoute.POST },
  '/api/queries/{id}/answer': { POST: queriesAnswerRoute.POST },
  '/api/queries/{id}/ask-again': { POST: queriesAskAgainRoute.POST },
  '/api/queries/{id}/cancel': { POST: queriesCancelRoute.POST },
  '/api/queries/{id}/close': { POST: queriesCloseOneRoute.POST },
  '/api/queries/{id}/remind': { POST: queriesRemindRoute.POST },
  '/api/results': { GET: resultsRoute.GET },
  '/api/screenings': { GET: screeningsRoute.GET, POST: screeningsRoute.POST },
  '/api/screenings/{id}': { GET: screeningRoute.GET },
  '/api/screenings/{id}/answers': { PUT: screeningsAnswersRoute.PUT },
  '/api/screenings/{id}/confirm': { POST: screeningsConfirmRoute.POST },
  '/api/screenings/{id}/consents': { POST: screeningsConsentsRoute.POST },
  '/api/screenings/{id}/enrol': { POST: screeningsEnrolRoute.POST },
  '/api/screenings/{id}/identity': { GET: screeningsIdentityRoute.GET, PUT: screeningsIdentityRoute.PUT },
  '/api/screenings/{id}/leave': { POST: screeningsLeaveRoute.POST },
  '/api/verifications': { POST: verificationsRoute.POST },
  '/api/visits': { POST: visitsRoute.POST },
  '/api/visits/{id}/assessment': { GET: visitsAssessmentRoute.GET, POST: visitsAssessmentRoute.POST },
  '/api/visits/{id}/begin': { POST: visitsBeginRoute.POST },
  '/api/visits/{id}/book': { POST: visitsBookRoute.POST },
  '/api/visits/{id}/complete': { POST: visitsCompleteRoute.POST },
  '/api/visits/{id}/miss': { POST: visitsMissRoute.POST },
  '/api/visits/{id}/undo': { POST: visitsUndoRoute.POST },
  '/api/arm': { GET: armRoute.GET },
  '/api/arm/check': { POST: armCheckRoute.POST },
  '/api/flags': { GET: flagsRoute.GET },
  '/api/flags/{id}/seen': { POST: flagsSeenRoute.POST },
  '/api/lifting': { GET: liftingRoute.GET },
  '/api/questionnaires': { GET: questionnairesRoute.GET },
  '/api/questionnaires/{id}': { GET: questionnaireRoute.GET, PUT: questionnaireRoute.PUT },
  '/api/questionnaires/{id}/submit': { POST: questionnairesSubmitRoute.POST },
  '/api/symptoms': { GET: symptomsRoute.GET, POST: symptomsRoute.POST },
  '/api/symptoms/{id}': { GET: symptomRoute.GET },
  '/api/symptoms/{id}/read': { POST: symptomsReadRoute.POST },
  '/api/symptoms/{id}/review': { POST: symptomsReviewRoute.POST },
  '/api/today': { GET: todayRoute.GET },
  '/api/training': { GET: trainingRoute.GET, POST: trainingRoute.POST },
  '/api/week': { GET: weekRoute.GET },
};
