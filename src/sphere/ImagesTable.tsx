import { type ImageWords, offInWords } from './image-words';
import { StateCell } from './StateCell';

/** Where the reference states of a unitary go and where they should. */
export function ImagesTable({ images }: { readonly images: readonly ImageWords[] }) {
  return (
    <table className="path-in-words">
      <caption>Where the plates take reference states. Distances are in degrees of the sphere.</caption>
      <thead>
        <tr>
          <th scope="col">state</th>
          <th scope="col">goes to</th>
          <th scope="col">wanted</th>
          <th scope="col">distance</th>
        </tr>
      </thead>
      <tbody>
        {images.map(({ label, reached, wanted, offDeg }, index) => (
          <tr key={index}>
            <th scope="row">{label}</th>
            <StateCell state={reached} />
            <td>{wanted.text}</td>
            <td>{offInWords(offDeg)}</td>
          </tr>
        ))}
      </tbody>
    </table>
  );
}
