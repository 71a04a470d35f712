/** Version of the library, from package.json, so that it stands in one place only. */
import { version } from "../../package.json";

/** Version that reports name as the origin of their numbers. */
export const libraryVersion: string = version;
