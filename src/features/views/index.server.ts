export { exploreProps } from './explore.server';
export { addComment, addShare, endShare, listComments, listShares } from './sharing.server';
export { changeView, createView, deleteView, getView, listViews } from './views.server';
export { snapshotThroughView, viewFor, type SharedSnapshot } from './visible.server';
