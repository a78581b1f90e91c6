import { DarkRoomParts } from './DarkRoomParts';
import { FidelityParts } from './FidelityParts';
import { FormParts } from './FormParts';
import { ListParts } from './ListParts';
import { MoreParts } from './MoreParts';
import { MountParts } from './MountParts';
import { SignParts } from './SignParts';
import { SphereParts } from './SphereParts';
import { StateParts } from './StateParts';
import { TokenParts } from './TokenParts';
import { VersionParts } from './VersionParts';

/** For developers: every component in its states, by day on the left and in the dark room on the right. */
export default function PartsPage() {
  return (
    <div>
      <h1 className="sr-only">Parts: every component in its states</h1>
      <div className="grid grid-cols-[minmax(0,1fr)] desk:grid-cols-[minmax(0,1fr)_484px]">
        <div className="flex flex-col gap-5.5 px-5 py-7 sm:px-10">
          <MountParts />
          <VersionParts />
          <FidelityParts />
          <SignParts />
          <FormParts />
          <StateParts />
          <div className="mt-4">
            <TokenParts />
          </div>
        </div>
        <DarkRoomParts />
      </div>
      <MoreParts />
      <ListParts />
      <SphereParts />
    </div>
  );
}

/** What the router's lazy route takes. */
export { PartsPage as Component };
