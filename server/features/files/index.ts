export { fileColumns, fileRow, findFile, insertFile, mapFile, readBytes } from './file-store';
export { fileRoutes } from './routes';
