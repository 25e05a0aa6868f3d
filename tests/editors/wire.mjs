// The built server over real pipes, driven by a client library that is not ours: after 500 random edits in part, the findings are
// those of a fresh server that opens the final text; then every other request is asked once.
//
//     npm ci && node wire.mjs [PROGRAM]

import { spawn } from "node:child_process";
import { readFileSync } from "node:fs";
import { fileURLToPath } from "node:url";
import assert from "node:assert/strict";
import protocol from "vscode-languageserver-protocol/node.js";

const { createProtocolConnection, StreamMessageReader, StreamMessageWriter } = protocol;
const root = fileURLToPath(new URL("../..", import.meta.url));
const program = process.argv[2] ?? `${root}target/release/firstpole`;
const uri = "file:///nowhere/bay.cbspec";
const edits = 500;

const capabilities = {
    textDocument: {
        publishDiagnostics: { relatedInformation: true, dataSupport: true, tagSupport: { valueSet: [1, 2] } },
        hover: { contentFormat: ["markdown"] },
        completion: { completionItem: { snippetSupport: true, documentationFormat: ["markdown"] } },
        codeAction: { codeActionLiteralSupport: { codeActionKind: { valueSet: ["quickfix", "refactor"] } } },
        documentSymbol: { hierarchicalDocumentSymbolSupport: true },
    },
};

async function start() {
    const server = spawn(program, ["serve"], { stdio: ["pipe", "pipe", "inherit"] });
    const connection = createProtocolConnection(
        new StreamMessageReader(server.stdout),
        new StreamMessageWriter(server.stdin),
    );
    const told = new Map();
    let rung = () => {};
    connection.onNotification("textDocument/publishDiagnostics", (params) => {
        told.set(params.version, params.diagnostics);
        rung();
    });
    connection.listen();
    const answer = await connection.sendRequest("initialize", { processId: process.pid, rootUri: null, capabilities });
    await connection.sendNotification("initialized", {});
    return {
        connection,
        offers: answer.capabilities,
        open: (text) =>
            connection.sendNotification("textDocument/didOpen", {
                textDocument: { uri, languageId: "cbspec", version: 1, text },
            }),
        change: (version, contentChanges) =>
            connection.sendNotification("textDocument/didChange", { textDocument: { uri, version }, contentChanges }),
        async findings(version) {
            while (!told.has(version)) {
                await new Promise((ring, fail) => {
                    rung = ring;
                    setTimeout(() => fail(new Error(`no findings of version ${version}`)), 20_000).unref();
                });
            }
            return told.get(version);
        },
        async leave() {
            const ended = new Promise((end) => server.on("exit", end));
            await connection.sendRequest("shutdown");
            await connection.sendNotification("exit");
            assert.equal(await ended, 0, "the server ends with 0 after an orderly leave");
        },
    };
}

// The same sequence on every run.
let state = 20261201;
const chance = (below) => {
    state = (Math.imul(state, 1664525) + 1013904223) >>> 0;
    return Math.floor((state / 2 ** 32) * below);
};

const pieces = ["", "\n", "1", ":", "#", " kV", "site X\n", "    altitude: 900 m\n", "µ", "😀", "\r\n", "breaker B on Ring132\n", "\""];

const position = (text, offset) => {
    const before = text.slice(0, offset).split(/\r\n|\r|\n/);
    return { line: before.length - 1, character: before.at(-1).length };
};

/// Not within a surrogate pair, nor between CR and LF, where a position means something else.
const border = (text, offset) => {
    const unit = text.charCodeAt(offset);
    const inside = (unit >= 0xdc00 && unit < 0xe000) || (text[offset] === "\n" && text[offset - 1] === "\r");
    return inside ? offset - 1 : offset;
};

async function main() {
    let text = readFileSync(`${root}tests/specifications/line-bay-145kV.cbspec`, "utf8");
    const edited = await start();
    await edited.open(text);
    for (let version = 2; version <= edits + 1; version++) {
        const from = border(text, chance(text.length + 1));
        const to = border(text, Math.min(text.length, from + (chance(3) === 0 ? chance(30) : 0)));
        const put = pieces[chance(pieces.length)];
        const range = { start: position(text, from), end: position(text, Math.max(from, to)) };
        await edited.change(version, [{ range, text: put }]);
        text = text.slice(0, from) + put + text.slice(Math.max(from, to));
    }
    const fresh = await start();
    await fresh.open(text);
    const wanted = await fresh.findings(1);
    assert.ok(wanted.length > 5, "the text has findings");
    assert.deepEqual(await edited.findings(edits + 1), wanted);
    await edited.leave();

    const document = { textDocument: { uri } };
    const at = { ...document, position: { line: 20, character: 10 } };
    const range = { start: { line: 0, character: 0 }, end: { line: 30, character: 0 } };
    const options = { tabSize: 4, insertSpaces: true };
    const requests = {
        hover: at,
        completion: at,
        definition: at,
        references: { ...at, context: { includeDeclaration: true } },
        documentHighlight: at,
        documentSymbol: document,
        codeAction: { ...document, range, context: { diagnostics: [] } },
        codeLens: document,
        documentLink: document,
        formatting: { ...document, options },
        rangeFormatting: { ...document, range, options },
        foldingRange: document,
        selectionRange: { ...document, positions: [at.position] },
        inlayHint: { ...document, range },
        "semanticTokens/full": document,
        "semanticTokens/range": { ...document, range },
    };
    for (const [name, params] of Object.entries(requests)) {
        await fresh.connection.sendRequest(`textDocument/${name}`, params);
    }
    const symbols = await fresh.connection.sendRequest("workspace/symbol", { query: "" });
    assert.ok(symbols.length > 0);
    await assert.rejects(fresh.connection.sendRequest("textDocument/unheardOf", {}), { code: -32601 });
    await fresh.leave();
    console.log(`2 passed, 0 failed (${edits} edits, ${wanted.length} findings, ${Object.keys(requests).length} kinds of requests)`);
}

main().then(
    () => process.exit(0),
    (fault) => {
        console.error(fault);
        console.log("0 passed, 1 failed");
        process.exit(1);
    },
);
