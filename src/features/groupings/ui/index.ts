export { GroupingApp, type GroupingProps } from './GroupingApp';
export { GroupsApp, type GroupsProps } from './GroupsApp';
