export {
  caseOperations,
  DECISIONS,
  type CaseDetail,
  type CasesPreview,
  type CaseView,
  type Decision,
} from './cases';
