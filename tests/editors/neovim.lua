-- Sits at Neovim as a composer does: presses keys, and writes what then stands on the screen to
-- standard output, a line a fact. `tests/editors.rs` starts this and judges the lines.
--
-- The keys go through the editor's own main loop, so this is a coroutine that only ever waits in
-- timers; it never runs keys itself.

local LIMIT = 20000 -- milliseconds for any one wait
local FAULTY_ROW = 6 -- the row that is mended, counted from 1

local function tell(...)
  io.stdout:write(string.format(...), '\n')
  io.stdout:flush()
end

local function fail(what)
  tell('FAILED: %s', what)
  vim.cmd('cquit!')
end

local task

local function step(...)
  local ok, what = coroutine.resume(task, ...)
  if not ok then
    fail(what)
  end
end

-- Waits until `ready` gives a value, and gives that.
local function wait(what, ready)
  local last = vim.uv.now() + LIMIT
  local function look()
    local ok, value = pcall(ready)
    if not ok then
      fail(what .. ': ' .. value)
    elseif value then
      step(value)
    elseif vim.uv.now() > last then
      fail('waited in vain for ' .. what)
    else
      vim.defer_fn(look, 10)
    end
  end
  vim.defer_fn(look, 0)
  return coroutine.yield()
end

-- The server's word on a version of the buffer: the answer to the editor's question, its last. One
-- that is pushed as well would show every finding twice.
local heard = {}
local pushed = 0
local function listen(method, note)
  local usual = vim.lsp.handlers[method]
  vim.lsp.handlers[method] = function(err, result, ctx)
    usual(err, result, ctx)
    note(err, result, ctx)
  end
end
listen('textDocument/publishDiagnostics', function()
  pushed = pushed + 1
end)
listen('textDocument/diagnostic', function(err, _, ctx)
  if not err then
    heard[ctx.version] = (heard[ctx.version] or 0) + 1
  end
end)

