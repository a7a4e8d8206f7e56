export { importEnded, importJob } from './job.server';
export { makeImport } from './make.server';
export {
  acceptImport,
  discardImport,
  importFor,
  listImports,
  presentImport,
  problemsCsv,
} from './read.server';
export { receiveUpload, type Upload } from './upload.server';
