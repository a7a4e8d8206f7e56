export {
  memberOperations,
  type MemberDetail,
  type MemberRow,
  type Handles,
  type MembersPage,
  type MembersQuery,
} from './members';
