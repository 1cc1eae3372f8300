import { z } from "zod";

// The content security policy refuses code made from text; told so, zod doesn't try.
z.config({ jitless: true });
