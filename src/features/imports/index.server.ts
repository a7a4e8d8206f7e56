export { importEnded, importJob } from './job.server';
export { makeImport } from './make.server';
export {
  acceptImport,
  discardImport,
  importFor,
  listImports,
  presentImport,
  problemPage,
  problemsCsv,
} from './read.server';
export { receiveUpload, type Upload } from './upload.server';
export { importLimits } from './limits.server';
export { changeRecipe, createRecipe, deleteRecipe, listRecipes } from './recipes.server';
