export {
  memberOperations,
  type MemberRow,
  type Handles,
  type MembersPage,
  type MembersQuery,
} from './members';
