export { fileColumns, fileRow, findFile, mapFile, readBytes } from './file-store';
export { fileRoutes } from './routes';
