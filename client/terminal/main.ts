#!/usr/bin/env node
import { version } from "../../package.json";

console.log(`thrum ${version}`);
