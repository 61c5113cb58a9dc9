// What stands before the text of every paper: packages of any TeX installation, and the few commands that the text uses.

export const PREAMBLE = String.raw`\documentclass[11pt,a4paper]{article}
\usepackage{iftex}
\ifPDFTeX
  \usepackage[utf8]{inputenc}
  \usepackage[T1]{fontenc}
  \usepackage{textcomp}
  \IfFileExists{lmodern.sty}{\usepackage{lmodern}}{}
  % A sign that this engine has no font for, by its number.
  \newcommand{\othersign}[2]{\texttt{U+#1}}
\else
  \usepackage{fontspec}
  \newcommand{\othersign}[2]{#2}
\fi
\usepackage{amsmath,amssymb}
\usepackage[a4paper,margin=28mm]{geometry}
\usepackage{graphicx}
\IfFileExists{microtype.sty}{\usepackage{microtype}}{}
\usepackage[hidelinks]{hyperref}
\providecommand{\textquotesingle}{'}
\providecommand{\textquotedbl}{"}
\renewcommand{\arraystretch}{1.15}
\setlength{\parindent}{0pt}
\setlength{\parskip}{0.6\baselineskip plus 2pt}
\emergencystretch=3em
\raggedbottom
% Code: a line may break behind a blank and goes on with an indent.
\newenvironment{code}{\par\addvspace{0.4\baselineskip}\begingroup\small\ttfamily\setlength{\parskip}{0pt}\raggedright\frenchspacing}{\par\endgroup\smallskip}
\newcommand{\codeline}[1]{\hangindent=3em\hangafter=1\noindent\strut #1\par}
\newcommand{\codeindent}[1]{\hspace*{#1\dimexpr 0.525em\relax}}
\newenvironment{said}{\begingroup\footnotesize\leftskip=2em}{\par\endgroup}
% A displayed value: as it is, or smaller if it is wider than the column.
\newsavebox{\valuebox}
\newcommand{\shown}[1]{\par\smallskip\sbox{\valuebox}{$\displaystyle #1$}%
  {\centering\leavevmode\ifdim\wd\valuebox>\linewidth\resizebox{\linewidth}{!}{\usebox{\valuebox}}\else\usebox{\valuebox}\fi\par}\smallskip}
% A number of many digits, broken between groups.
\newcommand{\longvalue}[1]{{\par\raggedright\hangindent=4em\hangafter=1\noindent #1\par}}
\newcommand{\statement}[1]{{\par\smallskip\raggedright\leftskip=2em\noindent #1\par\smallskip}}
\newcommand{\heading}[1]{{\par\smallskip\centering\emph{#1}\par}}
\newcommand{\note}[1]{{\par\noindent\footnotesize #1\par}}
\newcommand{\picturefile}[2]{\begin{center}%
  \IfFileExists{#1.pdf}{\includegraphics[width=0.82\linewidth]{#1.pdf}}{%
  \IfFileExists{#1.png}{\includegraphics[width=0.82\linewidth]{#1.png}}{%
  \IfFileExists{#1.jpg}{\includegraphics[width=0.82\linewidth]{#1.jpg}}{\fbox{\texttt{\detokenize{#1}.svg}}}}}\\[4pt]
  {\small #2}\end{center}}
% A drawing with its labels over it: name, what it shows, width, height, labels.
\newcommand{\drawing}[5]{\begin{center}%
  \resizebox{0.82\linewidth}{!}{\setlength{\unitlength}{1bp}\begin{picture}(#3,#4)%
  \put(0,0){\includegraphics[width=#3bp]{#1.pdf}}%
  #5\end{picture}}\\[4pt]
  {\small #2}\end{center}}
`;
