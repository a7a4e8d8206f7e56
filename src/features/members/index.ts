export { memberOperations, type MemberRow, type MembersPage, type MembersQuery } from './members';
