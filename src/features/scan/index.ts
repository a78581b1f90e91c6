export { ScanFigure } from './ScanFigure';
