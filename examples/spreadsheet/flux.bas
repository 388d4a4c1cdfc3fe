Attribute VB_Name = "Flux"
' Sends the table of the sheet "batch" in one request and writes the answer beside it. For Excel on Windows:
' Alt+F11, File, Import File, this file; then Alt+F8, SendRange. Layout: B1 holds the address with the question,
' B2 says how it went, row 4 holds the headers, the rows follow; one empty column later the answer is written.
' Str and Val always use the point, so that an office with decimal commas sends and reads the same numbers.

Option Explicit

Private Const HEADER_ROW As Long = 4
Private Const PATIENCE As Long = 120000 ' ms

Public Sub SendRange()
  Dim sheet As Object, sent As Long, rows As Long, answer As String, status As Long
  Set sheet = ThisWorkbook.Worksheets("batch")
  Do While sheet.Cells(HEADER_ROW, sent + 1).Value <> ""
    sent = sent + 1
  Loop
  Do While sheet.Cells(HEADER_ROW + 1 + rows, 1).Value <> ""
    rows = rows + 1
  Loop
  If sent = 0 Or rows = 0 Then
    sheet.Range("B2").Value = "there is no table under the headers in row " & HEADER_ROW
    Exit Sub
  End If
  On Error GoTo NoAnswer
  answer = Post(sheet.Range("B1").Value, TableText(sheet.Cells(HEADER_ROW, 1).Resize(rows + 1, sent).Value2), status)
  On Error GoTo 0
  If status <> 200 Then
    sheet.Range("B2").Value = "refused with " & status & ": " & Left(answer, 1000)
  Else
    WriteBeside sheet, answer, sent, rows
  End If
  Exit Sub
NoAnswer:
  sheet.Range("B2").Value = "no answer: " & Err.Description
End Sub

' ServerXMLHTTP, because XMLHTTP answers from its cache and blocks without end. The text goes as UTF-8.
Private Function Post(ByVal address As String, ByVal text As String, ByRef status As Long) As String
  Dim request As Object
  Set request = CreateObject("MSXML2.ServerXMLHTTP.6.0")
  request.setTimeouts 5000, 5000, PATIENCE, PATIENCE
  request.Open "POST", address, False
  request.setRequestHeader "Content-Type", "text/csv; charset=utf-8"
  request.setRequestHeader "Accept", "text/csv"
  request.send text
  status = request.status
  Post = request.responseText
End Function

Public Function TableText(ByVal table As Variant) As String
  Dim lines() As String, cells() As String, row As Long, column As Long
  ReDim lines(LBound(table, 1) To UBound(table, 1))
  For row = LBound(table, 1) To UBound(table, 1)
    ReDim cells(LBound(table, 2) To UBound(table, 2))
    For column = LBound(table, 2) To UBound(table, 2)
      cells(column) = CellText(table(row, column))
    Next
    lines(row) = Join(cells, ",")
  Next
  TableText = Join(lines, vbLf) & vbLf
End Function

' An error value (#N/A) is a missing one. A comma, a quote or a line end puts a cell into quotes.
Public Function CellText(ByVal value As Variant) As String
  Dim text As String
  If IsError(value) Or IsEmpty(value) Then
    CellText = ""
  ElseIf VarType(value) = vbDouble Then
    text = Trim(Str(value)) ' of 0.5 this is .5
    If Left(text, 1) = "." Then text = "0" & text
    If Left(text, 2) = "-." Then text = "-0" & Mid(text, 2)
    CellText = text
  ElseIf InStr(value, ",") > 0 Or InStr(value, """") > 0 Or InStr(value, vbLf) > 0 Then
    CellText = """" & Replace(value, """", """""") & """"
  Else
    CellText = CStr(value)
  End If
End Function

Private Sub WriteBeside(ByVal sheet As Object, ByVal answer As String, ByVal sent As Long, ByVal rows As Long)
  Dim lines() As String, header As Variant, cells As Variant, table() As Variant
  Dim row As Long, column As Long, wide As Long
  lines = Split(answer, vbLf)
  header = SplitLine(lines(0))
  wide = UBound(header) - sent + 1
  If UBound(lines) <> rows + 1 Or wide < 1 Then
    sheet.Range("B2").Value = rows & " rows were sent, and " & (UBound(lines) - 1) & " came back: nothing is written"
    Exit Sub
  End If
  ReDim table(0 To rows, 0 To wide - 1)
  For row = 0 To rows
    cells = SplitLine(lines(row))
    For column = 0 To wide - 1
      table(row, column) = CellValue(cells(sent + column), header(sent + column), row = 0)
    Next
  Next
  sheet.Cells(HEADER_ROW, sent + 2).Resize(rows + 1, wide).Value = table
  sheet.Range("B2").Value = rows & " rows answered"
End Sub

' An empty cell stays empty: Val would make it 0.
Public Function CellValue(ByVal text As String, ByVal title As String, ByVal isHeader As Boolean) As Variant
  If isHeader Or text = "" Or title = "quality_reason" Then
    CellValue = text
  Else
    CellValue = Val(text)
  End If
End Function

' The cells of a line of CSV; a comma within quotes is none, and a doubled quote stands for one.
Public Function SplitLine(ByVal text As String) As Variant
  Dim parts() As String, cells() As String, held As String, index As Long, count As Long, isOpen As Boolean
  parts = Split(text, ",")
  ReDim cells(0 To UBound(parts))
  count = -1
  For index = 0 To UBound(parts)
    If isOpen Then held = held & "," & parts(index) Else held = parts(index)
    isOpen = (Len(held) - Len(Replace(held, """", ""))) Mod 2 = 1
    If Not isOpen Then
      If Left(held, 1) = """" Then held = Replace(Mid(held, 2, Len(held) - 2), """""", """")
      count = count + 1
      cells(count) = held
    End If
  Next
  ReDim Preserve cells(0 To count)
  SplitLine = cells
End Function