local ended = {}
vim.lsp.config('partwright', {
  on_exit = function(code, signal)
    ended[#ended + 1] = string.format('status %d, signal %d', code, signal)
  end,
})

local function row(number)
  return vim.api.nvim_buf_get_lines(0, number - 1, number, true)[1]
end

-- Presses keys; waits until they have made the row what it should be, and for the server's word on
-- exactly that text.
local function type_keys(keys, wanted)
  tell('typed %s', keys)
  vim.api.nvim_input(keys)
  wait('the row to become ' .. wanted, function()
    return row(FAULTY_ROW) == wanted and vim.api.nvim_get_mode().mode == 'n'
  end)
  wait('the word on version ' .. vim.b.changedtick, function()
    return heard[vim.lsp.util.buf_versions[vim.api.nvim_get_current_buf()]]
  end)
end

-- The text between two places of LSP, in the units the client and the server have agreed on.
local function text_at(range)
  local encoding = vim.lsp.get_clients({ bufnr = 0 })[1].offset_encoding
  local function column(place)
    return vim.str_byteindex(row(place.line + 1), encoding, place.character)
  end
  return table.concat(vim.api.nvim_buf_get_text(0, range.start.line, column(range.start), range['end'].line, column(range['end']), {}), '/')
end

local SEVERITY = { 'error', 'warning', 'information', 'hint' }

local function tell_findings()
  local found = vim.diagnostic.get(0)
  table.sort(found, function(a, b)
    return a.lnum < b.lnum or a.lnum == b.lnum and a.col < b.col
  end)
  tell('findings %d', #found)
  for _, it in ipairs(found) do
    local text = table.concat(vim.api.nvim_buf_get_text(0, it.lnum, it.col, it.end_lnum, it.end_col, {}), '/')
    local column = vim.fn.strchars(row(it.lnum + 1):sub(1, it.col)) + 1
    tell('finding %d:%d "%s" %s %s %s', it.lnum + 1, column, text, SEVERITY[it.severity], it.source, it.code)
    tell('message %s', it.message)
    for _, other in ipairs(it.user_data.lsp.relatedInformation or {}) do
      tell('related %d "%s" %s', other.location.range.start.line + 1, text_at(other.location.range), other.message)
    end
  end
end

-- The lines of the one floating window there is.
local function float()
  for _, window in ipairs(vim.api.nvim_list_wins()) do
    if vim.api.nvim_win_get_config(window).relative ~= '' then
      return vim.api.nvim_buf_get_lines(vim.api.nvim_win_get_buf(window), 0, -1, true)
    end
  end
end

local function tell_float(name, keys)
  tell('typed %s', keys)
  vim.api.nvim_input(keys)
  for _, line in ipairs(wait('the ' .. name, float)) do
    tell('%s %s', name, line)
  end
  vim.api.nvim_input('h')
  wait('the ' .. name .. ' to close', function()
    return not float()
  end)
  vim.api.nvim_input('l')
end

-- The menu is the editor's own. What it lists is told, and the number typed ahead.
local pick
local choose = vim.ui.select
vim.ui.select = function(items, options, done)
  for number, item in ipairs(items) do
    local line = options.format_item(item)
    tell('choice %s', line)
    if pick and vim.startswith(line, pick) then
      vim.api.nvim_input(number .. '<CR>')
      pick = nil
    end
  end
  choose(items, options, done)
end

local function lines()
  return vim.api.nvim_buf_get_lines(0, 0, -1, true)
end

-- Presses keys, waits for the text to change and for the server's word on it; the new lines.
local function change(keys)
  local before, tick = lines(), vim.b.changedtick
  vim.api.nvim_input(keys)
  wait('the text to change', function()
    return vim.b.changedtick > tick and not vim.deep_equal(lines(), before)
  end)
  wait('the word on it', function()
    return heard[vim.b.changedtick]
  end)
  for _, line in ipairs(lines()) do
    if not vim.list_contains(before, line) then
      tell('changed %s', line)
    end
  end
end

-- At the finding: opens the menu, and takes the first in it that starts so.
local function take(start)
  pick = start
  tell('typed gg]dgra, took %s', start)
  change('gg]dgra')
end

local function attached()
  return vim.lsp.get_clients({ bufnr = 0, name = 'partwright' })[1]
end

-- The server is the one child of this process.
local function server()
  local children = vim.api.nvim_get_proc_children(vim.fn.getpid())
  tell('server processes %d', #children)
  tell('server %d', children[1])
  return children[1]
end

local function composer()
  tell('typed :edit')
  vim.api.nvim_input(':edit quay-lamps.voices<CR>')
  wait('the server', attached)
  tell('filetype %s, comment %s', vim.bo.filetype, vim.bo.commentstring)
  tell('attached to %s', attached().config.cmd[1])
  local first = server()
  wait('the first word', function()
    return next(heard)
  end)
  tell_findings()

  -- To the finding by the editor's own key, and the two windows one opens there.
  local faulty = row(FAULTY_ROW)
  local mended = faulty:gsub('A4 B A', 'A4 G A')
  local misread = faulty:gsub('A4 B A', 'A4 H A')
  tell('typed gg]d')
  vim.api.nvim_input('gg]d')
  local place = wait('the cursor at the finding', function()
    local place = vim.api.nvim_win_get_cursor(0)
    return place[1] == FAULTY_ROW and place
  end)
  tell('cursor %d "%s"', place[1], row(place[1]):sub(place[2] + 1, place[2] + 1))
  tell_float('shown', '<C-W>d')
  tell_float('hover', 'K')

  take('Move')
  tell_findings()
  type_keys('u', faulty)
  tell_findings()
  take('Grant')
  tell_findings()
  local reason = wait('the cursor at the reason', function()
    local at = vim.api.nvim_win_get_cursor(0)
    return at[1] ~= FAULTY_ROW and row(at[1]):sub(at[2] + 1)
  end)
  tell('cursor at %s', reason)
  type_keys('u', faulty)
  tell_findings()
  vim.api.nvim_input('gg]d')

  type_keys('cwG<Esc>', mended)
  tell_findings()
  type_keys('u', faulty)
  tell_findings()
  type_keys('cwH<Esc>', misread)
  tell_findings()
  type_keys('ucwG<Esc>', mended)
  tell_findings()

  tell('typed gggqG')
  change('gggqG')
  tell_findings()

  tell('typed :write')
  vim.api.nvim_input(':write<CR>')
  wait('the file to be written', function()
    return not vim.bo.modified
  end)
  for version, times in pairs(heard) do
    if times > 1 then
      tell('%s was spoken of %d times', version, times)
    end
  end
  tell('pushed %d', pushed)

  attached():stop()
  wait('the server to end', function()
    return ended[1]
  end)
  wait('its process to be gone, waited for and no zombie', function()
    return select(3, vim.uv.kill(first, 0)) == 'ESRCH'
  end)
  tell('ended with %s', ended[1])
  tell('findings %d', #vim.diagnostic.get(0))

  -- Once more, to leave by the door: the server must go when the editor does.
  heard = {}
  vim.api.nvim_input(':edit<CR>')
  wait('the server again', attached)
  server()
  wait('its first word', function()
    return next(heard)
  end)
  tell_findings()
  tell('typed :quit')
  vim.api.nvim_input(':quit<CR>')
end

task = coroutine.create(composer)
vim.schedule(step)
