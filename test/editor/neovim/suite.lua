-- What Neovim's own client does with the server, as a user's configuration starts it.
local passed, failed = 0, 0

local function test(name, run)
  local ok, why = pcall(run)
  if ok then
    passed = passed + 1
    io.write("  ok    " .. name .. "\n")
  else
    failed = failed + 1
    io.write("  FAIL  " .. name .. "\n        " .. tostring(why) .. "\n")
  end
end

-- Waits for what comes in its own time.
local function eventually(what, check)
  local seen
  local ok = vim.wait(20000, function()
    seen = check()
    return seen and true or false
  end, 50)
  assert(ok, "waited for " .. what)
  return seen
end

local client
vim.cmd("set hidden")

-- The README's own set-up for this version.
dofile(os.getenv("PLUMBLINE_SETUP"))

local function open(name)
  -- What is open already keeps what was typed into it.
  vim.cmd((vim.fn.bufexists(name) == 1 and "buffer " or "edit ") .. name)
  if name:match("%.md$") then
    vim.bo.filetype = "markdown"
  end
  eventually("the server", function()
    for id, one in pairs(vim.lsp.buf_get_clients(0)) do
      client = id
      return one.initialized
    end
  end)
  return vim.api.nvim_get_current_buf()
end

local function codes(buffer)
  local found = {}
  for _, one in ipairs(vim.diagnostic.get(buffer)) do
    table.insert(found, one.code or (one.user_data and one.user_data.lsp and one.user_data.lsp.code) or "?")
  end
  table.sort(found)
  return found
end

local function holds(list, wanted)
  for _, one in ipairs(list) do
    if one == wanted then
      return true
    end
  end
  return false
end

-- Puts the cursor on a text, some characters into it.
local function place(buffer, text, into)
  for i, line in ipairs(vim.api.nvim_buf_get_lines(buffer, 0, -1, false)) do
    local at = line:find(text, 1, true)
    if at then
      vim.api.nvim_win_set_cursor(0, { i, at - 1 + (into or 0) })
      return i - 1, at - 1
    end
  end
  error(text .. " does not stand in the note")
end

local function request(buffer, method, params)
  local answers, problem = vim.lsp.buf_request_sync(buffer, method, params, 20000)
  assert(answers, problem or (method .. " was not answered"))
  local answer = answers[client]
  assert(answer and not answer.error, vim.inspect(answer))
  return answer.result
end

test("the findings of a note are pushed", function()
  local buffer = open("winter-shuttle.plumb")
  eventually("bank-over-limit", function()
    return holds(codes(buffer), "bank-over-limit")
  end)
  assert(holds(codes(buffer), "claim-stale"), table.concat(codes(buffer), ", "))
end)

test("a hover shows the result and how it came about", function()
  local buffer = open("winter-shuttle.plumb")
  place(buffer, "bank 32", 6)
  local hover = request(buffer, "textDocument/hover", vim.lsp.util.make_position_params())
  assert(hover.contents.value:find("warning%-bank %d+°"), hover.contents.value)
end)

test("completion offers the card's configurations", function()
  local buffer = open("winter-shuttle.plumb")
  place(buffer, "config flaps-5", 7)
  local items = request(buffer, "textDocument/completion", vim.lsp.util.make_position_params())
  local labels = {}
  for _, item in ipairs(items.items or items) do
    table.insert(labels, item.label)
  end
  assert(holds(labels, "flaps-30"), table.concat(labels, ", "))
end)

test("the definition of an aeroplane is its card in another file", function()
  local buffer = open("winter-shuttle.plumb")
  place(buffer, "fly brambling-37", 6)
  local found = request(buffer, "textDocument/definition", vim.lsp.util.make_position_params())
  local location = found.uri and found or found[1]
  assert(location.uri:find("aeroplanes.plumb", 1, true), vim.inspect(found))
end)

test("a code action mends a stale claim, and the finding goes", function()
  local buffer = open("winter-shuttle.plumb")
  local line = place(buffer, "claim stall 132 kt")
  local params = vim.lsp.util.make_range_params()
  params.context = { diagnostics = {} }
  local fix
  for _, action in ipairs(request(buffer, "textDocument/codeAction", params)) do
    if action.title:match("^Write %d+ kt$") then
      fix = action
    end
  end
  assert(fix, "no fix is offered")
  vim.lsp.util.apply_workspace_edit(fix.edit, "utf-16")
  local text = vim.api.nvim_buf_get_lines(buffer, line, line + 1, false)[1]
  assert(not text:find("claim stall 132", 1, true), text)
  eventually("the finding to go", function()
    return not holds(codes(buffer), "claim-stale")
  end)
end)

test("what is typed is checked, also behind letters of many bytes", function()
  local buffer = open("winter-shuttle.plumb")
  local last = vim.api.nvim_buf_line_count(buffer)
  vim.api.nvim_buf_set_lines(buffer, last, last, false, { "", "| phase hold \"Größe 🛩 漢\"; weight 5" })
  local found = eventually("missing-unit", function()
    for _, one in ipairs(vim.diagnostic.get(buffer)) do
      if one.message:find("5 of what?", 1, true) then
        return one
      end
    end
  end)
  local text = vim.api.nvim_buf_get_lines(buffer, found.lnum, found.lnum + 1, false)[1]
  assert(text:sub(found.col + 1):find("^5"), found.col .. " in " .. text)
end)

test("formatting lays out the bar lines", function()
  local buffer = open("steep-turns.plumb")
  vim.api.nvim_buf_set_lines(buffer, 5, 6, false, { "|fly gorsechat-2 ;under school-rules;rules vfr" })
  local edits = request(buffer, "textDocument/formatting", vim.lsp.util.make_formatting_params({}))
  vim.lsp.util.apply_text_edits(edits, buffer, "utf-16")
  local text = vim.api.nvim_buf_get_lines(buffer, 5, 6, false)[1]
  assert(text == "| fly gorsechat-2; under school-rules; rules vfr", text)
end)

test("the outline is there, and a fence in Markdown is checked", function()
  local buffer = open("contingency-briefing.md")
  eventually("the fence's findings", function()
    return holds(codes(buffer), "contaminated-takeoff")
  end)
  local symbols = request(buffer, "textDocument/documentSymbol", { textDocument = vim.lsp.util.make_text_document_params() })
  assert(#symbols >= 3, vim.inspect(symbols))
end)

test("a card is renamed in every note of the folder", function()
  local buffer = open("aeroplanes.plumb")
  place(buffer, "aircraft gorsechat-2", 10)
  local params = vim.lsp.util.make_position_params()
  params.newName = "gorsechat-3"
  local edit = request(buffer, "textDocument/rename", params)
  local files = 0
  for _ in pairs(edit.changes or edit.documentChanges) do
    files = files + 1
  end
  assert(files >= 3, vim.inspect(edit))
end)

test("the server ends when the editor does", function()
  vim.lsp.stop_client(client)
  eventually("the end", function()
    local one = vim.lsp.get_client_by_id(client)
    return not one or one.is_stopped()
  end)
end)

io.write(string.format("neovim: %d passed, %d failed\n", passed, failed))
vim.cmd(failed == 0 and "qall!" or "cquit 1")
