-- What somebody does in Neovim 0.7, headless: opens a model, reads what is said, hovers, completes, renames,
-- formats, takes a code action. Writes what came of it as JSON.
local node, program, folder, result = unpack(vim.split(vim.env.THRUM_TEST, "\n"))
local found = {}

local function finish()
  local file = assert(io.open(result, "w"))
  file:write(vim.json.encode(found))
  file:close()
  for _, client in pairs(vim.lsp.get_active_clients()) do
    client.stop()
  end
  found.ended = vim.wait(10000, function()
    return next(vim.lsp.get_active_clients()) == nil
  end, 20)
  vim.cmd("qa!")
end

local function text()
  return table.concat(vim.api.nvim_buf_get_lines(0, 0, -1, false), "\n") .. "\n"
end

-- Position of a piece of the text, `into` characters further, in UTF-16 units as the protocol counts.
local function at(piece, into)
  for i, line in ipairs(vim.api.nvim_buf_get_lines(0, 0, -1, false)) do
    local start = line:find(piece, 1, true)
    if start then
      local _, units = vim.str_utfindex(line, start - 1)
      return { line = i - 1, character = units + (into or 0) }
    end
  end
  error(piece .. " does not stand in the text")
end

local function ask(method, params)
  params.textDocument = vim.lsp.util.make_text_document_params()
  local answers = vim.lsp.buf_request_sync(0, method, params, 20000)
  for _, answer in pairs(answers or {}) do
    return answer.result
  end
end

local function diagnostics()
  local said = {}
  for _, each in ipairs(vim.diagnostic.get(0)) do
    local words = vim.api.nvim_buf_get_text(0, each.lnum, each.col, each.end_lnum, each.end_col, {})
    table.insert(said, { code = each.code, words = words[1], message = each.message })
  end
  return said
end

local function until_said(code, there)
  return vim.wait(30000, function()
    for _, each in ipairs(vim.diagnostic.get(0)) do
      if each.code == code then
        return there
      end
    end
    return not there
  end, 20)
end

local function work()
  local client = vim.lsp.start_client({
    name = "thrum",
    cmd = { node, program, "serve", "--stdio" },
    root_dir = folder,
    init_options = { settings = { units = { system = "inch" } } },
  })
  vim.cmd("edit " .. folder .. "/drum.thrum")
  vim.bo.filetype = "thrum"
  vim.lsp.buf_attach_client(0, client)

  found.pushed = until_said("weight-as-mass", true)
  found.diagnostics = diagnostics()

  local action = ask("textDocument/codeAction", {
    range = { start = at("lbf"), ["end"] = at("lbf", 3) },
    context = { diagnostics = {}, only = { "quickfix" } },
  })[1]
  found.action = action.title
  vim.lsp.util.apply_workspace_edit(action.edit, "utf-16")
  found.cured = until_said("weight-as-mass", false)
  found.judged = until_said("expectation-fails", true)
  found.after = diagnostics()

  local hover = ask("textDocument/hover", { position = at("drum = drum_mass", 1) })
  found.hover = hover.contents.value

  local list = ask("textDocument/completion", { position = at("N/mm", 3), context = { triggerKind = 1 } })
  local items = vim.lsp.util.text_document_completion_list_to_complete_items(list, "")
  found.completion = vim.tbl_map(function(item)
    return item.word
  end, items)

  local edit = ask("textDocument/rename", { position = at("drum_mass = 8", 2), newName = "load" })
  vim.lsp.util.apply_workspace_edit(edit, "utf-16")
  found.renamed = text()

  vim.lsp.buf.formatting_sync(nil, 20000)
  found.formatted = text()
end

local ok, message = xpcall(work, debug.traceback)
if not ok then
  found.failed = message
end
finish()
