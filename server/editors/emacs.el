;;; lagwise.el --- lagwise with eglot -*- lexical-binding: t -*-

;; For Emacs 28 or later.  Customize `lagwise-program' if the program is not on
;; `exec-path'.  Findings appear through flymake, `eldoc' shows the evidence of
;; the request under the cursor, and `eglot-code-actions' offers the rewrites
;; that answer it.

;;; Code:

(require 'conf-mode)
(require 'eglot)

(defgroup lagwise nil
  "Reads requests that relate measured series, and judges them on the data."
  :group 'tools)

(defcustom lagwise-program "lagwise"
  "The program that serves."
  :type 'string)

;; A mode of its own, so that other TOML files keep their server.
(define-derived-mode lagwise-mode conf-toml-mode "lagwise"
  "Major mode for manifests, analyses and conventions.")

(add-to-list 'auto-mode-alist
             '("\\.\\(series\\|analysis\\|conventions\\)\\.toml\\'" . lagwise-mode))

(add-to-list 'eglot-server-programs
             (cons '(lagwise-mode :language-id "toml")
                   (lambda (&rest _) (list lagwise-program "attend"))))

(add-hook 'lagwise-mode-hook #'eglot-ensure)

(provide 'lagwise)
;;; lagwise.el ends here
