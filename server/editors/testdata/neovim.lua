-- One sitting in Neovim: findings appear, hover shows the evidence, the
-- preferred rewrite is applied and saved, and its finding is gone. What was
-- seen is written as JSON to the file named by SEEN.

local seen = {}
local deadline = 30000

local function finish()
  local out = io.open(vim.env.SEEN, 'w')
  out:write(vim.json.encode(seen))
  out:close()
  vim.cmd('qa!')
end

-- Waits for something to happen; the sitting ends when it does not.
local function await(what, happened)
  if not vim.wait(deadline, happened, 20) then
    seen.missed = what
    finish()
  end
end

local function finding()
  for _, d in ipairs(vim.diagnostic.get(0)) do
    local code = d.code or (d.user_data and d.user_data.lsp and d.user_data.lsp.code)
    if code == vim.env.RULE then
      return d
    end
  end
end

local function sitting()
  await('the finding', finding)
  local found = finding()
  seen.message, seen.severity = found.message, found.severity
  vim.api.nvim_win_set_cursor(0, { found.lnum + 1, found.col })

  local client = vim.lsp.get_client_by_id((vim.tbl_values(vim.lsp.buf_get_clients(0)))[1].id)
  local at = vim.lsp.util.make_position_params(0, client.offset_encoding)
  local hover = vim.lsp.buf_request_sync(0, 'textDocument/hover', at, deadline)
  if hover and hover[client.id] and hover[client.id].result then
    seen.hover = hover[client.id].result.contents.value
  end

  -- A person would pick from the menu.
  vim.ui.select = function(items, _, choose)
    for i, item in ipairs(items) do
      if item[2].isPreferred then
        seen.title = item[2].title
        return choose(item, i)
      end
    end
  end
  local tick = vim.api.nvim_buf_get_changedtick(0)
  vim.lsp.buf.code_action()
  await('the rewrite', function()
    return vim.api.nvim_buf_get_changedtick(0) > tick
  end)
  vim.cmd('write')
  await('the end of the finding', function()
    return not finding()
  end)
  finish()
end

vim.schedule(function()
  local ok, trouble = pcall(sitting)
  if not ok then
    seen.trouble = tostring(trouble)
    finish()
  end
end)
